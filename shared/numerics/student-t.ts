import { betaPrefix, betaTails } from './incomplete-beta';
import { normalDensity, normalQuantile, normalTail } from './normal';

/** From here on the t distribution and the normal agree to the last digit in the range of doubles used. */
const AS_GOOD_AS_NORMAL = 1e20;

interface Parts {
  /** df/(df+t²) */
  readonly x: number;
  /** t²/(df+t²) */
  readonly y: number;
}

function parts(t: number, df: number): Parts {
  const square = t * t;
  if (square === Infinity) return { x: df / t / t, y: 1 };
  const sum = df + square;
  return { x: df / sum, y: square / sum };
}

/** P(T > t) of Student's t with `df` > 0 degrees of freedom (not necessarily whole; Infinity: the normal). NaN off the domain. */
export function studentTail(t: number, df: number): number {
  if (Number.isNaN(t) || !(df > 0)) return NaN;
  if (df > AS_GOOD_AS_NORMAL) return normalTail(t);
  if (t === 0) return 0.5;
  const { x, y } = parts(t, df);
  // The tail directly as a beta tail: never 1 − cdf.
  const outer = betaTails(x, y, df / 2, 0.5);
  return t > 0 ? outer.lower / 2 : 0.5 + outer.upper / 2;
}

/** P(T ≤ t). */
export const studentCdf = (t: number, df: number): number => studentTail(-t, df);

/** P(|T| > |t|), the two-sided p value. */
export const studentTwoSided = (t: number, df: number): number => 2 * studentTail(Math.abs(t), df);

/** Density of Student's t at t. */
export function studentDensity(t: number, df: number): number {
  if (Number.isNaN(t) || !(df > 0)) return NaN;
  if (df > AS_GOOD_AS_NORMAL) return normalDensity(t);
  // The prefix of the beta function over |t|; at 0 that is 0/0, so a t far below any rounding stands for it.
  const size = Math.max(Math.abs(t), 1e-150);
  const { x, y } = parts(size, df);
  return betaPrefix(x, y, df / 2, 0.5) / size;
}

/**
 * t with P(T ≤ t) = p. −∞ at 0, ∞ at 1, NaN outside or for df ≤ 0; df = Infinity is the normal.
 * Newton's method on the smaller tail, in the middle on the distance from ½; started from Hill's expansion (1970, CACM 13, 619).
 */
export function studentQuantile(p: number, df: number): number {
  if (!(p >= 0 && p <= 1) || !(df > 0)) return NaN;
  if (df > AS_GOOD_AS_NORMAL) return normalQuantile(p);
  if (p === 0) return -Infinity;
  if (p === 1) return Infinity;
  if (p === 0.5) return 0;
  return p < 0.5 ? -upperQuantile(p, 0.5 - p, df) : upperQuantile(1 - p, p - 0.5, df);
}

function upperQuantile(tail: number, centre: number, df: number): number {
  const inMiddle = centre < 0.25;
  let t = start(tail, df);
  let low = 0;
  let high = Infinity;
  for (let step = 0; step < 60; step++) {
    const { x, y } = parts(t, df);
    const both = betaTails(x, y, df / 2, 0.5);
    const density = betaPrefix(x, y, df / 2, 0.5) / t;
    let move: number;
    if (inMiddle) {
      move = (both.upper / 2 - centre) / density;
    } else {
      const here = both.lower / 2;
      const excess = (here - tail) / tail;
      move = -(Math.abs(excess) < 1e-3 ? here - tail : here * Math.log(here / tail)) / density;
    }
    if (Math.abs(move) <= 1e-16 * t) break;
    if (move > 0) high = Math.min(high, t);
    else low = Math.max(low, t);
    let next = t - move;
    if (!(next > low && next < high)) next = high === Infinity ? t * 4 : (low + high) / 2;
    const moved = Math.abs(next - t);
    t = next;
    // Newton doubles the digits each time: after a step this small the next one is below rounding.
    if (moved <= 3e-9 * t) break;
  }
  return t;
}

/** Hill's expansion in the normal quantile; for the far tails of few degrees of freedom the tail's own power law. */
function start(tail: number, df: number): number {
  const z = normalQuantile(1 - tail > 0.5 ? 1 - tail : 0.5 + (0.5 - tail));
  if (Number.isFinite(z) && df >= 3 && z * z < 4 * df) {
    const square = z * z;
    return (
      z *
      (1 +
        (square + 1) / (4 * df) +
        ((5 * square + 16) * square + 3) / (96 * df * df) +
        (((3 * square + 19) * square + 17) * square - 15) / (384 * df * df * df))
    );
  }
  // Far out the density is f(0) df^((df+1)/2) t^−(df+1), so the tail is that over df, times t.
  const atZero = studentDensity(0, df);
  const far = Math.pow((atZero * Math.pow(df, (df - 1) / 2)) / tail, 1 / df);
  return Number.isFinite(far) && far > 0 ? Math.max(far, 1e-8) : 1;
}
