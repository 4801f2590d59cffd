import { JudgedCooler, JudgedRun } from '../contracts/judgement';
import { mean, sampleVariance, studentQuantile, sumOfSquaredDeviations } from '../numerics';
import { Side } from './welch';

/** What counts as one independent piece of evidence. */
export type UnitOfEvidence = 'mount' | 'run';

/** A cooler's units of evidence and their spread, in the metric's unit. */
export interface Evidence {
  readonly name: string;
  readonly unit: UnitOfEvidence;
  /** Mount means, or run values. */
  readonly values: readonly number[];
  readonly unitNames: readonly string[];
  /** Unweighted mean of the units. */
  readonly mean: number;
  /** Variance of one unit; of mount means it is kept at least at what the runs alone would cause. NaN of a single unit. */
  readonly variance: number;
}

/** What a test needs of the evidence. */
export const side = ({ mean: centre, variance, values }: Evidence): Side => ({
  mean: centre,
  variance,
  units: values.length,
});

/** With few mounts on one side Satterthwaite's degrees of freedom are too hopeful; twice the fewer, less one, holds the error. */
export const degreesOfFreedomCap = (unit: UnitOfEvidence, fewest: number): number =>
  unit === 'mount' ? 2 * (fewest - 1) : Infinity;

export interface WithinMounts {
  /** Pooled variance of runs inside a mount; NaN when no mount has two runs. */
  readonly variance: number;
  readonly degreesOfFreedom: number;
}

export const runsOf = (cooler: JudgedCooler): readonly JudgedRun[] =>
  cooler.mounts.flatMap(({ runs }) => runs);

/** Mounts that hold at least one run. */
export const filledMounts = (cooler: JudgedCooler): JudgedCooler['mounts'] =>
  cooler.mounts.filter(({ runs }) => runs.length > 0);

/** Whether remounting was seen: two or more recorded mounts with runs. */
export const showsRemounting = (cooler: JudgedCooler): boolean =>
  cooler.mountsRecorded && filledMounts(cooler).length >= 2;

const valuesOf = (runs: readonly JudgedRun[]): number[] => runs.map(({ value }) => value);

/** Mean square of runs inside mounts, pooled over the mounts of one cooler. */
export function withinMounts(cooler: JudgedCooler): WithinMounts {
  let squares = 0;
  let degreesOfFreedom = 0;
  // Sorted, so that the order of mounts in the request changes no digit.
  const each = filledMounts(cooler)
    .map(({ runs }) => ({ squares: sumOfSquaredDeviations(valuesOf(runs)), df: runs.length - 1 }))
    .sort((a, b) => a.squares - b.squares || a.df - b.df);
  for (const mount of each) {
    squares += mount.squares;
    degreesOfFreedom += mount.df;
  }
  return { variance: degreesOfFreedom > 0 ? squares / degreesOfFreedom : NaN, degreesOfFreedom };
}

/** Runs as the units: right only for what repeating tells. */
export function runEvidence(cooler: JudgedCooler): Evidence {
  const runs = runsOf(cooler);
  const values = valuesOf(runs);
  return {
    name: cooler.name,
    unit: 'run',
    values,
    unitNames: runs.map(({ name }) => name),
    mean: mean(values),
    variance: sampleVariance(values),
  };
}

/**
 * Mounts as the units. Their variance is floored at w · mean(1/r), the part that runs alone explain, where w is the pooled
 * variance of runs inside a mount and r the runs of each mount; the floor is left out when no mount has two runs.
 * Source: the variance of mount means is unbiased for any numbers of runs; the floor keeps the mount component ≥ 0.
 */
export function mountEvidence(cooler: JudgedCooler): Evidence {
  const mounts = filledMounts(cooler);
  const values = mounts.map(({ runs }) => mean(valuesOf(runs)));
  const { variance: within } = withinMounts(cooler);
  const shares = mounts.map(({ runs }) => 1 / runs.length);
  const floor = Number.isNaN(within) ? 0 : within * mean(shares);
  return {
    name: cooler.name,
    unit: 'mount',
    values,
    unitNames: mounts.map(({ name }) => name),
    mean: mean(values),
    variance: Math.max(sampleVariance(values), floor),
  };
}

export interface MountComponent {
  /** SD between mounts, 0 when the estimate of its square is negative; null when it cannot be estimated. */
  readonly spread: number | null;
  readonly truncated: boolean;
}

/**
 * SD component between mounts: √max(0, (MSB − MSW)/n₀), n₀ = (N − Σr²/N)/(m − 1).
 * Source: one-way random effects, analysis-of-variance estimator (Searle, Casella and McCulloch 1992, section 3.6).
 */
export function mountComponent(cooler: JudgedCooler): MountComponent {
  const mounts = filledMounts(cooler);
  const { variance: within } = withinMounts(cooler);
  if (!showsRemounting(cooler) || Number.isNaN(within)) return { spread: null, truncated: false };
  const all = valuesOf(runsOf(cooler));
  const total = all.length;
  const inside = within * (total - mounts.length);
  const between = Math.max(0, sumOfSquaredDeviations(all) - inside) / (mounts.length - 1);
  const squares = mounts.reduce((sum, { runs }) => sum + runs.length ** 2, 0);
  const typical = (total - squares / total) / (mounts.length - 1);
  const component = (between - within) / typical;
  return { spread: Math.sqrt(Math.max(0, component)), truncated: component < 0 };
}

/** Interval of one cooler's mean alone; null of a single unit. */
export function ownInterval(evidence: Evidence, confidence: number): [number, number] | null {
  const n = evidence.values.length;
  if (n < 2) return null;
  const half = studentQuantile((1 + confidence) / 2, n - 1) * Math.sqrt(evidence.variance / n);
  return [evidence.mean - half, evidence.mean + half];
}
