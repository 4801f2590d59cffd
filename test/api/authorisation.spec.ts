import type { Role } from '../../shared/contracts';
import { balancedDrops, dropLogs, makeStudy } from './support/logs';
import { call, startTestServer, type Agent, type TestServer } from './support/test-server';

const ROLES: readonly Role[] = ['analyst', 'lead', 'auditor', 'administrator'];
const EVERY = ROLES;

/**
 * Who may call what, written down a second time on purpose: a route that is added, or opened to someone else, must be
 * changed here too.
 */
const TABLE: Record<string, 'public' | readonly Role[]> = {
  'get /api/health': 'public',
  'get /api/session': 'public',
  'post /api/session': 'public',
  'post /api/session/refresh': 'public',
  'delete /api/session': 'public',
  'post /api/first-run': 'public',
  'post /api/invitations/accept': 'public',
  'put /api/account/password': EVERY,
  'get /api/people': ['administrator'],
  'post /api/people': ['administrator'],
  'patch /api/people/:id': ['administrator'],
  'post /api/people/:id/invite': ['administrator'],
  'get /api/outbox': ['administrator'],
  'get /api/benches': EVERY,
  'post /api/benches': ['administrator'],
  'get /api/benches/:id/noise': EVERY,
  'get /api/coolers': EVERY,
  'post /api/coolers': ['analyst', 'lead'],
  'get /api/studies': EVERY,
  'post /api/studies': ['analyst'],
  'get /api/studies/:id': EVERY,
  'get /api/studies/:id/runs': EVERY,
  'post /api/studies/:id/runs': ['analyst'],
  'patch /api/studies/:id/runs': ['analyst'],
  'get /api/runs/:id/log': EVERY,
  'post /api/studies/:id/verdicts': ['analyst'],
  'get /api/verdicts': EVERY,
  'get /api/verdicts/:id': EVERY,
  'get /api/verdicts/:id/export': EVERY,
  'post /api/verdicts/:id/submit': ['analyst'],
  'post /api/verdicts/:id/sign-off': ['lead'],
  'post /api/verdicts/:id/send-back': ['lead'],
  'post /api/verdicts/:id/withdraw': ['lead'],
  'post /api/verdicts/:id/re-run': ['auditor', 'lead'],
  'get /api/thresholds': EVERY,
  'post /api/thresholds': ['lead'],
  'get /api/waiting': EVERY,
  'get /api/ledger': ['auditor', 'lead', 'administrator'],
  'get /api/ledger/check': ['auditor', 'lead', 'administrator'],
};

const entries = Object.entries(TABLE);
const closed = entries.filter(([, who]) => who !== 'public');

let server: TestServer;
let agents: Record<Role, Agent>;
let others: Record<Role, Agent>;
/** Something of the first team behind each kind of path. */
const ids: Record<string, string> = {};

const oneOfEach = async (teamId: string): Promise<Record<Role, Agent>> => ({
  analyst: await server.signedIn(teamId, 'analyst'),
  lead: await server.signedIn(teamId, 'lead'),
  auditor: await server.signedIn(teamId, 'auditor'),
  administrator: await server.signedIn(teamId, 'administrator'),
});

beforeAll(async () => {
  server = await startTestServer();
  const teamId = await server.addTeam('Team of the table');
  agents = await oneOfEach(teamId);
  others = await oneOfEach(await server.addTeam('Another team'));
  const study = await makeStudy(agents.analyst, agents.administrator, 'Study of the table');
  await dropLogs(agents.analyst, study.id, balancedDrops(study, -1)).then((answer) => {
    ids['runs'] = (answer.body as { outcomes: { run: { id: string } }[] }).outcomes[0]?.run.id ?? '';
  });
  const judged = await call(agents.analyst, 'post', `/api/studies/${study.id}/verdicts`, {
    conditionId: study.conditions[0]?.id,
    metric: 'rise',
  }).expect(200);
  ids['studies'] = study.id;
  ids['benches'] = study.bench.id;
  ids['verdicts'] = (judged.body as { id: string }).id;
  ids['people'] = (await server.addAccount(teamId, ['analyst'])).id;
});

afterAll(() => server.stop());

function ask(agent: Agent, stated: string, id?: string): ReturnType<typeof call> {
  const [method = '', path = ''] = stated.split(' ');
  const kind = path.split('/')[2] ?? '';
  return call(agent, method as 'get', path.replace(':id', id ?? ids[kind] ?? ''));
}

const codeOf = (answer: { body: unknown }): string => (answer.body as { code: string }).code;

test('the server has the routes of the table and no other', () => {
  const mounted = server.routes.map(({ method, path, who }) => [
    `${method} ${path}`,
    who === 'any' ? EVERY : who,
  ]);
  expect(Object.fromEntries(mounted)).toEqual(TABLE);
  expect(mounted).toHaveLength(entries.length);
});

test.each(closed)('%s without signing in asks to sign in', async (stated) => {
  const answer = await ask(server.stranger(), stated);
  expect(answer.status).toBe(401);
  expect(codeOf(answer)).toBe('session-expired');
});

const pairs = closed.flatMap(([stated, who]) => ROLES.map((role) => ({ stated, who, role })));

test.each(pairs.filter(({ who, role }) => !who.includes(role)))(
  '$stated is closed to the $role',
  async ({ stated, role }) => {
    const answer = await ask(agents[role], stated);
    expect(answer.status).toBe(403);
    expect(codeOf(answer)).toBe('not-allowed');
  },
);

test.each(pairs.filter(({ who, role }) => who.includes(role)))(
  '$stated is open to the $role',
  async ({ stated, role }) => {
    const answer = await ask(agents[role], stated);
    // Without a body many are told what is missing; none is turned away.
    expect([200, 204, 409, 422]).toContain(answer.status);
  },
);

test.each(pairs.filter(({ stated, who, role }) => stated.includes(':id') && who.includes(role)))(
  '$stated of another team does not exist for the $role',
  async ({ stated, role }) => {
    const [method = '', path = ''] = stated.split(' ');
    const kind = path.split('/')[2] ?? '';
    const bodies: Record<string, object> = {
      'patch /api/people/:id': { stopped: true },
      'patch /api/studies/:id/runs': { runIds: [ids['runs']], leaveOut: { reason: 'not ours' } },
      'post /api/studies/:id/verdicts': { conditionId: ids['studies'], metric: 'rise' },
      'post /api/verdicts/:id/submit': {},
      'post /api/verdicts/:id/sign-off': {},
      'post /api/verdicts/:id/send-back': { comment: 'not ours' },
      'post /api/verdicts/:id/withdraw': { reason: 'not ours' },
    };
    const request = call(others[role], method as 'get', path.replace(':id', ids[kind] ?? ''));
    const answer =
      stated === 'post /api/studies/:id/runs'
        ? await dropLogs(others[role], ids['studies'] ?? '', [
            {
              fileName: 'a.csv',
              bytes: Buffer.from('a'),
              assignment: {
                coolerId: ids['studies'] ?? '',
                conditionId: ids['studies'] ?? '',
                mount: null,
                run: '1',
                order: null,
                columnMap: null,
                fixedAmbient: null,
                window: null,
              },
            },
          ])
        : await request.send(bodies[stated]);
    expect(answer.status).toBe(404);
    expect(codeOf(answer)).toBe('not-found');
  },
);

test('lists of another team show nothing of this one', async () => {
  const seen = await Promise.all(
    ['/api/studies', '/api/verdicts', '/api/benches', '/api/coolers', '/api/waiting'].map((path) =>
      call(others.analyst, 'get', path).expect(200),
    ),
  );
  const people = await call(others.administrator, 'get', '/api/people').expect(200);
  const outbox = await call(others.administrator, 'get', '/api/outbox').expect(200);
  const ledger = await call(others.auditor, 'get', '/api/ledger').expect(200);
  const text = JSON.stringify([...seen, people, outbox, ledger].map(({ body }) => body as unknown));
  expect(text).not.toContain('Study of the table');
  expect(text).not.toContain('Bench of');
  expect(text).not.toContain('Coated fins');
  for (const id of Object.values(ids)) expect(text).not.toContain(id);
});

test.each(['get', 'post', 'put', 'patch', 'delete'] as const)(
  '%s of a path that is not there is a problem',
  async (method) => {
    const answer = await call(agents.administrator, method, '/api/nothing/here');
    expect(answer.status).toBe(404);
    expect(answer.headers['content-type']).toMatch('application/problem+json');
  },
);

test('an id that is no id is not there', async () => {
  await ask(agents.analyst, 'get /api/studies/:id', 'not-an-id').expect(404);
});
