import { findRoot } from './find-root';
import { normalDensity, normalTail } from './normal';
import { isSeen, overScale, scaleStep } from './over-scale';
import { studentQuantile, studentTail } from './student-t';

/** The integrand can be seen this far below and above half the range. */
const REACH_DOWN = 6.5;
const REACH_UP = 8.7;
/** Beyond this the normal tail is below the smallest double, and so is that of the range at √2 times as much. */
const FARTHEST = 54;

interface Grid {
  readonly step: number;
  /** Step times density at −6.5, −6.5 + step, … */
  readonly mass: Float64Array;
  readonly cdf: Float64Array;
}

const grids = new Map<number, Grid>();

/** The largest of many is more sharply determined and asks for a finer grid. By trial against 1/32: error 2e-15. */
function gridFor(k: number): Grid {
  const perUnit = k <= 5 ? 3 : k <= 15 ? 4 : k <= 50 ? 6 : k <= 300 ? 8 : 12;
  const known = grids.get(perUnit);
  if (known) return known;
  const length = Math.ceil((FARTHEST / 2 + REACH_UP + REACH_DOWN) * perUnit) + 1;
  const z = (index: number): number => index / perUnit - REACH_DOWN;
  const made = {
    step: 1 / perUnit,
    mass: Float64Array.from({ length }, (_, index) => normalDensity(z(index)) / perUnit),
    cdf: Float64Array.from({ length }, (_, index) => normalTail(-z(index))),
  };
  grids.set(perUnit, made);
  return made;
}

/**
 * P(range of k standard normal variables > w) for w ≥ 0.
 * With z the largest of them it is k ∫ φ(z) [Φ(z)ⁿ − (Φ(z) − Φ(z−w))ⁿ] dz, n = k − 1, by the trapezoid rule; the bracket is
 * Φ(z−w) times a sum of positive products, so far tails keep their digits.
 */
function rangeTail(w: number, k: number): number {
  if (w > FARTHEST) return 0;
  const { step, mass, cdf } = gridFor(k);
  const first = Math.floor(w / 2 / step);
  const last = Math.min(cdf.length - 1, Math.ceil((w / 2 + REACH_UP + REACH_DOWN) / step));
  let sum = 0;
  for (let index = first; index <= last; index++) {
    const outside = normalTail(w - (index * step - REACH_DOWN));
    const below = cdf[index];
    sum += mass[index] * outside * powersBetween(below, Math.max(0, below - outside), k - 1);
  }
  return k * sum;
}

/** (aⁿ − bⁿ)/(a − b) = aⁿ⁻¹ + aⁿ⁻²b + … + bⁿ⁻¹ for a whole n ≥ 1, by doubling n. */
function powersBetween(a: number, b: number, n: number): number {
  let sum = 1;
  let powerA = a;
  let powerB = b;
  for (let bit = 30 - Math.clz32(n); bit >= 0; bit--) {
    sum *= powerA + powerB;
    powerA *= powerA;
    powerB *= powerB;
    if ((n >> bit) & 1) {
      sum = sum * b + powerA;
      powerA *= a;
      powerB *= b;
    }
  }
  return sum;
}

const isGroupCount = (k: number): boolean => Number.isInteger(k) && k >= 2 && k < 2 ** 30;

/**
 * P(Q > q), Q the range of `k` ≥ 2 (whole) standard normal variables over an independent √(χ²_df/df).
 * df > 0, not necessarily whole, may be Infinity; NaN off the domain.
 */
export function studentizedRangeTail(q: number, k: number, df: number): number {
  if (Number.isNaN(q) || !isGroupCount(k) || !(df > 0)) return NaN;
  if (q <= 0) return 1;
  if (q === Infinity) return 0;
  if (df === Infinity) return Math.min(1, rangeTail(q, k));
  let tail = 0;
  const weights = overScale(df, scaleStep(df, q, TYPICAL_RANGE), (s, weight) => {
    const term = weight * rangeTail(q * s, k);
    tail += term;
    return isSeen(term, tail);
  });
  return Math.min(1, tail / weights);
}

/** Where the tail of the range falls from 1 to 0, for the step of the grid over S. */
const TYPICAL_RANGE = 4;

/** q with P(Q ≤ q) = p; 0 at 0, ∞ at 1, NaN off the domain of the tail. */
export function studentizedRangeQuantile(p: number, k: number, df: number): number {
  if (!(p >= 0 && p <= 1) || !isGroupCount(k) || !(df > 0)) return NaN;
  if (p === 0) return 0;
  if (p === 1) return Infinity;
  const pairs = k * (k - 1);
  /** q at which k(k−1) P(T > q/√2), above the tail by Bonferroni's inequality, is `bound`. */
  const atBound = (bound: number): number =>
    bound < pairs / 2 ? -Math.SQRT2 * studentQuantile(bound / pairs, df) : 0;
  // One pair alone is exceeded less often than the range, all pairs together more often.
  const low = atBound(((1 - p) * pairs) / 2);
  const high = atBound(1 - p);
  if (p < 0.5) {
    // Near 0 the lower tail goes like the (k−1)th power of q; its root is nearly a straight line.
    const root = (lower: number): number => Math.pow(Math.max(0, lower), 1 / (k - 1));
    const excess = (q: number): number => root(1 - studentizedRangeTail(q, k, df)) - root(p);
    return findRoot(excess, low / 2, high * 2, { relative: 1e-13 });
  }
  return upperQuantile(1 - p, { k, df, pairs, low, high, atBound });
}

interface Search {
  readonly k: number;
  readonly df: number;
  readonly pairs: number;
  readonly low: number;
  readonly high: number;
  readonly atBound: (bound: number) => number;
}

/**
 * By the secant method: where the tail is small Bonferroni's bound is close to it, so that the logarithm of the one is
 * nearly a straight line in that of the other.
 */
function upperQuantile(target: number, { k, df, pairs, low, high, atBound }: Search): number {
  let bottom = low;
  let top = high;
  let q = high;
  let slope = 1;
  let before: { readonly x: number; readonly y: number } | null = null;
  for (let step = 0; step < 100; step++) {
    const y = Math.log(studentizedRangeTail(q, k, df) / target);
    const x = Math.log(pairs * studentTail(q / Math.SQRT2, df));
    if (y > 0) bottom = q;
    else top = q;
    if (before && before.x !== x) slope = (y - before.y) / (x - before.x);
    before = { x, y };
    let next = atBound(Math.exp(x - y / slope));
    // The bracket's own ends are exact for two groups, up to rounding.
    if (!(next >= bottom * (1 - 1e-12) && next <= top * (1 + 1e-12))) next = (bottom + top) / 2;
    const moved = Math.abs(next - q);
    q = next;
    // The error falls with the product of the last two: after a step this small it is below rounding.
    if (!(moved > 1e-8 * q)) break;
  }
  return q;
}
