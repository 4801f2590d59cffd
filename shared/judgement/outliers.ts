import { mean, sampleStandardDeviation, studentQuantile } from '../numerics';

/**
 * Critical value of Grubbs' test for one outlier on either side: (N−1)/√N · √(t²/(N−2+t²)), t at α/(2N) with N − 2.
 * Source: Grubbs 1969, Technometrics 11, 1–21; NIST/SEMATECH e-Handbook 1.3.5.17.1.
 */
export function grubbsCritical(n: number, level: number): number {
  const t = studentQuantile(1 - level / (2 * n), n - 2);
  return ((n - 1) / Math.sqrt(n)) * Math.sqrt((t * t) / (n - 2 + t * t));
}

/** More outliers than this are no outliers but another distribution. */
const MOST = 10;

/** Position of the value furthest from the mean, and how many standard deviations that is. */
function furthest(values: readonly number[]): { readonly index: number; readonly ratio: number } {
  const centre = mean(values);
  const spread = sampleStandardDeviation(values);
  let index = 0;
  for (let i = 1; i < values.length; i++)
    if (Math.abs(values[i] - centre) > Math.abs(values[index] - centre)) index = i;
  return { index, ratio: spread > 0 ? Math.abs(values[index] - centre) / spread : 0 };
}

/** Grubbs' statistic: the largest distance from the mean in standard deviations. */
export const grubbsStatistic = (values: readonly number[]): number => furthest(values).ratio;

/**
 * Outliers by the generalised extreme Studentised deviate test, up to a fifth of the values, at least one and at most ten; for one it is
 * Grubbs' test. Positions in the order found. None of fewer than five values.
 * Source: Rosner 1983, Technometrics 25, 165–172; NIST/SEMATECH e-Handbook 1.3.5.17.3.
 */
export function outliers(
  values: readonly number[],
  level: number,
  most = Math.min(MOST, Math.max(1, Math.floor(values.length / 5))),
): number[] {
  if (values.length < 5) return [];
  const left = values.map((value, index) => ({ value, index }));
  const found: number[] = [];
  let count = 0;
  for (let step = 1; step <= most; step++) {
    const { index, ratio } = furthest(left.map(({ value }) => value));
    const critical = grubbsCritical(left.length, level);
    found.push(left[index].index);
    left.splice(index, 1);
    // The number of outliers is the largest step that passes: two close together hide each other at the first.
    if (ratio > critical) count = step;
  }
  return found.slice(0, count);
}
