import { millsRatio, tailNearZero } from './normal-tables';

const INVERSE_ROOT_TWO_PI = 0.3989422804014327;
/** From here on the tables end. */
const TABLE_END = 8;
/** Beyond this the tail is below the smallest double. */
const FARTHEST = 38.6;

/** Density of the standard normal distribution. */
export function normalDensity(x: number): number {
  // x² is split so that its rounding does not grow with the exponent (W. J. Cody 1969, Math. Comp. 23, 631–637).
  const size = Math.abs(x);
  if (size > FARTHEST + 1) return 0;
  const coarse = Math.trunc(size * 16) / 16;
  const rest = (size - coarse) * (size + coarse);
  return INVERSE_ROOT_TWO_PI * Math.exp(-coarse * coarse * 0.5) * Math.exp(-rest * 0.5);
}

/** P(Z > x), from −∞ to ∞; NaN of NaN. Relative errors: reference-data/accuracy.md. */
export function normalTail(x: number): number {
  if (x >= 0) {
    if (x < TABLE_END) return tailNearZero(x);
    return x > FARTHEST ? 0 : normalDensity(x) * millsRatio(x);
  }
  return x < 0 ? 1 - normalTail(-x) : NaN;
}

/** P(Z ≤ x). */
export const normalCdf = (x: number): number => normalTail(-x);

/** x with P(Z ≤ x) = p. −∞ at 0, ∞ at 1, NaN outside. */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) return NaN;
  if (p === 0) return -Infinity;
  if (p === 1) return Infinity;
  if (p === 0.5) return 0;
  // 1 − p is exact for p above a half.
  return p < 0.5 ? -upperQuantile(p, 0.5 - p) : upperQuantile(1 - p, p - 0.5);
}

/** Solves tail = `tail`, or near the middle centre = `centre`, whichever is known with more digits. */
function upperQuantile(tail: number, centre: number): number {
  let x = centre < 0.1 ? centre / INVERSE_ROOT_TWO_PI : roughNormalQuantile(tail);
  // Each step multiplies the number of right digits by four: the guess has three, the second step is exact to rounding.
  for (let step = 0; step < 2; step++) {
    const density = normalDensity(x);
    const excess =
      (centre < 0.1 ? centre - density * centreSeries(x) : density * millsRatio(x) - tail) / density;
    // Taylor series of the inverse: x' = 1/φ, x'' = x/φ², x''' = (2x² + 1)/φ³.
    x += excess * (1 + excess * (x / 2 + (excess * (2 * x * x + 1)) / 6));
  }
  return x;
}

/** Φ(x) − ½ over φ(x): x + x³/3 + x⁵/(3·5) + … (Abramowitz and Stegun 26.2.11). */
function centreSeries(x: number): number {
  const square = x * x;
  let term = x;
  let sum = x;
  for (let odd = 3; ; odd += 2) {
    term *= square / odd;
    if (sum + term === sum) return sum;
    sum += term;
  }
}

/** x > 0 with a tail of `tail` < ½, to about 5e-4 (Abramowitz and Stegun 26.2.23, from memory; the result is only a start). */
export function roughNormalQuantile(tail: number): number {
  const t = Math.sqrt(-2 * Math.log(tail));
  return (
    t - (2.515517 + t * (0.802853 + t * 0.010328)) / (1 + t * (1.432788 + t * (0.189269 + t * 0.001308)))
  );
}
