import type { BenchNoise, Study, Verdict } from '../../shared/contracts';
import { balancedDrops, dropLogs, makeStudy } from './support/logs';
import { call, startTestServer, type Agent, type TestServer } from './support/test-server';

let server: TestServer;
let analyst: Agent;
let study: Study;

beforeAll(async () => {
  server = await startTestServer();
  const teamId = await server.addTeam('Team of the bench');
  analyst = await server.signedIn(teamId, 'analyst');
  study = await makeStudy(analyst, await server.signedIn(teamId, 'administrator'), 'Noise');
});

afterAll(() => server.stop());

const noise = async (): Promise<BenchNoise> =>
  (await call(analyst, 'get', `/api/benches/${study.bench.id}/noise`).expect(200)).body as BenchNoise;

test('a bench without verdicts tells nothing yet', async () => {
  expect(await noise()).toMatchObject({
    spreads: [],
    pooled: {
      spreadBetweenRuns: null,
      runDegreesOfFreedom: 0,
      spreadOfMountMeans: null,
      mountDegreesOfFreedom: 0,
    },
    visible: [],
    confidence: 0.95,
    power: 0.8,
    gapThatMatters: 0.5,
  });
});

test('what a bench can see follows from the spread of its verdicts', async () => {
  await dropLogs(analyst, study.id, balancedDrops(study, -1, { runs: 2 }));
  const body = { conditionId: study.conditions[0]?.id, metric: 'rise' };
  const verdict = (await call(analyst, 'post', `/api/studies/${study.id}/verdicts`, body).expect(200))
    .body as Verdict;
  const { pooled, visible, spreads } = await noise();
  const [coated, bare] = verdict.judgement.coolers;
  // Two coolers of equally many mounts: the pooled variance is the mean of the two.
  const expected = Math.sqrt(
    ((coated?.standardDeviation ?? 0) ** 2 + (bare?.standardDeviation ?? 0) ** 2) / 2,
  );
  expect(pooled.spreadOfMountMeans).toBeCloseTo(expected, 12);
  expect([pooled.mountDegreesOfFreedom, pooled.runDegreesOfFreedom]).toEqual([4, 6]);
  expect(spreads.map(({ verdictId }) => verdictId)).toEqual([verdict.id]);
  // Welch's smallest detectable difference in units of the true standard error, power 0.8, equal spreads:
  // 4.2957 for 3 a side, 3.2956 for 5, 2.8783 for 20 (methods table, checked there by simulation to ±0.0001 and in R).
  for (const [mounts, multiplier] of [
    [3, 4.2957],
    [5, 3.2956],
  ] as const) {
    const row = visible.find((one) => one.mounts === mounts);
    const standardError = (pooled.spreadOfMountMeans ?? 0) * Math.sqrt(2 / mounts);
    expect((row?.gap ?? 0) / standardError).toBeCloseTo(multiplier, 3);
    expect(row?.runs).toBe(2 * mounts);
  }
});
