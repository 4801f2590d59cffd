import { millsRatio } from './normal-tables';

const INVERSE_ROOT_TWO_PI = 0.3989422804014327;
export const INVERSE_ROOT_PI = 0.5641895835477563;
const EPSILON = 2 ** -54;
/** The expansion is exact to rounding from this a = df/2 on; smaller ones are lifted to it. */
const LIFTED = 10;
/** Coefficients of (sinh z / z)^(−½) in powers of z². */
const SINH_POWERS = [
  1, -0.08333333333333333, 0.00625, -5.042989417989418e-4, 4.343722442680776e-5, -3.896385732323232e-6,
  3.583335463450791e-7, -3.349747072060578e-8, 3.167585434316115e-9, -3.021036851737096e-10,
  2.900415787669253e-11, -2.79939674837527e-12, 2.713639320017204e-13, -2.6400478921841528e-14,
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
export function logWidth(t: number, df: number): number {
  const ratio = (t * t) / df;
  return ratio < 1e300 ? Math.log1p(ratio) : 2 * Math.log(t) - Math.log(df);
}

/** What the degrees of freedom alone decide. */
export interface StudentConstants {
  readonly df: number;
  /** df/2 */
  readonly a: number;
  /** Γ(a+½)/(Γ(a)√a) */
  readonly step: number;
}

export const studentConstants = (df: number): StudentConstants => ({
  df,
  a: df / 2,
  step: gammaStep(df / 2),
});

/** Density at t ≥ 0 where w = ln(1 + t²/df). */
export const densityAt = (w: number, { a, step }: StudentConstants): number =>
  INVERSE_ROOT_TWO_PI * step * Math.exp(-(a + 0.5) * w);

/** P(T > t) for t > 0, that is I_x(a, ½)/2; w = ln(1 + t²/df). */
export function upperTail(w: number, { a, step }: StudentConstants): number {
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
export function centre(t: number, w: number, { a }: StudentConstants, density: number): number {
  const y = -Math.expm1(-w);
  let term = 1;
  let sum = 1;
  for (let n = 0; term > EPSILON * sum; n++) {
    term *= (y * (a + 0.5 + n)) / (1.5 + n);
    sum += term;
  }
  return t * density * sum;
}
