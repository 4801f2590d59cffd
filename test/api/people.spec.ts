import type { Outbox, Person } from '../../shared/contracts';
import { call, PASSWORD, startTestServer, type Agent, type TestServer } from './support/test-server';

let server: TestServer;
const sent: { to: string; subject: string; text: string }[] = [];
let mailServerDown = false;

beforeAll(async () => {
  server = await startTestServer({
    environment: { PUBLIC_URL: 'http://tenthmark.lab.example/' },
    carrier: (message) => {
      if (mailServerDown) return Promise.reject(new Error('down'));
      sent.push(message);
      return Promise.resolve();
    },
  });
});

afterAll(() => server.stop());

const codeOf = (answer: { body: unknown }): string => (answer.body as { code: string }).code;
const personOf = (answer: { body: unknown }): Person => answer.body as Person;
const newAdministrator = async (): ReturnType<TestServer['signedIn']> =>
  server.signedIn(await server.addTeam('Team of the people'), 'administrator');

async function lastToken(administrator: Agent, to: string): Promise<string> {
  const { messages } = (await call(administrator, 'get', '/api/outbox').expect(200)).body as Outbox;
  return messages.find((message) => message.to === to)?.text.match(/\/welcome\/(\S+)/)?.[1] ?? '';
}

const invite = (administrator: Agent, email: string): ReturnType<typeof call> =>
  call(administrator, 'post', '/api/people', { name: 'Newcomer', email, roles: ['analyst', 'lead'] });

const accept = (token: string, agent = server.stranger()): ReturnType<typeof call> =>
  call(agent, 'post', '/api/invitations/accept', { token, password: PASSWORD });

test('an invited person chooses a password by the link, once, and is in', async () => {
  const administrator = await newAdministrator();
  const email = 'newcomer@lab.example';
  expect(personOf(await invite(administrator, email).expect(200)).state).toBe('invited');
  const token = await lastToken(administrator, email);
  const agent = server.stranger();
  const { account } = (await accept(token, agent).expect(200)).body as { account: { roles: string[] } };
  expect(account.roles).toEqual(['analyst', 'lead']);
  await call(agent, 'get', '/api/studies').expect(200);
  expect(codeOf(await accept(token).expect(404))).toBe('no-invitation');
  const { people } = (await call(administrator, 'get', '/api/people').expect(200)).body as {
    people: Person[];
  };
  expect(people.find((person) => person.email === email)?.state).toBe('active');
});

test('the invitation goes out by mail, with the public address in its link', async () => {
  const administrator = await newAdministrator();
  await invite(administrator, 'by-mail@lab.example').expect(200);
  await server.dependencies.post.stop();
  const letter = sent.find(({ to }) => to === 'by-mail@lab.example');
  expect(letter?.text).toMatch('http://tenthmark.lab.example/welcome/');
  const { messages, mailServer } = (await call(administrator, 'get', '/api/outbox').expect(200))
    .body as Outbox;
  expect([mailServer, messages[0]?.sent]).toEqual([true, true]);
});

test('a message the mail server did not take stays in the outbox and goes out later', async () => {
  const administrator = await newAdministrator();
  mailServerDown = true;
  await invite(administrator, 'later@lab.example').expect(200);
  await server.dependencies.post.stop();
  const before = (await call(administrator, 'get', '/api/outbox').expect(200)).body as Outbox;
  expect(before.messages[0]?.sent).toBe(false);
  mailServerDown = false;
  server.dependencies.post.start();
  await server.dependencies.post.stop();
  expect(sent.filter(({ to }) => to === 'later@lab.example')).toHaveLength(1);
});

test('a new link replaces the old; either runs out after fourteen days', async () => {
  const administrator = await newAdministrator();
  const email = 'twice@lab.example';
  const { id } = personOf(await invite(administrator, email).expect(200));
  const first = await lastToken(administrator, email);
  server.pass(1000);
  await call(administrator, 'post', `/api/people/${id}/invite`).expect(204);
  const second = await lastToken(administrator, email);
  expect(second).not.toBe(first);
  await accept(first).expect(404);
  server.pass(15 * 24 * 60 * 60_000);
  await accept(second).expect(404);
});

test('an address has one account over all teams', async () => {
  const administrator = await newAdministrator();
  const other = await newAdministrator();
  await invite(administrator, 'one@lab.example').expect(200);
  const answer = await invite(other, 'One@lab.example').expect(422);
  expect((answer.body as { fields: { path: string }[] }).fields[0]?.path).toBe('email');
});

test('stopping someone works at once, and opening again lets them sign in', async () => {
  const administrator = await newAdministrator();
  const teamId = (
    await server.db.query<{ team_id: string }[]>('select team_id from accounts where id = $1', [
      administrator.account.id,
    ])
  )[0]?.team_id;
  const analyst = await server.signedIn(teamId ?? '', 'analyst');
  const { id, email } = analyst.account;
  const stopped = await call(administrator, 'patch', `/api/people/${id}`, { stopped: true }).expect(200);
  expect(personOf(stopped).state).toBe('stopped');
  await call(analyst, 'get', '/api/studies').expect(401);
  const refused = await call(server.stranger(), 'post', '/api/session', { email, password: PASSWORD });
  expect([refused.status, codeOf(refused)]).toEqual([403, 'stopped']);
  await call(administrator, 'patch', `/api/people/${id}`, { stopped: false }).expect(200);
  await call(server.stranger(), 'post', '/api/session', { email, password: PASSWORD }).expect(200);
});

test('a role given or taken counts from the next request on', async () => {
  const administrator = await newAdministrator();
  const { id } = administrator.account;
  await call(administrator, 'post', '/api/coolers', { name: 'Cooler' }).expect(403);
  await call(administrator, 'patch', `/api/people/${id}`, { roles: ['administrator', 'lead'] }).expect(200);
  await call(administrator, 'post', '/api/coolers', { name: 'Cooler' }).expect(200);
});

test('nobody stops themselves, and the last administrator stays one', async () => {
  const administrator = await newAdministrator();
  const path = `/api/people/${administrator.account.id}`;
  expect(codeOf(await call(administrator, 'patch', path, { stopped: true }).expect(409))).toBe('own-account');
  const last = await call(administrator, 'patch', path, { roles: ['lead'] }).expect(409);
  expect(codeOf(last)).toBe('last-administrator');
  await call(administrator, 'get', '/api/people').expect(200);
});

test('of two administrators who take the role from each other at once, one keeps it', async () => {
  const teamId = await server.addTeam('Team of two');
  const [one, two] = [
    await server.signedIn(teamId, 'administrator'),
    await server.signedIn(teamId, 'administrator'),
  ];
  const answers = await Promise.all([
    call(one, 'patch', `/api/people/${two.account.id}`, { roles: ['analyst'] }),
    call(two, 'patch', `/api/people/${one.account.id}`, { roles: ['analyst'] }),
  ]);
  expect(answers.map(({ status }) => status).filter((status) => status === 200)).toHaveLength(1);
  const left = await server.db.query<unknown[]>(
    `select id from accounts where team_id = $1 and 'administrator' = any(roles)`,
    [teamId],
  );
  expect(left).toHaveLength(1);
});
