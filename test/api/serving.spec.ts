import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { call, PASSWORD, startTestServer, type Agent, type TestServer } from './support/test-server';

let server: TestServer;
let analyst: Agent;

beforeAll(async () => {
  server = await startTestServer();
  analyst = await server.signedIn(await server.addTeam('Team of the pages'), 'analyst');
  const folder = server.dependencies.webFolder;
  writeFileSync(join(folder, 'main-ABCDEF12.js'), 'start();');
  writeFileSync(join(folder, 'favicon.svg'), '<svg/>');
  mkdirSync(join(folder, 'media'));
  writeFileSync(join(folder, 'media', 'plex-ABCDEF12.woff2'), 'font');
});

afterAll(() => server.stop());

const get = (path: string): ReturnType<typeof call> => call(server.stranger(), 'get', path);

test('without a build the page says how to make one; with it, every page address is the application', async () => {
  expect((await get('/')).status).toBe(503);
  writeFileSync(join(server.dependencies.webFolder, 'index.html'), '<title>Tenthmark</title>');
  for (const path of ['/', '/studies', '/studies/123?tab=runs', '/welcome/abc-DEF_1', '/apis']) {
    const answer = await get(path).expect(200);
    expect(answer.text).toBe('<title>Tenthmark</title>');
    expect(answer.headers['cache-control']).toBe('no-cache');
  }
});

test('files named by their content are kept for good, others are asked for again', async () => {
  for (const path of ['/main-ABCDEF12.js', '/media/plex-ABCDEF12.woff2'])
    expect((await get(path).expect(200)).headers['cache-control']).toBe(
      'public, max-age=31536000, immutable',
    );
  expect((await get('/favicon.svg').expect(200)).headers['cache-control']).toBe('no-cache');
});

test('a file that is not there is not the application, and nothing outside the folder is served', async () => {
  await get('/main-OLDOLD00.js').expect(404);
  await get('/..%2f..%2f..%2fetc%2fpasswd').expect(({ text }) => expect(text).not.toMatch('root:'));
  await get('/%2e%2e/package.json').expect(404);
});

test('pages may run only our own scripts and stand in nobody’s frame', async () => {
  const { headers } = await get('/favicon.svg');
  const policy = String(headers['content-security-policy']);
  expect(policy).toMatch("script-src 'self'");
  expect(policy).not.toMatch(/script-src[^;]*unsafe/);
  expect(policy).toMatch("frame-ancestors 'none'");
  expect(headers['x-content-type-options']).toBe('nosniff');
  expect(headers['x-powered-by']).toBeUndefined();
});

test('a request larger than 1 MB, or not JSON, is told so', async () => {
  const large = await call(analyst, 'post', '/api/studies', { question: 'x'.repeat(1_100_000) });
  expect([large.status, (large.body as { code: string }).code]).toEqual([413, 'too-large']);
  const broken = await call(analyst, 'post', '/api/studies')
    .set('content-type', 'application/json')
    .send('{"name":');
  expect([broken.status, (broken.body as { code: string }).code]).toEqual([400, 'malformed']);
});

test('what is wrong in a form is told by field', async () => {
  const answer = await call(analyst, 'post', '/api/studies', {
    name: ' ',
    benchId: 'x',
    compared: [],
    reference: 'Bare',
    conditions: [{ name: 'Load', nominalWatts: -1 }],
  }).expect(422);
  expect(answer.headers['content-type']).toMatch('application/problem+json');
  const { fields } = answer.body as { fields: { path: string }[] };
  expect(fields.map(({ path }) => path)).toEqual([
    'name',
    'benchId',
    'compared',
    'conditions.0.nominalWatts',
  ]);
});

test.each(['nul \0 byte', 'half a pair \ud83d'])(
  'text that can’t be stored is refused, not half kept: %j',
  async (name) => {
    await call(analyst, 'post', '/api/coolers', { name }).expect(422);
    await call(analyst, 'get', `/api/studies?search=${encodeURIComponent('nul \0 byte')}`).expect(422);
  },
);

test('when the server fails, the answer says what to quote and shows nothing of the inside', async () => {
  await server.db.query('alter table coolers rename to coolers_away');
  const answer = await call(analyst, 'get', '/api/coolers');
  await server.db.query('alter table coolers_away rename to coolers');
  expect([answer.status, (answer.body as { code: string }).code]).toEqual([500, 'unexpected']);
  expect(JSON.stringify(answer.body)).not.toMatch(/coolers|select|\.ts:|stack/i);
  expect((answer.body as { detail: string }).detail).toMatch(answer.headers['x-request-id'] ?? 'no id');
  expect(server.reports.join()).toMatch('coolers');
});

test('behind https the cookies are sent over https only', async () => {
  const secure = await startTestServer({ environment: { PUBLIC_URL: 'https://tenthmark.lab.example' } });
  try {
    const { email } = await secure.addAccount(await secure.addTeam('Team'), ['analyst']);
    const answer = await call(secure.stranger(), 'post', '/api/session', {
      email,
      password: PASSWORD,
    }).expect(200);
    for (const line of answer.headers['set-cookie'] as unknown as string[]) expect(line).toMatch('; Secure');
    expect(answer.headers['strict-transport-security']).toBeDefined();
  } finally {
    await secure.stop();
  }
});
