import type { Outbox, Study, Verdict, Waiting } from '../../shared/contracts';
import { balancedDrops, dropLogs, logOf, makeStudy, place } from './support/logs';
import { call, startTestServer, type Agent, type TestServer } from './support/test-server';

let server: TestServer;
let teamId: string;
let analyst: Agent;
let lead: Agent;
let administrator: Agent;
let studies = 0;

beforeAll(async () => {
  server = await startTestServer();
  teamId = await server.addTeam('Team of the verdicts');
  analyst = await server.signedIn(teamId, 'analyst');
  lead = await server.signedIn(teamId, 'lead');
  administrator = await server.signedIn(teamId, 'administrator');
});

afterAll(() => server.stop());

const codeOf = (answer: { body: unknown }): string => (answer.body as { code: string }).code;
const verdictOf = (answer: { body: unknown }): Verdict => answer.body as Verdict;

async function filledStudy(by = analyst, runs = 1): Promise<Study> {
  studies += 1;
  const study = await makeStudy(by, administrator, `Life ${studies}`);
  await dropLogs(by, study.id, balancedDrops(study, -1, { runs }));
  return study;
}

const judge = (study: Study, by = analyst, metric = 'rise'): ReturnType<typeof call> =>
  call(by, 'post', `/api/studies/${study.id}/verdicts`, { conditionId: study.conditions[0]?.id, metric });

async function judged(by = analyst): Promise<{ study: Study; verdict: Verdict }> {
  const study = await filledStudy(by);
  return { study, verdict: verdictOf(await judge(study, by).expect(200)) };
}

const act = (agent: Agent, verdict: Verdict, what: string, body: object = {}): ReturnType<typeof call> =>
  call(agent, 'post', `/api/verdicts/${verdict.id}/${what}`, body);

async function submitted(): Promise<{ study: Study; verdict: Verdict }> {
  const { study, verdict } = await judged();
  return { study, verdict: verdictOf(await act(analyst, verdict, 'submit').expect(200)) };
}

async function leaveOneOut(study: Study): Promise<string> {
  const path = `/api/studies/${study.id}/runs`;
  const { runs } = (await call(analyst, 'get', path).expect(200)).body as { runs: { id: string }[] };
  const runIds = [runs[0]?.id];
  await call(analyst, 'patch', path, { runIds, leaveOut: { reason: 'a draught was noticed' } }).expect(200);
  return runs[0]?.id ?? '';
}

test('a verdict holds its evidence: runs by cooler, mount and order, the reference last, digests of the logs', async () => {
  const study = await filledStudy(analyst, 2);
  const verdict = verdictOf(await judge(study).expect(200));
  expect(verdict).toMatchObject({
    state: 'judged',
    metric: 'rise',
    unit: '°C',
    stale: false,
    thresholdsNumber: 1,
  });
  expect(verdict.input.coolers.map(({ name }) => name)).toEqual(['Coated fins', 'Bare fins']);
  expect(
    verdict.input.coolers[0]?.mounts.map(({ name, runs }) => [name, runs.map(({ order }) => order)]),
  ).toEqual([
    ['Mount 1', [1, 2]],
    ['Mount 2', [5, 6]],
    ['Mount 3', [9, 10]],
  ]);
  const { runs } = (await call(analyst, 'get', `/api/studies/${study.id}/runs`)).body as {
    runs: { digest: string; summary: { rise: number } }[];
  };
  const judgedRuns = verdict.input.coolers.flatMap(({ mounts }) => mounts.flatMap((mount) => mount.runs));
  expect(judgedRuns.map(({ digest, value }) => [digest, value])).toEqual(
    runs.map(({ digest, summary }) => [digest, summary.rise]),
  );
  expect(verdict.logs.map(({ digest }) => digest)).toEqual(runs.map(({ digest }) => digest));
  // Logs were made 1 °C apart; mounts scatter by some tenths.
  const [pair] = verdict.judgement.pairs;
  expect(pair?.gap).toBeGreaterThan(-1.6);
  expect(pair?.gap).toBeLessThan(-0.4);
  expect(verdict.pairs[0]).toMatchObject({ gap: pair?.gap, headline: verdict.judgement.words[0]?.headline });
});

test('judged again with nothing changed it is the same verdict, also by two who ask at once', async () => {
  const study = await filledStudy();
  const answers = await Promise.all([judge(study), judge(study), judge(study)]);
  const ids = answers.map((answer) => verdictOf(answer).id);
  expect(new Set(ids).size).toBe(1);
  await leaveOneOut(study);
  const fresh = verdictOf(await judge(study).expect(200));
  expect(fresh.id).not.toBe(ids[0]);
  expect(fresh.input.leftOut.map(({ reason }) => reason)).toEqual(['a draught was noticed']);
});

test('a condition with a cooler that has no runs is not judged, and the answer names the cooler', async () => {
  studies += 1;
  const study = await makeStudy(analyst, administrator, `Life ${studies}`);
  await dropLogs(analyst, study.id, [
    { fileName: 'a.csv', bytes: logOf(40, 1), assignment: place(study, 0, null, '1', 1) },
  ]);
  const answer = await judge(study).expect(422);
  expect(codeOf(answer)).toBe('cooler-without-runs');
  expect((answer.body as { detail: string }).detail).toMatch('Bare fins');
});

test('resistance is not judged from runs without watts, and the answer names the logs', async () => {
  studies += 1;
  const study = await makeStudy(analyst, administrator, `Life ${studies}`);
  await dropLogs(analyst, study.id, [
    { fileName: 'with.csv', bytes: logOf(40, 1), assignment: place(study, 0, null, '1', 1) },
    {
      fileName: 'without.csv',
      bytes: logOf(41, 2, { watts: false }),
      assignment: place(study, 1, null, '1', 2),
    },
  ]);
  const answer = await judge(study, analyst, 'resistance').expect(422);
  expect(codeOf(answer)).toBe('no-watts');
  expect((answer.body as { detail: string }).detail).toMatch('without.csv');
});

test('submitted, sent back with a comment, answered, signed off: each step with who, when and why', async () => {
  const { verdict } = await judged();
  expect(verdict.may).toMatchObject({ submit: true, signOff: false });
  await act(lead, verdict, 'sign-off').expect(409);
  await act(analyst, verdict, 'submit', { comment: 'ready' }).expect(200);
  await act(lead, verdict, 'send-back', { comment: '' }).expect(422);
  await act(lead, verdict, 'send-back', { comment: 'Was mount 2 torqued?' }).expect(200);
  await act(analyst, verdict, 'submit', { comment: 'It was, see the sheet.' }).expect(200);
  const signed = verdictOf(await act(lead, verdict, 'sign-off').expect(200));
  expect(signed.state).toBe('signed off');
  expect(signed.steps.map(({ action, role, comment }) => [action, role, comment])).toEqual([
    ['judged', 'analyst', null],
    ['submitted', 'analyst', 'ready'],
    ['sent back', 'lead', 'Was mount 2 torqued?'],
    ['submitted', 'analyst', 'It was, see the sheet.'],
    ['signed off', 'lead', null],
  ]);
  const { messages } = (await call(administrator, 'get', '/api/outbox')).body as Outbox;
  const told = messages
    .filter(({ text }) => text.includes(verdict.id))
    .map(({ to, subject }) => [to, subject]);
  const { email: analystMail } = (analyst as unknown as { account: { email: string } }).account;
  const { email: leadMail } = (lead as unknown as { account: { email: string } }).account;
  const name = `Life ${studies}, Stock load`;
  expect(told).toEqual(
    expect.arrayContaining([
      [leadMail, `${name}: submitted`],
      [analystMail, `${name}: sent back`],
      [analystMail, `${name}: signed off`],
    ]),
  );
});

test('of two who submit at once, one does', async () => {
  const { verdict } = await judged();
  const answers = await Promise.all([1, 2, 3, 4].map(() => act(analyst, verdict, 'submit')));
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409, 409, 409]);
  const after = verdictOf(await call(analyst, 'get', `/api/verdicts/${verdict.id}`));
  expect(after.steps.filter(({ action }) => action === 'submitted')).toHaveLength(1);
});

test('a sign-off and a sending back at once leave one of them', async () => {
  const { verdict } = await submitted();
  const answers = await Promise.all([
    act(lead, verdict, 'sign-off'),
    act(lead, verdict, 'send-back', { comment: 'not yet' }),
  ]);
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  const after = verdictOf(await call(analyst, 'get', `/api/verdicts/${verdict.id}`));
  expect(after.steps.map(({ action }) => action).slice(2)).toEqual([after.state]);
});

test('nobody signs off what they prepared; another lead does', async () => {
  const both = await server.signedIn(teamId, 'analyst', 'lead');
  const { verdict } = await judged(both);
  const mine = verdictOf(await act(both, verdict, 'submit').expect(200));
  expect(mine.may.signOff).toBe(false);
  expect(mine.mayNot['signOff']).toMatch('You prepared this study');
  expect(codeOf(await act(both, verdict, 'sign-off').expect(409))).toBe('own-study');
  await act(lead, verdict, 'sign-off').expect(200);
});

test('evidence of one mount each is not signed off', async () => {
  studies += 1;
  const study = await makeStudy(analyst, administrator, `Life ${studies}`);
  const drops = [0, 1].flatMap((cooler) =>
    [1, 2, 3].map((run) => ({
      fileName: `${cooler}-${run}.csv`,
      bytes: logOf(40 + cooler + run / 20, cooler * 10 + run),
      assignment: place(study, cooler, null, String(run), cooler * 3 + run),
    })),
  );
  await dropLogs(analyst, study.id, drops);
  const verdict = verdictOf(await judge(study).expect(200));
  expect(verdict.input.coolers.map(({ mountsRecorded, mounts }) => [mountsRecorded, mounts.length])).toEqual([
    [false, 1],
    [false, 1],
  ]);
  await act(analyst, verdict, 'submit').expect(200);
  expect(codeOf(await act(lead, verdict, 'sign-off').expect(409))).toBe('runs-only');
});

test('when runs change, the verdict is stale and can’t be signed off; put back as it was, it is not', async () => {
  const { study, verdict } = await submitted();
  const runId = await leaveOneOut(study);
  const stale = verdictOf(await call(lead, 'get', `/api/verdicts/${verdict.id}`));
  expect(stale).toMatchObject({
    stale: true,
    staleReasons: ['Runs of this condition were added or changed since.'],
  });
  expect(stale.may.signOff).toBe(false);
  expect(codeOf(await act(lead, verdict, 'sign-off').expect(409))).toBe('stale');
  await call(analyst, 'patch', `/api/studies/${study.id}/runs`, { runIds: [runId], leaveOut: null }).expect(
    200,
  );
  const back = verdictOf(await call(lead, 'get', `/api/verdicts/${verdict.id}`));
  expect(back).toMatchObject({ stale: false, staleReasons: [] });
  await act(lead, verdict, 'sign-off').expect(200);
});

test('a signed-off verdict stays as it is whatever its study becomes, and is withdrawn only with a reason', async () => {
  const { study, verdict } = await submitted();
  const signed = verdictOf(await act(lead, verdict, 'sign-off').expect(200));
  await leaveOneOut(study);
  const replacement = verdictOf(await judge(study).expect(200));
  const later = verdictOf(await call(lead, 'get', `/api/verdicts/${verdict.id}`));
  expect(later.input).toEqual(signed.input);
  expect(later.judgement).toEqual(signed.judgement);
  for (const closed of ['submit', 'send-back', 'sign-off'])
    await act(closed === 'submit' ? analyst : lead, verdict, closed, { comment: 'again' }).expect(409);
  await act(lead, verdict, 'withdraw', { reason: '' }).expect(422);
  await act(lead, verdict, 'withdraw', { reason: 'a run was bad', replacedBy: verdict.id }).expect(422);
  const gone = await act(lead, verdict, 'withdraw', { reason: 'a run was bad', replacedBy: replacement.id });
  expect(verdictOf(gone)).toMatchObject({ state: 'withdrawn' });
  expect(verdictOf(gone).steps.at(-1)).toMatchObject({ action: 'withdrawn', comment: 'a run was bad' });
  await act(lead, verdict, 'withdraw', { reason: 'a run was bad' }).expect(409);
});

test('after a withdrawal the same evidence can be judged anew', async () => {
  const { study, verdict } = await submitted();
  await act(lead, verdict, 'sign-off').expect(200);
  await act(lead, verdict, 'withdraw', { reason: 'published in error' }).expect(200);
  const anew = verdictOf(await judge(study).expect(200));
  expect(anew.id).not.toBe(verdict.id);
  expect(anew.dataDigest).toBe(verdict.dataDigest);
});

test('the export is the whole verdict with full precision', async () => {
  const { verdict } = await judged();
  const file = await call(administrator, 'get', `/api/verdicts/${verdict.id}/export`).expect(200);
  expect(file.headers['content-disposition']).toBe(
    `attachment; filename=Life-${studies}-Stock-load-rise.json`,
  );
  const { may: _may, mayNot: _mayNot, ...whole } = verdict;
  expect(file.body).toEqual(whole);
});

test('lists show verdicts newest first, by state and by study, page by page', async () => {
  const { study, verdict } = await submitted();
  const all = (await call(lead, 'get', '/api/verdicts?pageSize=2&page=1')).body as {
    items: Verdict[];
    total: number;
  };
  expect(all.items[0]?.id).toBe(verdict.id);
  expect(all.items).toHaveLength(2);
  expect(all.total).toBeGreaterThan(5);
  const next = (await call(lead, 'get', '/api/verdicts?pageSize=2&page=2')).body as { items: Verdict[] };
  expect(next.items.map(({ id }) => id)).not.toContain(all.items[1]?.id);
  const query = `state=submitted&studyId=${study.id}`;
  const mine = (await call(lead, 'get', `/api/verdicts?${query}`)).body as {
    items: Verdict[];
    total: number;
  };
  expect([mine.total, mine.items[0]?.id]).toEqual([1, verdict.id]);
  await call(lead, 'get', '/api/verdicts?state=lost').expect(422);
  const found = (await call(lead, 'get', `/api/studies?search=life ${studies}`)).body as { items: Study[] };
  expect(found.items.map(({ id }) => id)).toEqual([study.id]);
  expect(found.items[0]?.verdicts.map(({ id }) => id)).toEqual([verdict.id]);
  const none = (await call(lead, 'get', '/api/studies?search=%25')).body as { total: number };
  expect(none.total).toBe(0);
});

test('each role is told what waits for it, and no longer once it is done', async () => {
  const { study, verdict } = await submitted();
  const empty = await makeStudy(analyst, administrator, `Waiting ${studies}`);
  const auditor = await server.signedIn(teamId, 'auditor');
  const waits = async (agent: Agent): Promise<string[]> => {
    const { roles } = (await call(agent, 'get', '/api/waiting').expect(200)).body as Waiting;
    return roles.flatMap(({ groups }) =>
      groups.flatMap(({ code, items }) =>
        items.flatMap((item) => {
          if (item.kind === 'verdict') return item.verdict.id === verdict.id ? [code] : [];
          return item.kind === 'study' && item.study.id === empty.id ? [`${code}: ${item.why}`] : [];
        }),
      ),
    );
  };
  expect(await waits(lead)).toEqual(['to sign']);
  expect(await waits(analyst)).toEqual(['needs runs: No runs yet.']);
  expect(await waits(auditor)).toEqual([]);
  await act(lead, verdict, 'send-back', { comment: 'see mount 2' }).expect(200);
  expect(await waits(lead)).toEqual(['moving']);
  expect(await waits(analyst)).toEqual(['sent back', 'needs runs: No runs yet.']);
  await act(analyst, verdict, 'submit').expect(200);
  await act(lead, verdict, 'sign-off').expect(200);
  expect(await waits(analyst)).toEqual(['needs runs: No runs yet.']);
  expect(await waits(auditor)).toEqual(['not re-run']);
  await act(auditor, verdict, 're-run').expect(200);
  expect(await waits(auditor)).toEqual([]);
  expect(study.id).not.toBe(empty.id);
});
