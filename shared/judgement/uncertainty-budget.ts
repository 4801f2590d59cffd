import { studentQuantile } from '../numerics';

/** How a stated half-width spreads: its standard uncertainty is the half-width over this. Source: JCGM 100:2008, 4.3. */
const DIVISORS = { normal: 1, rectangular: Math.sqrt(3), triangular: Math.sqrt(6), 'U-shaped': Math.SQRT2 };
export type Distribution = keyof typeof DIVISORS;

/** A half-width as a standard uncertainty, same unit; for `normal` the value given is taken as the standard uncertainty. */
export const standardUncertainty = (halfWidth: number, distribution: Distribution): number =>
  halfWidth / DIVISORS[distribution];

export interface Contribution {
  /** Standard uncertainty of the result from this source alone, in the result's unit. */
  readonly uncertainty: number;
  /** Infinity where the figure is taken as certain. */
  readonly degreesOfFreedom: number;
}

export interface CombinedUncertainty {
  readonly standardUncertainty: number;
  readonly degreesOfFreedom: number;
  readonly coverageFactor: number;
  readonly expanded: number;
}

/**
 * Combined and expanded uncertainty of independent contributions: root sum of squares, effective degrees of freedom by the
 * Welch–Satterthwaite formula. Source: JCGM 100:2008, 5.1.2 and G.4.1.
 */
export function combine(parts: readonly Contribution[], confidence: number): CombinedUncertainty {
  const variance = parts.reduce((sum, { uncertainty }) => sum + uncertainty ** 2, 0);
  const spread = parts.reduce(
    (sum, { uncertainty, degreesOfFreedom }) => sum + uncertainty ** 4 / degreesOfFreedom,
    0,
  );
  const degreesOfFreedom = spread > 0 ? variance ** 2 / spread : Infinity;
  const coverageFactor = studentQuantile((1 + confidence) / 2, degreesOfFreedom);
  const standard = Math.sqrt(variance);
  return {
    standardUncertainty: standard,
    degreesOfFreedom,
    coverageFactor,
    expanded: coverageFactor * standard,
  };
}
