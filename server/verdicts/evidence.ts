import type { EntityManager } from 'typeorm';
import type { JudgedCooler, JudgedRun, JudgementInput, Metric, RunSummary } from '../../shared/contracts';
import { digestOf } from '../db/storable';
import { ConditionEntity } from '../studies/study-entity';
import { namedRuns } from '../runs/run-view';

/** What a judgement rests on but for the rules: runs by cooler and mount, in a fixed order. */
export type Evidence = Pick<JudgementInput, 'metric' | 'nominalWatts' | 'coolers' | 'leftOut'>;

/** A run placed in its study, as the evidence needs it. */
export interface PlacedRun {
  readonly cooler: string;
  readonly mount: string | null;
  readonly name: string;
  readonly testOrder: number | null;
  readonly digest: string;
  readonly summary: RunSummary;
  readonly leftOutReason: string | null;
}

/** A run's summary as the judgement sees it; null when it has no value by this metric. */
export function judgedRun(run: PlacedRun, metric: Metric): JudgedRun | null {
  const { summary } = run;
  const value = metric === 'rise' ? summary.rise : summary.resistance;
  if (value === null) return null;
  return {
    name: run.name,
    value,
    order: run.testOrder,
    ambient: summary.ambient.mean,
    ambientRange: summary.ambient.highest - summary.ambient.lowest,
    watts: summary.watts?.mean ?? null,
    fanSpeed: summary.fanSpeed?.mean ?? null,
    settled: summary.window.settled,
    windowSetByHand: summary.window.setBy === 'hand',
    sensorStep: summary.sensorStep,
    withinStandardDeviation: summary.within.standardDeviation,
    digest: run.digest,
  };
}

function judgedCooler(name: string, runs: readonly PlacedRun[], metric: Metric): JudgedCooler {
  // With any mount unknown, nothing is known of remounting for the whole cooler.
  const mountsRecorded = runs.length > 0 && runs.every(({ mount }) => mount !== null);
  const mounts: { name: string; runs: JudgedRun[] }[] = [];
  for (const run of runs) {
    const judged = judgedRun(run, metric);
    if (!judged) continue;
    const mountName = mountsRecorded ? (run.mount ?? '') : '';
    let mount = mounts.find((one) => one.name === mountName);
    if (!mount) mounts.push((mount = { name: mountName, runs: [] }));
    mount.runs.push(judged);
  }
  return { name, mountsRecorded, mounts };
}

/**
 * Puts runs together for the judgement.
 * @param coolers names in the order of comparison, the reference last
 * @param runs in their fixed order; runs without a value by the metric are passed over (a left-out run without
 *   watts has no resistance to show; kept runs without one are for the caller to refuse)
 */
export function evidenceOf(
  metric: Metric,
  nominalWatts: number | null,
  coolers: readonly string[],
  runs: readonly PlacedRun[],
): Evidence {
  const kept = runs.filter((run) => run.leftOutReason === null);
  const leftOut = runs.flatMap(({ leftOutReason: reason, ...run }) => {
    const judged = reason === null ? null : judgedRun({ ...run, leftOutReason: reason }, metric);
    return judged && reason !== null ? [{ cooler: run.cooler, mount: run.mount, run: judged, reason }] : [];
  });
  return {
    metric,
    nominalWatts,
    coolers: coolers.map((name) =>
      judgedCooler(
        name,
        kept.filter(({ cooler }) => cooler === name),
        metric,
      ),
    ),
    leftOut,
  };
}

/** A run placed in its study, with its id. */
export type StoredRun = PlacedRun & { readonly id: string; readonly fileName: string };

/** The runs of a condition in the order in which they are judged. */
export async function placedRuns(
  manager: EntityManager,
  studyId: string,
  conditionId: string,
  coolers: readonly { id: string; name: string }[],
): Promise<StoredRun[]> {
  const names = new Map(coolers.map(({ id, name }) => [id, name]));
  const runs = await namedRuns(manager, { studyId, conditionId });
  return runs.map((run) => ({
    id: run.id,
    fileName: run.fileName,
    cooler: names.get(run.coolerId) ?? '',
    mount: run.mount,
    name: run.name,
    testOrder: run.testOrder,
    digest: run.digest,
    summary: run.summary,
    leftOutReason: run.leftOutReason,
  }));
}

/** Notes what a condition's runs amount to now, so that lists can tell stale verdicts without reading runs. To be
 *  called in the transaction that changed them, with the study locked. */
export async function refreshEvidence(
  manager: EntityManager,
  condition: ConditionEntity,
  coolers: readonly { id: string; name: string }[],
): Promise<void> {
  const runs = await placedRuns(manager, condition.studyId, condition.id, coolers);
  const digest = (metric: Metric): string =>
    digestOf(
      evidenceOf(
        metric,
        condition.nominalWatts,
        coolers.map(({ name }) => name),
        runs,
      ),
    );
  await manager.update(ConditionEntity, condition.id, {
    riseEvidence: digest('rise'),
    resistanceEvidence: digest('resistance'),
  });
}
