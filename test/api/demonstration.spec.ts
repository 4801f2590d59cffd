import { createServer } from 'node:http';
import supertest from 'supertest';
import { createApp } from '../../server/app';
import { demoSignIns } from '../../server/accounts/demo-sign-ins';
import { seedDemo } from '../../server/cli/seed';
import type { LedgerCheck, Session, StudiesPage, Waiting } from '../../shared/contracts';
import { call, startTestServer, type Agent, type TestServer } from './support/test-server';

let server: TestServer;
const told: string[] = [];

beforeAll(async () => {
  server = await startTestServer();
  await seedDemo(server.dependencies, (text) => told.push(text));
});

afterAll(() => server.stop());

async function signedInAs(role: string): Promise<Agent> {
  const agent = server.stranger();
  const session = (await call(agent, 'get', '/api/session')).body as Session;
  const person = session.state === 'signed out' ? session.demo.find((one) => one.role === role) : undefined;
  await call(agent, 'post', '/api/session', { email: person?.email, password: person?.password }).expect(200);
  return agent;
}

test('it says what it does while it does it', () => {
  expect(told).toContain('reading demonstration log 40 of 40');
});

test('the first page offers one sign-in a role, and each finds what its role does', async () => {
  const waits: Record<string, string[]> = {};
  for (const role of ['analyst', 'lead', 'auditor', 'administrator']) {
    const { roles } = (await call(await signedInAs(role), 'get', '/api/waiting').expect(200)).body as Waiting;
    waits[role] = roles.flatMap(({ groups }) => groups.flatMap(({ code, items }) => items.map(() => code)));
  }
  expect(waits).toEqual({
    analyst: ['needs runs'],
    lead: ['to sign', 'moving'],
    auditor: [],
    administrator: [],
  });
});

test('forty runs in, both loads judged, the record whole', async () => {
  const auditor = await signedInAs('auditor');
  const { items } = (await call(auditor, 'get', '/api/studies').expect(200)).body as StudiesPage;
  const states = items.map(({ runs, verdicts }) => [
    runs,
    verdicts.map(({ state, lastReRun }) => [state, lastReRun?.result]),
  ]);
  expect(states.sort()).toEqual([
    [0, []],
    [
      40,
      [
        ['submitted', undefined],
        ['signed off', 'identical'],
      ],
    ],
  ]);
  const check = (await call(auditor, 'get', '/api/ledger/check').expect(200)).body as LedgerCheck;
  expect(check.whole).toBe(true);
  expect(check.entries).toBeGreaterThan(45);
});

test('it comes once: on a database in use it adds nothing', async () => {
  expect(await seedDemo(server.dependencies, () => undefined)).toBe(false);
});

test('with the demonstration switched off its published passwords open nothing', async () => {
  const [analyst] = await demoSignIns(server.dependencies);
  const inside = await signedInAs('analyst');
  const config = { ...server.dependencies.config, demo: false };
  const { app } = createApp({ ...server.dependencies, config });
  const off = createServer(app);
  await new Promise<void>((resolve) => off.listen(0, '127.0.0.1', resolve));
  try {
    const session = (await call(supertest.agent(off), 'get', '/api/session')).body as Session;
    expect(session).toEqual({ state: 'signed out', demo: [] });
    const { email, password } = analyst ?? {};
    await call(supertest.agent(off), 'post', '/api/session', { email, password }).expect(403);
    const cookies = await call(inside, 'post', '/api/session/refresh').expect(200);
    const kept = (cookies.headers['set-cookie'] as unknown as string[])
      .map((line) => line.split(';')[0])
      .join('; ');
    await call(supertest.agent(off), 'get', '/api/studies').set('cookie', kept).expect(401);
    await call(supertest.agent(off), 'post', '/api/session/refresh').set('cookie', kept).expect(401);
  } finally {
    off.closeAllConnections();
    off.close();
  }
});

test('a demonstration stopped half way leaves the database empty', async () => {
  const fresh = await startTestServer();
  try {
    const stop = (text: string): void => {
      if (text.includes('log 2 of')) throw new Error('stopped');
    };
    await expect(seedDemo(fresh.dependencies, stop)).rejects.toThrow('stopped');
    const session = await call(fresh.stranger(), 'get', '/api/session').expect(200);
    expect(session.body).toEqual({ state: 'first run' });
  } finally {
    await fresh.stop();
  }
});
