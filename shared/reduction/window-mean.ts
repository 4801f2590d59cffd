/** How the mean of a window is taken: each reading alike, or each for the time it stands for. */
export type Weighing = 'plain' | 'time-weighted';

/** Sum of `values[i] · weights[i]` about `shift`, compensated (Neumaier 1974), so that order hardly matters. */
function compensatedSum(length: number, term: (i: number) => number): number {
  let sum = 0;
  let lost = 0;
  for (let i = 0; i < length; i += 1) {
    const value = term(i);
    const next = sum + value;
    lost += Math.abs(sum) >= Math.abs(value) ? sum - next + value : value - next + sum;
    sum = next;
  }
  return sum + lost;
}

/**
 * Time each reading stands for: half the way to each neighbour, in s. Across a hole in the log a reading stands for no
 * more than `longest`, for nothing is known of the rest.
 */
export function timeWeights(seconds: Float64Array, longest: number): Float64Array {
  const weights = new Float64Array(seconds.length);
  for (let i = 1; i < seconds.length; i += 1) {
    const half = Math.min(seconds[i] - seconds[i - 1], longest) / 2;
    weights[i - 1] += half;
    weights[i] += half;
  }
  return weights;
}

/** Mean of the finite values, each weighed where weights are given; NaN when there are none. */
export function meanOf(values: Float64Array, weights: Float64Array | null): number {
  let first = NaN;
  let n = 0;
  for (const value of values) {
    if (Number.isNaN(value)) continue;
    if (n === 0) first = value;
    n += 1;
  }
  if (n === 0) return NaN;
  const weight = (i: number) => (Number.isNaN(values[i]) ? 0 : weights ? weights[i] : 1);
  const total = weights ? compensatedSum(values.length, weight) : n;
  if (!(total > 0)) return meanOf(values, null);
  // About the first reading, so that the sum keeps the digits a large common part would take.
  const above = compensatedSum(values.length, (i) =>
    Number.isNaN(values[i]) ? 0 : weight(i) * (values[i] - first),
  );
  return first + above / total;
}

/** Standard deviation about `mean` with divisor n − 1, each reading alike; 0 for a single reading. */
export function deviationOf(values: Float64Array, mean: number): number {
  let n = 0;
  for (const value of values) if (!Number.isNaN(value)) n += 1;
  if (n < 2) return 0;
  const squares = compensatedSum(values.length, (i) =>
    Number.isNaN(values[i]) ? 0 : (values[i] - mean) ** 2,
  );
  return Math.sqrt(squares / (n - 1));
}
