import { ConfigError, readConfig } from '../../server/config';

const GOOD = { DATABASE_URL: 'postgres://app@localhost/tenthmark', TENTHMARK_SECRET: 'x'.repeat(32) };

test('what is not set takes its default', () => {
  expect(readConfig(GOOD)).toEqual({
    databaseUrl: GOOD.DATABASE_URL,
    host: '127.0.0.1',
    port: 4100,
    secret: GOOD.TENTHMARK_SECRET,
    demo: true,
    smtpUrl: null,
    mailFrom: 'Tenthmark <tenthmark@localhost>',
    publicUrl: null,
    trustProxy: 0,
  });
});

test('an empty value counts as not set', () => {
  expect(readConfig({ ...GOOD, PORT: '', SMTP_URL: '' })).toMatchObject({ port: 4100, smtpUrl: null });
});

test.each([
  [{ DATABASE_URL: undefined }, 'DATABASE_URL is needed'],
  [{ DATABASE_URL: 'mysql://x' }, 'DATABASE_URL must begin with postgres://'],
  [{ TENTHMARK_SECRET: undefined }, 'TENTHMARK_SECRET is needed'],
  [{ TENTHMARK_SECRET: 'short' }, 'TENTHMARK_SECRET must have at least 32 characters'],
  [{ PORT: 'abc' }, 'PORT must be a number'],
  [{ PORT: '70000' }, 'PORT'],
  [{ TENTHMARK_DEMO: 'maybe' }, 'TENTHMARK_DEMO'],
  [{ PUBLIC_URL: 'tenthmark.lab.example' }, 'PUBLIC_URL must be a whole address'],
  [{ SMTP_URL: 'mail.lab.example' }, 'SMTP_URL must begin with smtp://'],
])('%j stops the start with one line that names it', (wrong, message) => {
  const read = (): unknown => readConfig({ ...GOOD, ...wrong });
  expect(read).toThrow(ConfigError);
  expect(read).toThrow(message);
  expect(read).not.toThrow('\n');
});

test('everything wrong is told at once', () => {
  expect(() => readConfig({})).toThrow(/DATABASE_URL.*TENTHMARK_SECRET/);
});
