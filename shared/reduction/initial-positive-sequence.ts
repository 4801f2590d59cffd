/** What a window's mean is worth when neighbouring readings resemble each other. */
export interface AutocorrelatedMean {
  /** Standard error of the mean, in the unit of the readings: a lower bound on the run's noise. */
  readonly standardError: number;
  /** Number of independent readings that would give that standard error; at most n. */
  readonly effectiveReadings: number;
}

/** Longer series are averaged in blocks first: the error of the mean stays, the cost does not grow with n². */
const MOST_TERMS = 8192;

function blocked(values: Float64Array): Float64Array {
  if (values.length <= MOST_TERMS) return values;
  const size = Math.ceil(values.length / MOST_TERMS);
  const blocks = new Float64Array(Math.floor(values.length / size));
  for (let b = 0; b < blocks.length; b += 1) {
    let sum = 0;
    for (let i = 0; i < size; i += 1) sum += values[b * size + i];
    blocks[b] = sum / size;
  }
  return blocks;
}

/**
 * Standard error of a mean by the initial positive, monotone sequence: sums of neighbouring autocovariances
 * c[2k] + c[2k+1] (divisor n) are added while positive, each no larger than the one before; the variance of the mean is
 * (−c0 + 2 Σ) / n, at least c0 / n. `methods.md` S13; Geyer 1992, section 3.3.
 * @param values readings at equal steps in time, at least one; NaN not allowed
 * @param mean their mean
 */
export function meanError(values: Float64Array, mean: number): AutocorrelatedMean {
  const series = blocked(values);
  const n = series.length;
  const d = Float64Array.from(series, (value) => value - mean);
  /** c[lag] + c[lag + 1] in one pass, twice as fast as one after the other. */
  const pairOf = (lag: number): number => {
    let sum = d[n - 1 - lag] * d[n - 1];
    for (let i = 0; i + lag + 1 < n; i += 1) sum += d[i] * (d[i + lag] + d[i + lag + 1]);
    return sum / n;
  };
  const c0 = d.reduce((sum, value) => sum + value * value, 0) / n;
  if (c0 === 0) return { standardError: 0, effectiveReadings: values.length };
  let total = 0;
  let smallest = Infinity;
  for (let lag = 0; lag + 1 < n; lag += 2) {
    const pair = pairOf(lag);
    if (pair <= 0) break;
    smallest = Math.min(smallest, pair);
    total += smallest;
  }
  const variance = Math.max((-c0 + 2 * total) / n, c0 / n);
  // With blocks, c0 belongs to a block; the readings' own variance gives the effective number of readings.
  let own = 0;
  for (const value of values) own += (value - mean) ** 2;
  return {
    standardError: Math.sqrt(variance),
    effectiveReadings: Math.min(own / values.length / variance, values.length),
  };
}
