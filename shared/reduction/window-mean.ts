import { mean as exactMean, sampleStandardDeviation } from '../numerics';
import { WindowMean } from '../contracts/run-summary';

/** How the mean of a window is taken: each reading alike, or each for the time it stands for. */
export type Weighing = 'plain' | 'time-weighted';

/** Up to this many readings sums are exact; beyond it they are compensated, which keeps all digits anybody reads. */
const MOST_EXACT = 20_000;

/** Sum of `term(0)` … `term(length − 1)`, compensated (Neumaier 1974). */
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
 * more than half of `longest`, for nothing is known of the rest.
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

/** Mean about the first reading, so that the sum keeps the digits a large common part would take. */
function compensatedMean(values: readonly number[], weights: readonly number[] | null): number {
  const first = values[0];
  const weight = (i: number) => (weights ? weights[i] : 1);
  const total = weights ? compensatedSum(values.length, weight) : values.length;
  if (!(total > 0)) return compensatedMean(values, null);
  return first + compensatedSum(values.length, (i) => weight(i) * (values[i] - first)) / total;
}

/**
 * Mean of finite readings; NaN of none.
 * @param weights of each reading, or null: all alike
 */
export function meanOf(values: readonly number[], weights: readonly number[] | null): number {
  if (values.length === 0) return NaN;
  return weights === null && values.length <= MOST_EXACT
    ? exactMean(values)
    : compensatedMean(values, weights);
}

/** Standard deviation about a mean with divisor n − 1, each reading alike; 0 of a single reading. */
function deviationOf(values: readonly number[], mean: number, plain: boolean): number {
  if (values.length < 2) return 0;
  if (plain && values.length <= MOST_EXACT) return sampleStandardDeviation(values);
  return Math.sqrt(compensatedSum(values.length, (i) => (values[i] - mean) ** 2) / (values.length - 1));
}

/**
 * Mean, spread and extremes of the finite readings; null when there are none.
 * @param weights as long as `values`, or null: each reading alike
 */
export function windowMean(values: Float64Array, weights: Float64Array | null): WindowMean | null {
  const finite: number[] = [];
  const finiteWeights: number[] | null = weights ? [] : null;
  let lowest = Infinity;
  let highest = -Infinity;
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i];
    if (Number.isNaN(value)) continue;
    finite.push(value);
    if (weights) finiteWeights?.push(weights[i]);
    if (value < lowest) lowest = value;
    if (value > highest) highest = value;
  }
  if (finite.length === 0) return null;
  const mean = meanOf(finite, finiteWeights);
  return { mean, standardDeviation: deviationOf(finite, mean, weights === null), lowest, highest };
}
