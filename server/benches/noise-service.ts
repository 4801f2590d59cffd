import type { EntityManager } from 'typeorm';
import type { BenchNoise, CoolerResult } from '../../shared/contracts';
import { thresholdsInForce, valuesOf } from '../thresholds/thresholds-service';
import { benchView, findBench } from './bench-service';
import { smallestVisibleGaps } from './visible-gaps';

/** A bench changes over the years: what it did long ago says little of it now, and reading all would take long. */
const VERDICTS_POOLED = 200;

interface Judged {
  verdict_id: string;
  study: string;
  condition: string;
  judged_at: Date;
  smallest_visible_gap: number | null;
  coolers: CoolerResult[];
}

/** Standard deviations of several samples made one: the square root of their variances' mean, weighed by degrees of freedom. */
function pool(spreads: readonly { spread: number | null; degreesOfFreedom: number }[]): {
  spread: number | null;
  degreesOfFreedom: number;
} {
  let sum = 0;
  let degreesOfFreedom = 0;
  for (const one of spreads) {
    if (one.spread === null || one.degreesOfFreedom <= 0) continue;
    sum += one.degreesOfFreedom * one.spread * one.spread;
    degreesOfFreedom += one.degreesOfFreedom;
  }
  return { spread: degreesOfFreedom > 0 ? Math.sqrt(sum / degreesOfFreedom) : null, degreesOfFreedom };
}

const betweenRuns = (coolers: readonly CoolerResult[]): ReturnType<typeof pool> =>
  pool(
    coolers.map((cooler) => ({
      spread: cooler.spreadBetweenRuns,
      degreesOfFreedom: cooler.runs - (cooler.mounts ?? 1),
    })),
  );

const ofMountMeans = (coolers: readonly CoolerResult[]): ReturnType<typeof pool> =>
  pool(
    coolers
      .filter(({ mounts }) => mounts !== null && mounts > 1)
      .map((cooler) => ({ spread: cooler.standardDeviation, degreesOfFreedom: cooler.units - 1 })),
  );

/** The component between mounts alone, pooled the same way. */
const betweenMounts = (coolers: readonly CoolerResult[]): number | null =>
  pool(
    coolers.map((cooler) => ({
      spread: cooler.spreadBetweenMounts,
      degreesOfFreedom: (cooler.mounts ?? 1) - 1,
    })),
  ).spread;

/** How many runs a mount usually had, rounded: what the spread of mount means holds for. */
function runsPerMount(coolers: readonly CoolerResult[]): number {
  const mounts = coolers.flatMap(({ mountMeans }) => mountMeans);
  return Math.max(1, Math.round(mounts.reduce((sum, { runs }) => sum + runs, 0) / mounts.length));
}

/** What a bench can tell apart, from the newest standing verdict on each study and condition run on it. */
export async function benchNoise(
  manager: EntityManager,
  benchId: string,
  teamId: string,
): Promise<BenchNoise> {
  const bench = await findBench(manager, benchId, teamId);
  const rows: Judged[] = await manager.query(
    `select v.id as verdict_id, s.name as study, c.name as condition, v.judged_at, v.smallest_visible_gap,
            v.judgement -> 'coolers' as coolers
       from (select n.id from studies b join conditions k on k.study_id = b.id
               join lateral (select id, judged_at from verdicts where condition_id = k.id and metric = 'rise'
                                and state <> 'withdrawn' order by judged_at desc, id limit 1) n on true
              where b.bench_id = $1 and b.team_id = $2 order by n.judged_at desc, n.id
              limit ${VERDICTS_POOLED}) newest
       join verdicts v on v.id = newest.id
       join studies s on s.id = v.study_id
       join conditions c on c.id = v.condition_id
      order by v.judged_at desc, v.id`,
    [benchId, teamId],
  );
  const values = valuesOf(await thresholdsInForce(manager, teamId));
  const all = rows.flatMap(({ coolers }) => coolers);
  const runs = betweenRuns(all);
  const mounts = ofMountMeans(all);
  return {
    bench: benchView(bench),
    spreads: rows.map((row) => ({
      verdictId: row.verdict_id,
      study: row.study,
      condition: row.condition,
      judgedAt: row.judged_at.toISOString(),
      spreadBetweenRuns: betweenRuns(row.coolers).spread,
      spreadBetweenMounts: betweenMounts(row.coolers),
      smallestVisibleGap: row.smallest_visible_gap,
    })),
    pooled: {
      spreadBetweenRuns: runs.spread,
      runDegreesOfFreedom: runs.degreesOfFreedom,
      spreadOfMountMeans: mounts.spread,
      mountDegreesOfFreedom: mounts.degreesOfFreedom,
    },
    visible: mounts.spread === null ? [] : smallestVisibleGaps(mounts.spread, runsPerMount(all), values),
    ...values,
  };
}
