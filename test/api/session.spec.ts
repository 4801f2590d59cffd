import jwt from 'jsonwebtoken';
import type { Session } from '../../shared/contracts';
import { call, PASSWORD, SECRET, startTestServer, type Agent, type TestServer } from './support/test-server';

let server: TestServer;
let teamId: string;

beforeAll(async () => {
  server = await startTestServer({ limits: { failuresPerAccount: 3 } });
  teamId = await server.addTeam('Team of the sessions');
});

afterAll(() => server.stop());

interface Cookies {
  access: string;
  refresh: string;
}

/** Cookies as a thief would have them: outside any browser. */
function cookiesOf(answer: { headers: Record<string, unknown> }): Cookies {
  const set = (answer.headers['set-cookie'] ?? []) as string[];
  const value = (name: string): string =>
    set.find((line) => line.startsWith(`${name}=`))?.match(/=([^;]*)/)?.[1] ?? '';
  return { access: value('tm_access'), refresh: value('tm_refresh') };
}

async function signIn(email: string): Promise<{ agent: Agent; cookies: Cookies }> {
  const agent = server.stranger();
  const answer = await call(agent, 'post', '/api/session', { email, password: PASSWORD }).expect(200);
  return { agent, cookies: cookiesOf(answer) };
}

const refreshWith = (token: string): ReturnType<typeof call> =>
  call(server.stranger(), 'post', '/api/session/refresh').set('cookie', `tm_refresh=${token}`);

const codeOf = (answer: { body: unknown }): string => (answer.body as { code: string }).code;
const stateOf = async (agent: Agent): Promise<Session['state']> =>
  ((await call(agent, 'get', '/api/session').expect(200)).body as Session).state;

test('signing in gives cookies no script can read and no other site can send', async () => {
  const { email } = await server.addAccount(teamId, ['analyst']);
  const answer = await call(server.stranger(), 'post', '/api/session', { email, password: PASSWORD });
  const lines = answer.headers['set-cookie'] as unknown as string[];
  expect(lines).toHaveLength(2);
  for (const line of lines) {
    expect(line).toMatch(/; HttpOnly/);
    expect(line).toMatch(/; SameSite=Strict/);
  }
  expect(lines.find((line) => line.startsWith('tm_access'))).toMatch('; Path=/api;');
  expect(lines.find((line) => line.startsWith('tm_refresh'))).toMatch('; Path=/api/session;');
  expect(JSON.stringify(answer.body)).not.toMatch(/hash|token/i);
});

test('a wrong password and an unknown address are told alike', async () => {
  const { email } = await server.addAccount(teamId, ['analyst']);
  const wrong = await call(server.stranger(), 'post', '/api/session', { email, password: 'not this one' });
  const unknown = await call(server.stranger(), 'post', '/api/session', {
    email: 'nobody@lab.example',
    password: 'x',
  });
  expect([wrong.status, unknown.status]).toEqual([401, 401]);
  expect(wrong.body).toEqual(unknown.body);
});

test('the address may be typed in capitals and with spaces around it', async () => {
  const { email } = await server.addAccount(teamId, ['analyst']);
  const typed = ` ${email.toUpperCase()} `;
  await call(server.stranger(), 'post', '/api/session', { email: typed, password: PASSWORD }).expect(200);
});

test('after the account’s limit of failures, even the right password waits; other accounts do not', async () => {
  const { email } = await server.addAccount(teamId, ['analyst']);
  for (let tries = 0; tries < 3; tries += 1)
    await call(server.stranger(), 'post', '/api/session', { email, password: 'a guess' }).expect(401);
  const answer = await call(server.stranger(), 'post', '/api/session', { email, password: PASSWORD });
  expect([answer.status, codeOf(answer)]).toEqual([429, 'too-many-tries']);
  const other = await server.addAccount(teamId, ['analyst']);
  await call(server.stranger(), 'post', '/api/session', { email: other.email, password: PASSWORD }).expect(
    200,
  );
});

test('the access cookie runs out after ten minutes; refreshing goes on from there', async () => {
  const { agent } = await signIn((await server.addAccount(teamId, ['analyst'])).email);
  await call(agent, 'get', '/api/studies').expect(200);
  server.pass(11 * 60_000);
  const expired = await call(agent, 'get', '/api/studies');
  expect([expired.status, codeOf(expired)]).toEqual([401, 'session-expired']);
  expect(await stateOf(agent)).toBe('signed out');
  await call(agent, 'post', '/api/session/refresh').expect(200);
  await call(agent, 'get', '/api/studies').expect(200);
});

test('refresh tokens are used once each; an old one turning up again ends the session for everyone who holds it', async () => {
  const { agent, cookies } = await signIn((await server.addAccount(teamId, ['analyst'])).email);
  const rotated = cookiesOf(await call(agent, 'post', '/api/session/refresh').expect(200));
  expect(rotated.refresh).not.toBe(cookies.refresh);
  server.pass(1000);
  const reused = await refreshWith(cookies.refresh);
  expect([reused.status, codeOf(reused)]).toEqual([401, 'session-revoked']);
  // The thief's discovery ends the rightful holder's session as well, access cookie included.
  await call(agent, 'get', '/api/studies').expect(401);
  const holder = await refreshWith(rotated.refresh);
  expect([holder.status, codeOf(holder)]).toEqual([401, 'session-revoked']);
});

test('two pages refreshing at the same moment do not sign each other out', async () => {
  const { agent, cookies } = await signIn((await server.addAccount(teamId, ['analyst'])).email);
  const hold = server.db.createQueryRunner();
  await hold.startTransaction();
  // All three are under way before the first can be answered.
  await hold.query('select digest from refresh_tokens for update');
  const asked = [1, 2, 3].map(() => refreshWith(cookies.refresh).then((answer) => answer));
  await new Promise((resolve) => setTimeout(resolve, 200));
  await hold.commitTransaction();
  await hold.release();
  const answers = await Promise.all(asked);
  expect(answers.map(({ status }) => status)).toEqual([200, 200, 200]);
  expect(answers.map(cookiesOf).filter(({ refresh }) => refresh !== '')).toHaveLength(1);
  await call(agent, 'get', '/api/studies').expect(200);
});

test('a refresh token runs out after fourteen days, and an invented one never worked', async () => {
  const { cookies } = await signIn((await server.addAccount(teamId, ['analyst'])).email);
  server.pass(15 * 24 * 60 * 60_000);
  expect(codeOf(await refreshWith(cookies.refresh).expect(401))).toBe('signed-out');
  expect(codeOf(await refreshWith('invented').expect(401))).toBe('signed-out');
  expect(codeOf(await call(server.stranger(), 'post', '/api/session/refresh').expect(401))).toBe(
    'signed-out',
  );
});

test('signing out ends the session at once, on the server too', async () => {
  const { agent, cookies } = await signIn((await server.addAccount(teamId, ['analyst'])).email);
  await call(agent, 'delete', '/api/session').expect(204);
  expect(await stateOf(agent)).toBe('signed out');
  await call(server.stranger(), 'get', '/api/studies')
    .set('cookie', `tm_access=${cookies.access}`)
    .expect(401);
  expect(codeOf(await refreshWith(cookies.refresh).expect(401))).toBe('session-revoked');
});

test.each([
  [
    'signed with another secret',
    (claims: object) => jwt.sign(claims, 'x'.repeat(40), { issuer: 'tenthmark' }),
  ],
  ['not signed', (claims: object) => jwt.sign(claims, '', { algorithm: 'none', issuer: 'tenthmark' })],
  ['of another issuer', (claims: object) => jwt.sign(claims, SECRET, { issuer: 'someone' })],
])('an access cookie %s opens nothing', async (_name, forge) => {
  const { cookies } = await signIn((await server.addAccount(teamId, ['analyst'])).email);
  const { sid } = jwt.decode(cookies.access) as { sid: string };
  const forged = forge({ sid, exp: Math.floor(server.dependencies.clock().getTime() / 1000) + 600 });
  await call(server.stranger(), 'get', '/api/studies').set('cookie', `tm_access=${forged}`).expect(401);
});

test('without the header only our own pages send, nothing is changed', async () => {
  const { agent } = await signIn((await server.addAccount(teamId, ['administrator'])).email);
  const answer = await agent.post('/api/benches').send({ name: 'Bench from elsewhere' });
  expect([answer.status, codeOf(answer)]).toEqual([403, 'foreign-request']);
  const benches = await call(agent, 'get', '/api/benches').expect(200);
  expect(benches.body).toEqual({ benches: [] });
});

test('changing the password needs the old one and ends the sessions on other devices, not this one', async () => {
  const { email } = await server.addAccount(teamId, ['analyst']);
  const here = await signIn(email);
  const elsewhere = await signIn(email);
  const next = 'another long password';
  const wrong = await call(here.agent, 'put', '/api/account/password', { current: 'not this one', next });
  expect(wrong.status).toBe(422);
  expect((wrong.body as { fields: { path: string }[] }).fields[0]?.path).toBe('current');
  const short = await call(here.agent, 'put', '/api/account/password', { current: PASSWORD, next: 'short' });
  expect(short.status).toBe(422);
  await call(here.agent, 'put', '/api/account/password', { current: PASSWORD, next }).expect(204);
  await call(here.agent, 'get', '/api/studies').expect(200);
  await call(elsewhere.agent, 'get', '/api/studies').expect(401);
  await call(server.stranger(), 'post', '/api/session', { email, password: PASSWORD }).expect(401);
  await call(server.stranger(), 'post', '/api/session', { email, password: next }).expect(200);
});

test('a password longer than bcrypt reads is refused instead of cut', async () => {
  const { agent } = await signIn((await server.addAccount(teamId, ['analyst'])).email);
  const answer = await call(agent, 'put', '/api/account/password', {
    current: PASSWORD,
    next: 'ü'.repeat(40),
  });
  expect(answer.status).toBe(422);
  expect((answer.body as { detail: string }).detail).toMatch('72 bytes');
});
