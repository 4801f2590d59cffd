import { readdirSync } from 'node:fs';
import { tmpdir } from 'node:os';
import type { IntakeOutcome, Run, Study } from '../../shared/contracts';
import { dropLogs, logOf, makeStudy, place, sha256, type Drop } from './support/logs';
import { call, startTestServer, type Agent, type TestServer } from './support/test-server';

let server: TestServer;
let analyst: Agent;
let administrator: Agent;
let study: Study;
let studies = 0;

beforeAll(async () => {
  server = await startTestServer();
  const teamId = await server.addTeam('Team of the intake');
  analyst = await server.signedIn(teamId, 'analyst');
  administrator = await server.signedIn(teamId, 'administrator');
});

beforeEach(async () => {
  studies += 1;
  study = await makeStudy(analyst, administrator, `Intake ${studies}`);
});

afterAll(() => server.stop());

const drop = (fileName: string, bytes: Buffer, more: Partial<Drop['assignment']> = {}): Drop => ({
  fileName,
  bytes,
  assignment: { ...place(study, 0, 'Mount 1', '1', 1), ...more },
});

const outcomesOf = (answer: { body: unknown }): IntakeOutcome[] =>
  (answer.body as { outcomes: IntakeOutcome[] }).outcomes;

async function runs(): Promise<Run[]> {
  return ((await call(analyst, 'get', `/api/studies/${study.id}/runs`).expect(200)).body as { runs: Run[] })
    .runs;
}

test('a log is stored with the server’s own numbers, and its bytes come back unchanged under its name', async () => {
  const bytes = logOf(40, 7);
  const [outcome] = outcomesOf(await dropLogs(analyst, study.id, [drop('Lüfter №1, "α".csv', bytes)]));
  if (outcome?.outcome !== 'stored') throw new Error(JSON.stringify(outcome));
  const { run } = outcome;
  expect(run).toMatchObject({
    fileName: 'Lüfter №1, "α".csv',
    digest: sha256(bytes),
    bytes: bytes.length,
    mount: 'Mount 1',
  });
  // Made to settle 40 °C over ambient; the scatter of single readings is 0.1 °C.
  expect(run.summary.rise).toBeGreaterThan(39.9);
  expect(run.summary.rise).toBeLessThan(40.1);
  expect(await runs()).toEqual([run]);
  const log = await call(analyst, 'get', `/api/runs/${run.id}/log`).buffer().expect(200);
  expect(sha256(Buffer.from(log.text ?? log.body))).toBe(sha256(bytes));
  expect(log.headers['content-disposition']).toMatch(/^attachment; .*filename\*=UTF-8''L%C3%BCfter/);
});

test('one bad file is refused with what is wrong and spoils no other', async () => {
  const answer = await dropLogs(analyst, study.id, [
    drop('good.csv', logOf(40, 1)),
    drop('empty.csv', Buffer.from('')),
    drop('prose.csv', Buffer.from('This is not a log.\nIt has no columns.\n')),
    drop('elsewhere.csv', logOf(41, 2), { coolerId: study.id }),
    drop('also-good.csv', logOf(40.2, 3), { run: '2' }),
  ]);
  const outcomes = outcomesOf(answer.status === 200 ? answer : { body: { outcomes: [] } });
  expect(outcomes.map(({ fileName, outcome }) => [fileName, outcome])).toEqual([
    ['good.csv', 'stored'],
    ['empty.csv', 'refused'],
    ['prose.csv', 'refused'],
    ['elsewhere.csv', 'refused'],
    ['also-good.csv', 'stored'],
  ]);
  for (const outcome of outcomes)
    if (outcome.outcome === 'refused') {
      expect(outcome.problems[0]?.file).toBe(outcome.fileName);
      expect(outcome.problems[0]?.text.length).toBeGreaterThan(10);
    }
  expect((await runs()).map(({ fileName }) => fileName)).toEqual(['good.csv', 'also-good.csv']);
  expect(server.reports).toEqual([]);
});

test('the same bytes twice in a study are one run, in one drop, in two, and in two at once', async () => {
  const bytes = logOf(40, 4);
  const inOne = await dropLogs(analyst, study.id, [drop('first.csv', bytes), drop('again.csv', bytes)]);
  expect(outcomesOf(inOne).map(({ outcome }) => outcome)).toEqual(['stored', 'already stored']);
  const other = logOf(40, 5);
  const atOnce = await Promise.all(
    [1, 2, 3].map(() => dropLogs(analyst, study.id, [drop('first.csv', bytes), drop('other.csv', other)])),
  );
  const all = atOnce.flatMap(outcomesOf);
  expect(all.filter(({ outcome }) => outcome === 'stored')).toHaveLength(1);
  expect(all.filter(({ outcome }) => outcome === 'already stored')).toHaveLength(5);
  expect(await runs()).toHaveLength(2);
});

test('the same log in two studies is two runs on bytes stored once', async () => {
  const bytes = logOf(40, 6);
  await dropLogs(analyst, study.id, [drop('shared.csv', bytes)]);
  const first = await runs();
  study = await makeStudy(analyst, administrator, 'Intake, second study');
  const [outcome] = outcomesOf(await dropLogs(analyst, study.id, [drop('shared.csv', bytes)]));
  expect(outcome?.outcome).toBe('stored');
  expect((await runs())[0]?.summary).toEqual(first[0]?.summary);
  const logs = await server.db.query<unknown[]>('select id from logs where digest = $1', [sha256(bytes)]);
  expect(logs).toHaveLength(1);
});

test('a log of several megabytes is stored in parts and read back whole', async () => {
  const padding = `${'x'.repeat(16000)}`;
  const rows = logOf(40, 8).toString().trimEnd().split('\n');
  const bytes = Buffer.from(rows.map((row, index) => `${row},${index === 0 ? 'Note' : padding}`).join('\n'));
  expect(bytes.length).toBeGreaterThan(2 * 1024 * 1024);
  const [outcome] = outcomesOf(await dropLogs(analyst, study.id, [drop('long.csv', bytes)]));
  if (outcome?.outcome !== 'stored') throw new Error(JSON.stringify(outcome));
  const log = await call(analyst, 'get', `/api/runs/${outcome.run.id}/log`).buffer().expect(200);
  expect(sha256(Buffer.from(log.text ?? log.body))).toBe(sha256(bytes));
  const parts = await server.db.query<{ size: number }[]>(
    'select length(bytes) as size from log_parts p join logs l on l.id = p.log_id where l.digest = $1 order by part',
    [sha256(bytes)],
  );
  expect(parts.map(({ size }) => size)).toEqual([1048576, 1048576, bytes.length - 2 * 1048576]);
});

test('every file and every assignment gets an answer: bytes that changed on the way, and files nobody assigned', async () => {
  const [assigned, unassigned] = [logOf(40, 9), logOf(40, 10)];
  const assignment = { fileName: 'a.csv', digest: sha256(unassigned), ...drop('a.csv', assigned).assignment };
  const answer = await call(analyst, 'post', `/api/studies/${study.id}/runs`)
    .field('assignments', JSON.stringify([assignment]))
    .attach('files', assigned, 'a.csv');
  const codes = outcomesOf(answer).map((one) =>
    one.outcome === 'refused' ? one.problems[0]?.code : one.outcome,
  );
  expect(codes).toEqual(['not received', 'not assigned']);
  expect(await runs()).toEqual([]);
});

test.each([
  ['no assignments', undefined],
  ['assignments that are no JSON', 'cooler 1'],
  ['an empty list', '[]'],
  ['an entry with a missing field', '[{"fileName":"a.csv"}]'],
])('an upload with %s is refused as a whole', async (_name, assignments) => {
  const request = call(analyst, 'post', `/api/studies/${study.id}/runs`);
  if (assignments !== undefined) request.field('assignments', assignments);
  await request.attach('files', logOf(40, 11), 'a.csv').expect(422);
  expect(await runs()).toEqual([]);
});

test('nothing of an upload stays on the server’s disk', async () => {
  const folders = (): string[] =>
    readdirSync(tmpdir()).filter((name) => /^tenthmark-[A-Za-z0-9]{6}$/.test(name));
  const before = folders();
  await dropLogs(analyst, study.id, [drop('good.csv', logOf(40, 12)), drop('bad.csv', Buffer.from('no'))]);
  await call(analyst, 'post', `/api/studies/${study.id}/runs`)
    .attach('unexpected', Buffer.from('x'), 'x.csv')
    .expect(422);
  await new Promise((resolve) => setTimeout(resolve, 100));
  expect(folders().filter((name) => !before.includes(name))).toEqual([]);
});

test('a window set by hand and an ambient fixed by hand are part of the record', async () => {
  const noAmbient = Buffer.from(
    [
      'Time (s),Heat source (°C)',
      ...Array.from({ length: 700 }, (_, second) => `${second},${(60 + (second % 3) / 10).toFixed(1)}`),
    ].join('\n'),
  );
  const [without] = outcomesOf(await dropLogs(analyst, study.id, [drop('no-ambient.csv', noAmbient)]));
  expect(without?.outcome).toBe('refused');
  const window = { from: 300, to: 600, reason: 'the fan was still speeding up before' };
  const [outcome] = outcomesOf(
    await dropLogs(analyst, study.id, [drop('no-ambient.csv', noAmbient, { fixedAmbient: 20, window })]),
  );
  if (outcome?.outcome !== 'stored') throw new Error(JSON.stringify(outcome));
  expect(outcome.run.summary.window).toMatchObject({ setBy: 'hand', reason: window.reason });
  expect(outcome.run.summary.rise).toBeCloseTo(40.1, 2);
});

test('runs are left out with a reason, put back, and moved; all or none', async () => {
  await dropLogs(analyst, study.id, [
    drop('a.csv', logOf(40, 13)),
    drop('b.csv', logOf(40, 14), { run: '2' }),
  ]);
  const path = `/api/studies/${study.id}/runs`;
  const [a, b] = await runs();
  const runIds = [a?.id, b?.id];
  const out = await call(analyst, 'patch', path, { runIds, leaveOut: { reason: 'the pump stopped' } }).expect(
    200,
  );
  const changed = (out.body as { runs: Run[] }).runs;
  expect(changed.map(({ leftOut }) => leftOut?.reason)).toEqual(['the pump stopped', 'the pump stopped']);
  await call(analyst, 'patch', path, { runIds: [a?.id], leaveOut: { reason: ' ' } }).expect(422);
  await call(analyst, 'patch', path, { runIds: [a?.id], leaveOut: null }).expect(200);
  const other = study.coolers[1]?.id;
  await call(analyst, 'patch', path, { runIds: [a?.id, study.id], coolerId: other }).expect(404);
  const after = await runs();
  expect(after.find(({ id }) => id === a?.id)).toMatchObject({ leftOut: null, coolerId: a?.coolerId });
  await call(analyst, 'patch', path, { runIds: [a?.id], coolerId: other, mount: null }).expect(200);
  expect((await runs()).find(({ id }) => id === a?.id)).toMatchObject({ coolerId: other, mount: null });
});

test('bytes altered in the database are not handed out as the record', async () => {
  const bytes = logOf(40, 15);
  await dropLogs(analyst, study.id, [drop('a.csv', bytes)]);
  const [run] = await runs();
  await server.db.query(
    `update log_parts set bytes = set_bit(bytes, 4000, 1 - get_bit(bytes, 4000)) where log_id = (select id from logs where digest = $1)`,
    [sha256(bytes)],
  );
  const answer = await call(analyst, 'get', `/api/runs/${run?.id ?? ''}/log`).expect(409);
  expect((answer.body as { code: string }).code).toBe('log-altered');
});
