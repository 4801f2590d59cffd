import type { ReRun, Study, Verdict, Waiting } from '../../shared/contracts';
import { balancedDrops, dropLogs, makeStudy } from './support/logs';
import { call, startTestServer, type Agent, type TestServer } from './support/test-server';

let server: TestServer;
let analyst: Agent;
let auditor: Agent;
let administrator: Agent;
let study: Study;
let verdict: Verdict;
let studies = 0;

beforeAll(async () => {
  server = await startTestServer();
  const teamId = await server.addTeam('Team of the audit');
  analyst = await server.signedIn(teamId, 'analyst');
  auditor = await server.signedIn(teamId, 'auditor');
  administrator = await server.signedIn(teamId, 'administrator');
});

beforeEach(async () => {
  studies += 1;
  study = await makeStudy(analyst, administrator, `Audit ${studies}`);
  const drops = balancedDrops(study, -1, { seed: studies });
  const window = { from: 200, to: 700, reason: 'the room door was open before' };
  await dropLogs(
    analyst,
    study.id,
    drops.map((drop, index) =>
      index === 3 ? { ...drop, assignment: { ...drop.assignment, window } } : drop,
    ),
  );
  const body = { conditionId: study.conditions[0]?.id, metric: 'rise' };
  verdict = (await call(analyst, 'post', `/api/studies/${study.id}/verdicts`, body).expect(200))
    .body as Verdict;
});

afterAll(() => server.stop());

const reRun = async (): Promise<ReRun> =>
  (await call(auditor, 'post', `/api/verdicts/${verdict.id}/re-run`).expect(200)).body as ReRun;

const sql = (text: string, values: unknown[] = []): Promise<unknown> => server.db.query(text, values);

const ofLog = `log_id = (select l.id from logs l where l.digest = $1)`;

test('from the stored bytes the verdict comes out the same, bit for bit, and the record says who checked', async () => {
  const result = await reRun();
  expect(result).toMatchObject({ result: 'identical', logsRead: 6, differences: [], reason: null });
  // 6 runs of 13 fields and the judgement's own: a comparison of a handful would be none.
  expect(result.fieldsCompared).toBeGreaterThan(100);
  const after = (await call(auditor, 'get', `/api/verdicts/${verdict.id}`)).body as Verdict;
  expect(after.lastReRun).toMatchObject({ result: 'identical', by: result.by });
  expect(after.steps.at(-1)).toMatchObject({ action: 're-run', role: 'auditor', comment: 'identical' });
});

test('it still does after the study went on: runs left out, moved, and thresholds changed', async () => {
  const path = `/api/studies/${study.id}/runs`;
  const { runs } = (await call(analyst, 'get', path)).body as { runs: { id: string }[] };
  await call(analyst, 'patch', path, { runIds: [runs[0]?.id], leaveOut: { reason: 'too warm' } }).expect(200);
  await call(analyst, 'patch', path, { runIds: [runs[1]?.id], coolerId: study.coolers[1]?.id }).expect(200);
  expect((await reRun()).result).toBe('identical');
});

test('a verdict made with a run left out comes out the same with it left out', async () => {
  const path = `/api/studies/${study.id}/runs`;
  const { runs } = (await call(analyst, 'get', path)).body as { runs: { id: string }[] };
  await call(analyst, 'patch', path, { runIds: [runs[0]?.id], leaveOut: { reason: 'too warm' } }).expect(200);
  const body = { conditionId: study.conditions[0]?.id, metric: 'rise' };
  verdict = (await call(analyst, 'post', `/api/studies/${study.id}/verdicts`, body).expect(200))
    .body as Verdict;
  await call(analyst, 'patch', path, { runIds: [runs[0]?.id], leaveOut: null }).expect(200);
  expect((await reRun()).result).toBe('identical');
});

test('a stored result changed in its last digit differs, and the path and both values are shown', async () => {
  const gap = verdict.judgement.pairs[0]?.gap ?? 0;
  const changed = gap * (1 + 2 ** -52);
  expect(changed).not.toBe(gap);
  await sql(
    `update verdicts set judgement = jsonb_set(judgement, '{pairs,0,gap}', $2::text::jsonb) where id = $1`,
    [verdict.id, String(changed)],
  );
  const result = await reRun();
  expect(result.result).toBe('differs');
  expect(result.differences).toEqual([
    { path: 'judgement.pairs[0].gap', stored: String(changed), reRun: String(gap) },
  ]);
  const { roles } = (await call(auditor, 'get', '/api/waiting')).body as Waiting;
  const differing = roles[0]?.groups.find(({ code }) => code === 'differs')?.items ?? [];
  expect(differing.map((item) => item.kind === 'verdict' && item.verdict.id)).toContain(verdict.id);
});

test('a stored input changed differs too, down to a run’s value', async () => {
  await sql(
    `update verdicts set input = jsonb_set(input, '{coolers,0,mounts,0,runs,0,value}', '12.5') where id = $1`,
    [verdict.id],
  );
  const result = await reRun();
  expect(result.result).toBe('differs');
  expect(result.differences[0]).toMatchObject({
    path: 'input.coolers[0].mounts[0].runs[0].value',
    stored: '12.5',
  });
});

test('a raw file altered by one bit can’t be re-run, and the file is named', async () => {
  const [log] = verdict.logs;
  await sql(`update log_parts set bytes = set_bit(bytes, 4000, 1 - get_bit(bytes, 4000)) where ${ofLog}`, [
    log?.digest,
  ]);
  const result = await reRun();
  expect(result).toMatchObject({ result: "can't re-run", differences: [] });
  expect(result.reason).toMatch(log?.fileName ?? 'no log');
});

test('a raw file that is gone can’t be re-run either', async () => {
  const log = verdict.logs.at(-1);
  await sql(`delete from log_parts where ${ofLog}`, [log?.digest]);
  const result = await reRun();
  expect(result.result).toBe("can't re-run");
  expect(result.reason).toMatch(log?.fileName ?? 'no log');
});

test('a method this engine does not have can’t be re-run', async () => {
  await sql(`update verdicts set method = 'tea-leaves/1' where id = $1`, [verdict.id]);
  const result = await reRun();
  expect(result.result).toBe("can't re-run");
  expect(result.reason).toMatch('tea-leaves/1');
});
