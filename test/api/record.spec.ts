import { createHash } from 'node:crypto';
import type { LedgerCheck, LedgerEntry, ThresholdsHistory } from '../../shared/contracts';
import { makeStudy } from './support/logs';
import { call, startTestServer, type Agent, type TestServer } from './support/test-server';

let server: TestServer;
let lead: Agent;
let auditor: Agent;
let teamId: string;

beforeAll(async () => {
  server = await startTestServer();
});

beforeEach(async () => {
  teamId = await server.addTeam('Team of the record');
  lead = await server.signedIn(teamId, 'lead', 'analyst', 'administrator');
  auditor = await server.signedIn(teamId, 'auditor');
});

afterAll(() => server.stop());

const VALUES = { confidence: 0.95, power: 0.8, gapThatMatters: 0.3 };

const change = (basedOn: number, gapThatMatters = 0.3): ReturnType<typeof call> =>
  call(lead, 'post', '/api/thresholds', {
    basedOn,
    values: { ...VALUES, gapThatMatters },
    reason: 'buyers ask for smaller gaps',
  });

const check = async (): Promise<LedgerCheck> =>
  (await call(auditor, 'get', '/api/ledger/check').expect(200)).body as LedgerCheck;

const entries = async (): Promise<LedgerEntry[]> =>
  ((await call(auditor, 'get', '/api/ledger?pageSize=200').expect(200)).body as { items: LedgerEntry[] })
    .items;

test('thresholds are numbered sets that never change; the newest is in force', async () => {
  const history = (await change(1).expect(200)).body as ThresholdsHistory;
  expect(history.current).toMatchObject({ number: 2, values: VALUES, reason: 'buyers ask for smaller gaps' });
  expect(history.versions.map(({ number, values }) => [number, values.gapThatMatters])).toEqual([
    [2, 0.3],
    [1, 0.5],
  ]);
});

test('who looked at an older set does not overwrite a newer one, also at the same moment', async () => {
  const answers = await Promise.all([change(1, 0.3), change(1, 0.4), change(1, 0.6)]);
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409, 409]);
  const late = await change(1).expect(409);
  expect((late.body as { code: string }).code).toBe('thresholds-changed');
  expect(((await call(lead, 'get', '/api/thresholds')).body as ThresholdsHistory).versions).toHaveLength(2);
});

test.each([
  ['confidence', 1],
  ['confidence', 0.4],
  ['power', 0],
  ['gapThatMatters', 0],
])('a %s of %s is refused, naming the field', async (field, value) => {
  const body = { basedOn: 1, values: { ...VALUES, [field]: value }, reason: 'trying' };
  const answer = await call(lead, 'post', '/api/thresholds', body).expect(422);
  expect((answer.body as { fields: { path: string }[] }).fields[0]?.path).toBe(`values.${field}`);
});

test('the ledger is a chain that anyone can recompute from what they are shown', async () => {
  await change(1).expect(200);
  await makeStudy(lead, lead, `Recorded ${teamId}`);
  const chain = (await entries()).reverse();
  expect(chain.map(({ action }) => action)).toEqual([
    'thresholds put in force',
    'thresholds put in force',
    'bench added',
    'study made',
  ]);
  // RFC 8785 for these entries, written out again: keys sorted, no spaces; their numbers print alike in JSON.
  const canonical = (value: unknown): string => {
    if (Array.isArray(value)) return `[${value.map(canonical).join(',')}]`;
    if (value === null || typeof value !== 'object') return JSON.stringify(value);
    const members = Object.entries(value).sort(([one], [other]) => (one < other ? -1 : 1));
    return `{${members.map(([name, member]) => `${JSON.stringify(name)}:${canonical(member)}`).join(',')}}`;
  };
  let previous: string | null = null;
  for (const { digest, ...entry } of chain) {
    expect(entry.previous).toBe(previous);
    expect(createHash('sha256').update(canonical(entry)).digest('hex')).toBe(digest);
    previous = digest;
  }
  expect(await check()).toMatchObject({ entries: 4, whole: true, brokenAt: null, latestDigest: previous });
});

test.each([
  ['a changed text', `update ledger_entries set by = 'someone else' where team_id = $1 and number = 2`, 2],
  [
    'a changed number inside',
    `update ledger_entries set content = jsonb_set(content, '{values,power}', '0.81') where team_id = $1 and number = 2`,
    2,
  ],
  [
    'a changed time',
    `update ledger_entries set at = at - interval '1 ms' where team_id = $1 and number = 3`,
    3,
  ],
  ['a digest made up', `update ledger_entries set digest = 'made up' where team_id = $1 and number = 4`, 4],
  ['a removed entry', `delete from ledger_entries where team_id = $1 and number = 2`, 2],
  [
    'two entries swapped',
    `update ledger_entries set number = case number when 2 then 103 else 102 end where team_id = $1 and number in (2, 3)`,
    2,
  ],
])('%s is found, and where', async (_name, tampering, brokenAt) => {
  for (const basedOn of [1, 2, 3]) await change(basedOn, 0.3 + basedOn / 10).expect(200);
  expect(await check()).toMatchObject({ entries: 4, whole: true });
  await server.db.query(tampering, [teamId]);
  await server.db.query(
    'update ledger_entries set number = number - 100 where team_id = $1 and number > 100',
    [teamId],
  );
  expect(await check()).toMatchObject({ whole: false, brokenAt });
  // What was tampered with is still there to be looked at.
  expect(await entries()).not.toEqual([]);
});

test('many acts at once make one unbroken chain', async () => {
  const made = await Promise.all(
    Array.from({ length: 12 }, (_, index) => call(lead, 'post', '/api/benches', { name: `Bench ${index}` })),
  );
  expect(made.every(({ status }) => status === 200)).toBe(true);
  expect(await check()).toMatchObject({ entries: 13, whole: true });
});

test('an act that fails leaves no entry', async () => {
  await call(lead, 'post', '/api/benches', { name: 'Bench' }).expect(200);
  await call(lead, 'post', '/api/benches', { name: 'BENCH' }).expect(422);
  expect(await check()).toMatchObject({ entries: 2, whole: true });
});
