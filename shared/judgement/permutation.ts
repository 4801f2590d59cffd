import { mean, seededRandom } from '../numerics';

export interface PermutationResult {
  /** Two-sided. */
  readonly p: number;
  /** Arrangements looked at: all there are, or as many as were drawn. */
  readonly arrangements: number;
  readonly exact: boolean;
}

/** Up to here every arrangement is looked at: 12 units against 12 are 2 704 156. */
const MOST_ENUMERATED = 3_000_000;
const DRAWN = 99_999;
/** With so many units Welch's test needs no second opinion, and drawing takes long. */
const MOST_UNITS = 200;
/** Statistics closer than this are ties. */
const TIE = 1e-9;
/** A variance this far below the readings' own is rounding, not spread. */
const NO_SPREAD = 1e-13;

/** n over k; exact as long as it is below 2^53. */
export function arrangementsOf(n: number, k: number): number {
  let count = 1;
  for (let i = 1; i <= Math.min(k, n - k); i++) count = Math.round((count * (n - i + 1)) / i);
  return count;
}

/** |Welch's t| of a split from the first side's sum and sum of squares; readings centred on their mean. */
function statisticOf(n1: number, n2: number, total: number, squares: number) {
  const none = NO_SPREAD * squares;
  return (sum: number, sumSquares: number): number => {
    const rest = total - sum;
    const inside1 = sumSquares - (sum * sum) / n1;
    const inside2 = squares - sumSquares - (rest * rest) / n2;
    const spread1 = inside1 > none ? inside1 / ((n1 - 1) * n1) : 0;
    const spread2 = inside2 > none ? inside2 / ((n2 - 1) * n2) : 0;
    const gap = Math.abs(sum / n1 - rest / n2);
    if (spread1 + spread2 > 0) return gap / Math.sqrt(spread1 + spread2);
    return gap * gap > none ? Infinity : 0;
  };
}

/**
 * Permutation test of Welch's t: how many ways of dealing the same readings to the two coolers give a |t| at least as large.
 * All of them up to three million; beyond that 99 999 drawn with the seed, p = (1 + count)/(1 + draws).
 * Null with fewer than four units a side, where no arrangement can be rare enough, and with more than 200 in all.
 * Source: Janssen 1997, Statistics & Probability Letters 36, 9–21 (the studentised statistic holds its level approximately
 * when spreads differ).
 */
export function permutationTest(
  first: readonly number[],
  second: readonly number[],
  seed: number,
): PermutationResult | null {
  const [n1, n2] = [first.length, second.length];
  if (n1 < 4 || n2 < 4 || n1 + n2 > MOST_UNITS) return null;
  const centre = mean([...first, ...second]);
  const centred = (values: readonly number[]) => values.map((value) => value - centre).sort((x, y) => x - y);
  const all = centred([...first, ...second]);
  const add = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0);
  const addSquares = (values: readonly number[]) => values.reduce((sum, value) => sum + value * value, 0);
  const statistic = statisticOf(n1, n2, add(all), addSquares(all));
  const own = centred(first);
  const observed = statistic(add(own), addSquares(own));
  // A relative tie allows for the rounding of large statistics.
  const least = observed === Infinity ? Infinity : observed - TIE * Math.max(1, observed);
  const arrangements = arrangementsOf(n1 + n2, n1);
  if (arrangements <= MOST_ENUMERATED) {
    const count = enumerate(all, n1, n1 === n2, (sum, squares) => statistic(sum, squares) >= least);
    return { p: count / arrangements, arrangements, exact: true };
  }
  const random = seededRandom(seed);
  const shuffled = [...all];
  let count = 0;
  for (let draw = 0; draw < DRAWN; draw++) {
    let sum = 0;
    let squares = 0;
    for (let i = 0; i < n1; i++) {
      const j = i + random.whole(shuffled.length - i);
      const value = shuffled[j];
      shuffled[j] = shuffled[i];
      shuffled[i] = value;
      sum += value;
      squares += value * value;
    }
    if (statistic(sum, squares) >= least) count++;
  }
  return { p: (1 + count) / (1 + DRAWN), arrangements: DRAWN, exact: false };
}

/**
 * Counts the choices of `size` values that pass. Sums grow along a branch, so none carries the rounding of another.
 * With halves of equal size a choice and its complement have the same |t|: only those with the first value are made.
 */
function enumerate(
  values: readonly number[],
  size: number,
  halves: boolean,
  passes: (sum: number, squares: number) => boolean,
): number {
  const readings = Float64Array.from(values);
  const n = readings.length;
  let count = 0;
  const choose = (from: number, left: number, sum: number, squares: number): void => {
    const last = n - left;
    if (left === 1) {
      for (let i = from; i <= last; i++) {
        const value = readings[i];
        if (passes(sum + value, squares + value * value)) count++;
      }
      return;
    }
    for (let i = from; i <= last; i++) {
      const value = readings[i];
      choose(i + 1, left - 1, sum + value, squares + value * value);
    }
  };
  if (halves) {
    choose(1, size - 1, readings[0], readings[0] * readings[0]);
    return 2 * count;
  }
  choose(0, size, 0, 0);
  return count;
}
