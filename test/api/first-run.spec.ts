import type { Session } from '../../shared/contracts';
import { call, PASSWORD, startTestServer, type TestServer } from './support/test-server';

let server: TestServer;

beforeAll(async () => {
  server = await startTestServer({ limits: { failuresPerAddress: 2 } });
});

afterAll(() => server.stop());

const first = (email: string): object => ({
  team: 'First team',
  name: 'First person',
  email,
  password: PASSWORD,
});

test('an empty server asks for its first team, takes one of two who try at once, and no other after', async () => {
  const agent = server.stranger();
  expect((await call(agent, 'get', '/api/session')).body).toEqual({ state: 'first run' });
  const answers = await Promise.all([
    call(server.stranger(), 'post', '/api/first-run', first('one@lab.example')),
    call(server.stranger(), 'post', '/api/first-run', first('two@lab.example')),
  ]);
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  const later = await call(agent, 'post', '/api/first-run', first('three@lab.example'));
  expect((later.body as { code: string }).code).toBe('already-set-up');
  const session = (await call(agent, 'get', '/api/session')).body as Session;
  expect(session).toEqual({ state: 'signed out', demo: [] });
});

test('the first administrator has thresholds to begin with and can give themselves the other roles', async () => {
  const [row] = await server.db.query<{ email: string; id: string }[]>('select email, id from accounts');
  const agent = server.stranger();
  await call(agent, 'post', '/api/session', { email: row?.email, password: PASSWORD }).expect(200);
  const thresholds = await call(agent, 'get', '/api/thresholds').expect(200);
  expect((thresholds.body as { current: { number: number } }).current.number).toBe(1);
  const roles = ['administrator', 'analyst', 'lead', 'auditor'];
  await call(agent, 'patch', `/api/people/${row?.id ?? ''}`, { roles }).expect(200);
  const check = await call(agent, 'get', '/api/ledger/check').expect(200);
  expect(check.body).toMatchObject({ entries: 3, whole: true });
});

test('guessing from one address is slowed down, whatever accounts it tries', async () => {
  const guess = (email: string): ReturnType<typeof call> =>
    call(server.stranger(), 'post', '/api/session', { email, password: 'a guess' });
  expect((await guess('a@lab.example')).status).toBe(401);
  expect((await guess('b@lab.example')).status).toBe(401);
  expect((await guess('c@lab.example')).status).toBe(429);
});
