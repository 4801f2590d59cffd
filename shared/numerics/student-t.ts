import { normalDensity, normalQuantile, normalTail, roughNormalQuantile } from './normal';
import {
  centre,
  densityAt,
  INVERSE_ROOT_PI,
  logWidth,
  StudentConstants,
  studentConstants,
  upperTail,
} from './student-parts';

/** From here on the t distribution and the normal agree to the last digit in the range of doubles used. */
const AS_GOOD_AS_NORMAL = 1e20;

/** P(T > t) of Student's t with `df` > 0 degrees of freedom (not necessarily whole; Infinity: the normal). NaN off the domain. */
export function studentTail(t: number, df: number): number {
  if (Number.isNaN(t) || !(df > 0)) return NaN;
  if (df > AS_GOOD_AS_NORMAL) return normalTail(t);
  if (t === 0) return 0.5;
  if (t === Infinity) return 0;
  // The tail directly: never 1 − cdf.
  return t > 0 ? upperTail(logWidth(t, df), studentConstants(df)) : 1 - studentTail(-t, df);
}

/** P(T ≤ t). */
export const studentCdf = (t: number, df: number): number => studentTail(-t, df);

/** P(|T| > |t|), the two-sided p value. */
export const studentTwoSided = (t: number, df: number): number => 2 * studentTail(Math.abs(t), df);

/** Density of Student's t at t. */
export function studentDensity(t: number, df: number): number {
  if (Number.isNaN(t) || !(df > 0)) return NaN;
  if (df > AS_GOOD_AS_NORMAL) return normalDensity(t);
  return Math.abs(t) === Infinity ? 0 : densityAt(logWidth(Math.abs(t), df), studentConstants(df));
}

/**
 * t with P(T ≤ t) = p. −∞ at 0, ∞ at 1, NaN outside or for df ≤ 0; df = Infinity is the normal.
 * Halley's method on the logarithm of the smaller tail, in the middle on the distance from ½.
 */
export function studentQuantile(p: number, df: number): number {
  if (!(p >= 0 && p <= 1) || !(df > 0)) return NaN;
  if (df > AS_GOOD_AS_NORMAL) return normalQuantile(p);
  if (p === 0) return -Infinity;
  if (p === 1) return Infinity;
  if (p === 0.5) return 0;
  return p < 0.5 ? -upperQuantile(p, 0.5 - p, df) : upperQuantile(1 - p, p - 0.5, df);
}

function upperQuantile(tail: number, distance: number, df: number): number {
  const known = studentConstants(df);
  const inMiddle = distance < 0.1;
  let t = inMiddle ? distance / densityAt(0, known) : start(tail, known);
  let low = 0;
  let high = Infinity;
  for (let step = 0; step < 60; step++) {
    const w = logWidth(t, df);
    const density = densityAt(w, known);
    // −f'/f
    const slope = (t / df) * (df + 1) * Math.exp(-w);
    let newton: number;
    let curvature: number;
    if (inMiddle) {
      newton = (distance - centre(t, w, known, density)) / density;
      curvature = slope;
    } else {
      const here = upperTail(w, known);
      const hazard = density / here;
      const excess = (here - tail) / tail;
      newton =
        (Math.abs(excess) < 1e-3
          ? excess * (1 - excess * (1 / 2 - excess * (1 / 3 - excess / 4)))
          : Math.log(here / tail)) / hazard;
      curvature = slope - hazard;
    }
    if (newton > 0) low = Math.max(low, t);
    else high = Math.min(high, t);
    const bend = 1 - (newton * curvature) / 2;
    let next = t + newton / (bend > 0.5 && bend < 2 ? bend : 1);
    if (!(next >= low && next <= high)) next = high === Infinity ? t * 4 : (low + high) / 2;
    const moved = Math.abs(next - t);
    t = next;
    // Halley's method triples the digits: what is left is about moved³ (curvature² + 1/t²), here below rounding.
    if (!(moved ** 3 * (curvature * curvature + 1 / (t * t)) > 1e-16 * t)) break;
  }
  return t;
}

/**
 * A first guess. The expansion above says that the tail at t is nearly the normal tail at √(2(a−¼) ln(1+t²/df));
 * for few degrees of freedom, far out, the tail's own power law is nearer.
 */
function start(tail: number, { df, a, step }: StudentConstants): number {
  // Far out the tail is x^a/(2a B(a,½)): the first term of the power series.
  const farWidth = Math.log((0.5 * INVERSE_ROOT_PI * step) / (tail * Math.sqrt(a))) / a;
  if (farWidth > 3) return Math.sqrt(df * Math.expm1(farWidth));
  const z = roughNormalQuantile(tail);
  return Math.sqrt(df * Math.expm1((z * z) / (2 * Math.max(a - 0.25, a / 2))));
}
