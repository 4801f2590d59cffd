import { exactSum, mean, sampleVariance, studentTwoSided } from '../numerics';

/** Share cut off each end. */
const TRIM = 0.2;
/** Readings further than this many scaled median deviations from the median stand out (Iglewicz and Hoaglin 1993). */
const FAR = 3.5;
/** Makes the median absolute deviation of normal readings their standard deviation. */
const MAD_SCALE = 1.4826;

export interface TrimmedResult {
  readonly gap: number;
  readonly standardError: number;
  readonly degreesOfFreedom: number;
  readonly p: number;
}

interface TrimmedSide {
  readonly mean: number;
  /** Squared standard error of the trimmed mean. */
  readonly variance: number;
  readonly degreesOfFreedom: number;
}

function trimmedSide(values: readonly number[]): TrimmedSide {
  const sorted = [...values].sort((a, b) => a - b);
  const n = sorted.length;
  const cut = Math.floor(TRIM * n);
  const kept = sorted.slice(cut, n - cut);
  const drawnIn = sorted.map((value) => Math.min(Math.max(value, kept[0]), kept[kept.length - 1]));
  const h = kept.length;
  return {
    mean: exactSum(kept) / h,
    variance: ((n - 1) * sampleVariance(drawnIn)) / (h * (h - 1)),
    degreesOfFreedom: h - 1,
  };
}

/**
 * Yuen's test of 20 % trimmed means, spreads not assumed equal: a probe of whether single units drive a call.
 * Null with fewer than five units a side, or when the trimmed units do not scatter.
 * Source: Yuen 1974, Biometrika 61, 165–170.
 */
export function trimmedTest(first: readonly number[], second: readonly number[]): TrimmedResult | null {
  if (first.length < 5 || second.length < 5) return null;
  const [a, b] = [trimmedSide(first), trimmedSide(second)];
  const variance = a.variance + b.variance;
  if (!(variance > 0)) return null;
  const standardError = Math.sqrt(variance);
  const degreesOfFreedom =
    variance ** 2 / (a.variance ** 2 / a.degreesOfFreedom + b.variance ** 2 / b.degreesOfFreedom);
  const gap = a.mean - b.mean;
  return {
    gap,
    standardError,
    degreesOfFreedom,
    p: studentTwoSided(gap / standardError, degreesOfFreedom),
  };
}

const middle = (sorted: readonly number[]): number =>
  mean([sorted[(sorted.length - 1) >> 1], sorted[sorted.length >> 1]]);

/** Positions of units that stand far from their median. None of fewer than five, or when half of them are alike. */
export function farFromMedian(values: readonly number[]): number[] {
  if (values.length < 5) return [];
  const median = middle([...values].sort((a, b) => a - b));
  const deviation = middle(values.map((value) => Math.abs(value - median)).sort((a, b) => a - b));
  if (!(deviation > 0)) return [];
  return values.flatMap((value, index) =>
    Math.abs(value - median) > FAR * MAD_SCALE * deviation ? [index] : [],
  );
}
