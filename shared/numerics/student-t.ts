import { normalDensity, normalQuantile, normalTail, roughNormalQuantile } from './normal';
import { millsRatio } from './normal-tables';

/** From here on the t distribution and the normal agree to the last digit in the range of doubles used. */
const AS_GOOD_AS_NORMAL = 1e20;
const INVERSE_ROOT_TWO_PI = 0.3989422804014327;
const INVERSE_ROOT_PI = 0.5641895835477563;
const EPSILON = 2 ** -54;
/** The expansion is exact to rounding from this a = df/2 on; smaller ones are lifted to it. */
const LIFTED = 10;
/** Coefficients of (sinh z / z)^(−½) in powers of z². */
const SINH_POWERS = [
  1, -0.08333333333333333, 0.00625, -5.042989417989418e-4, 4.343722442680776e-5, -3.896385732323232e-6,
  3.583335463450791e-7, -3.349747072060578e-8, 3.167585434316115e-9, -3.021036851737096e-10,
  2.900415787669253e-11, -2.79939674837527e-12, 2.7136393200172037e-13, -2.6400478921841529e-14,
  2.576345276111418e-15,
];

/** Γ(a+½)/(Γ(a)√a) for a > 0: by the recurrence of Γ up to 9, from there by its asymptotic series. */
function gammaStep(a: number): number {
  let above = 1;
  let below = 1;
  let at = a;
  for (; at < 9; at += 1) {
    above *= at;
    below *= at + 0.5;
  }
  const inverse = 1 / at;
  const square = inverse * inverse;
  // ln(Γ(z+½)/(Γ(z)√z)) = −Σ (1 − 4⁻ᵏ) B₂ₖ/(k(2k−1)) z^(1−2k), from Stirling's series.
  const log =
    inverse *
    (-1 / 8 +
      square *
        (1 / 192 +
          square *
            (-1 / 640 +
              square *
                (17 / 14336 + square * (-31 / 18432 + square * (691 / 180224 - (square * 5461) / 425984))))));
  return at === a ? Math.exp(log) : (above / below) * Math.sqrt(at / a) * Math.exp(log);
}

/** ln(1 + t²/df), that is −ln x for x = df/(df + t²). */
function logWidth(t: number, df: number): number {
  const ratio = (t * t) / df;
  return ratio < 1e300 ? Math.log1p(ratio) : 2 * Math.log(t) - Math.log(df);
}

interface Constants {
  readonly df: number;
  /** df/2 */
  readonly a: number;
  readonly step: number;
}

const constants = (df: number): Constants => ({ df, a: df / 2, step: gammaStep(df / 2) });

/** Density at t ≥ 0 where w = ln(1 + t²/df). */
const densityAt = (w: number, { a, step }: Constants): number =>
  INVERSE_ROOT_TWO_PI * step * Math.exp(-(a + 0.5) * w);

/** P(T > t) for t > 0, that is I_x(a, ½)/2; w = ln(1 + t²/df). */
function upperTail(w: number, { a, step }: Constants): number {
  const x = Math.exp(-w);
  if (x < 0.35) {
    // x^a y^½/(a B(a,½))/2, then the power series; all terms positive.
    const front = (0.5 * INVERSE_ROOT_PI * step * Math.exp(-a * w) * Math.sqrt(1 - x)) / Math.sqrt(a);
    let term = 1;
    let sum = 1;
    for (let n = 0; term > EPSILON * sum; n++) {
      term *= (x * (a + 0.5 + n)) / (a + 1 + n);
      sum += term;
    }
    return front * sum;
  }
  if (a >= LIFTED) return expansion(a, w, step);
  // I_x(a, ½) = I_x(a+1, ½) + x^a y^½/(a B(a, ½)); each such term from the one before, and Γ(a+m+½)/Γ(a+m) with them.
  let lifted = a;
  let above = 1;
  let below = 1;
  let term = 1;
  let sum = 0;
  for (; lifted < LIFTED; lifted += 1) {
    sum += term;
    term *= (x * (lifted + 0.5)) / (lifted + 1);
    above *= lifted + 0.5;
    below *= lifted;
  }
  const front = (0.5 * INVERSE_ROOT_PI * step * Math.exp(-a * w) * Math.sqrt(-Math.expm1(-w))) / Math.sqrt(a);
  return front * sum + expansion(lifted, w, ((step * above) / below) * Math.sqrt(a / lifted));
}

/**
 * I_x(a, ½)/2 for a ≥ 10, x ≥ 0.35. With s = e^−v in the beta integral and T = a − ¼ it is
 * 1/(2B(a,½)) ∫_w^∞ e^(−Tv) v^(−½) (sinh(v/2)/(v/2))^(−½) dv; the last factor in powers of v gives the normal tail at
 * z = √(2Tw) and terms that follow one from the other by parts. Like DiDonato and Morris's BGRAT (1992, ACM TOMS 18, 360–373).
 */
function expansion(a: number, w: number, step: number): number {
  const t = a - 0.25;
  const tw = t * w;
  const z = Math.sqrt(2 * tw);
  const density = INVERSE_ROOT_TWO_PI * Math.exp(-tw);
  const halfWidthSquared = (w * w) / 4;
  const divisor = 0.25 / (t * t);
  let moment = density * millsRatio(z);
  let boundary = (density * z) / 2;
  let sum = moment;
  for (let n = 1; n < SINH_POWERS.length; n++) {
    const s = 2 * n - 0.5;
    moment = (boundary * (tw + s) + s * (s - 1) * moment) * divisor;
    const term = SINH_POWERS[n] * moment;
    sum += term;
    if (Math.abs(term) <= EPSILON * sum) break;
    boundary *= halfWidthSquared;
  }
  return step * Math.sqrt(a / t) * sum;
}

/** P(0 < T < t) for small t > 0: t f(t) Σ (a+½)ₙ/(3/2)ₙ yⁿ with y = t²/(df + t²). */
function centre(t: number, w: number, { a }: Constants, density: number): number {
  const y = -Math.expm1(-w);
  let term = 1;
  let sum = 1;
  for (let n = 0; term > EPSILON * sum; n++) {
    term *= (y * (a + 0.5 + n)) / (1.5 + n);
    sum += term;
  }
  return t * density * sum;
}

/** P(T > t) of Student's t with `df` > 0 degrees of freedom (not necessarily whole; Infinity: the normal). NaN off the domain. */
export function studentTail(t: number, df: number): number {
  if (Number.isNaN(t) || !(df > 0)) return NaN;
  if (df > AS_GOOD_AS_NORMAL) return normalTail(t);
  if (t === 0) return 0.5;
  if (t === Infinity) return 0;
  // The tail directly: never 1 − cdf.
  return t > 0 ? upperTail(logWidth(t, df), constants(df)) : 1 - studentTail(-t, df);
}

/** P(T ≤ t). */
export const studentCdf = (t: number, df: number): number => studentTail(-t, df);

/** P(|T| > |t|), the two-sided p value. */
export const studentTwoSided = (t: number, df: number): number => 2 * studentTail(Math.abs(t), df);

/** Density of Student's t at t. */
export function studentDensity(t: number, df: number): number {
  if (Number.isNaN(t) || !(df > 0)) return NaN;
  if (df > AS_GOOD_AS_NORMAL) return normalDensity(t);
  return Math.abs(t) === Infinity ? 0 : densityAt(logWidth(Math.abs(t), df), constants(df));
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
  const known = constants(df);
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
function start(tail: number, { df, a, step }: Constants): number {
  // Far out the tail is x^a/(2a B(a,½)): the first term of the power series.
  const farWidth = Math.log((0.5 * INVERSE_ROOT_PI * step) / (tail * Math.sqrt(a))) / a;
  if (farWidth > 3) return Math.sqrt(df * Math.expm1(farWidth));
  const z = roughNormalQuantile(tail);
  return Math.sqrt(df * Math.expm1((z * z) / (2 * Math.max(a - 0.25, a / 2))));
}
