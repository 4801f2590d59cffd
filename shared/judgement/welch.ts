import { studentQuantile, studentTail, studentTwoSided } from '../numerics';

/** One side of a comparison: a mean, the variance of one unit, and how many units. */
export interface Side {
  readonly mean: number;
  readonly variance: number;
  readonly units: number;
}

export interface WelchOptions {
  /** In (0.5, 1). */
  readonly confidence: number;
  /** Degrees of freedom are kept at most this; default none. */
  readonly degreesOfFreedomCap?: number;
  /** Variance of the gap that is known apart from the units, such as the part of a sensor's step common to all runs. */
  readonly extraVariance?: number;
  /** Further independent parts of the gap's variance, each with its own degrees of freedom. */
  readonly extras?: readonly VariancePart[];
}

export interface VariancePart {
  readonly variance: number;
  readonly degreesOfFreedom: number;
}

export interface WelchResult {
  readonly gap: number;
  readonly standardError: number;
  readonly degreesOfFreedom: number;
  readonly statistic: number;
  readonly p: number;
  readonly marginOfError: number;
  readonly interval: readonly [number, number];
}

/**
 * Welch's test and interval of first − second, variances not assumed equal.
 * SE² = a + b + extra, a = s₁²/n₁, b = s₂²/n₂; df = SE⁴/(a²/(n₁−1) + b²/(n₂−1)), extra parts with degrees of freedom alike.
 * Null when there is no standard error: a side of fewer than two units, or no spread at all.
 * Source: Welch 1947, Biometrika 34, 28–35; Satterthwaite 1946, Biometrics Bulletin 2, 110–114.
 */
export function welch(first: Side, second: Side, options: WelchOptions): WelchResult | null {
  const a = first.variance / first.units;
  const b = second.variance / second.units;
  const extras = options.extras ?? [];
  const known = extras.reduce((sum, { variance }) => sum + variance, 0);
  if (first.units < 2 || second.units < 2 || !(a + b + known > 0)) return null;
  const total = a + b + (options.extraVariance ?? 0) + known;
  const denominator =
    (a * a) / (first.units - 1) +
    (b * b) / (second.units - 1) +
    extras.reduce((sum, part) => sum + part.variance ** 2 / part.degreesOfFreedom, 0);
  const degreesOfFreedom = Math.min((total * total) / denominator, options.degreesOfFreedomCap ?? Infinity);
  const gap = first.mean - second.mean;
  const standardError = Math.sqrt(total);
  const statistic = gap / standardError;
  const marginOfError = studentQuantile((1 + options.confidence) / 2, degreesOfFreedom) * standardError;
  return {
    gap,
    standardError,
    degreesOfFreedom,
    statistic,
    p: studentTwoSided(statistic, degreesOfFreedom),
    marginOfError,
    interval: [gap - marginOfError, gap + marginOfError],
  };
}

/** Whether the interval leaves out zero. Decided on unrounded values; a gap that equals its margin is within noise. */
export const isOutside = ({ gap, marginOfError }: WelchResult): boolean => Math.abs(gap) > marginOfError;

export interface EquivalenceResult {
  readonly p: number;
  /** At confidence 2c − 1: for 95 % the 90 % interval. */
  readonly interval: readonly [number, number];
  readonly confidence: number;
}

/**
 * Two one-sided tests that the gap lies within ±`matters`, at level 1 − confidence.
 * Null hypothesis: |true gap| ≥ matters. Rejected exactly when the interval lies inside ±matters.
 * Source: Schuirmann 1987, J. Pharmacokinet. Biopharm. 15, 657–680, with Welch's standard error.
 */
export function equivalence(
  { gap, standardError, degreesOfFreedom }: WelchResult,
  matters: number,
  confidence: number,
): EquivalenceResult {
  const half = studentQuantile(confidence, degreesOfFreedom) * standardError;
  const above = studentTail((matters - gap) / standardError, degreesOfFreedom);
  const below = studentTail((gap + matters) / standardError, degreesOfFreedom);
  return { p: Math.max(above, below), interval: [gap - half, gap + half], confidence: 2 * confidence - 1 };
}
