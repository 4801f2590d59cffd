import { log1pMinus, stirlingError } from './stirling';

/** Both tails of the regularised incomplete beta function; `lower` + `upper` = 1, each accurate when small. */
export interface Tails {
  readonly lower: number;
  readonly upper: number;
}

const TINY = 1e-300;
const EPSILON = 2 ** -54;
const MOST_STEPS = 20_000;

/** x^a y^b / B(a,b), the density of the beta distribution times x·y; x + y = 1, both given so that neither is lost. */
export function betaPrefix(x: number, y: number, a: number, b: number): number {
  if (x <= 0 || y <= 0) return 0;
  const stirling = stirlingError(a) + stirlingError(b) - stirlingError(a + b);
  const front = Math.sqrt((a / (2 * Math.PI)) * (b / (a + b)));
  const excess = x * b - y * a;
  const logA = a * logRatioMinus(excess / a, (x / a) * (a + b));
  const logB = b * logRatioMinus(-excess / b, (y / b) * (a + b));
  if (Math.abs(logA) + Math.abs(logB) > 20 && a < 300 && b < 300) {
    // Far out the exponent is large, and its rounding would show: powers are rounded once, whatever their size.
    const powers = Math.pow((x / a) * (a + b), a) * Math.pow((y / b) * (a + b), b);
    if (powers > 1e-290 && powers < 1e290) return front * powers * Math.exp(-stirling);
  }
  return front * Math.exp(logA + logB - stirling);
}

/** ln(ratio) − u where ratio = 1 + u; `ratio` is passed because u near −1 has lost it. */
const logRatioMinus = (u: number, ratio: number): number =>
  Math.abs(u) < 0.5 ? log1pMinus(u) : Math.log(ratio) - u;

/**
 * I_x(a,b) and its complement, a, b > 0, x + y = 1.
 * Continued fraction of DiDonato and Morris (1992, ACM TOMS 18, 360–373, eq. 9.x), by Lentz's method; power series where x is small.
 * Returns NaN tails off the domain. Relative error of the smaller tail: see reference-data/accuracy.md.
 */
export function betaTails(x: number, y: number, a: number, b: number): Tails {
  if (!(a > 0) || !(b > 0) || !(x >= 0) || !(y >= 0)) return { lower: NaN, upper: NaN };
  if (x === 0) return { lower: 0, upper: 1 };
  if (y === 0) return { lower: 1, upper: 0 };
  if (x * (b + 1) > y * (a + 1)) {
    const upper = lowerTail(y, x, b, a);
    return { lower: 1 - upper, upper };
  }
  const lower = lowerTail(x, y, a, b);
  return { lower, upper: 1 - lower };
}

function lowerTail(x: number, y: number, a: number, b: number): number {
  const prefix = betaPrefix(x, y, a, b);
  if (prefix === 0) return 0;
  return x <= 0.7 && (b <= 1 || b * x <= 0.7)
    ? // y^b through the small x: with b in the thousands the rounding of y itself would show.
      (prefix * powerSeries(x, a, b)) / (a * Math.exp(b * Math.log1p(-x)))
    : prefix / continuedFraction(x, y, a, b);
}

/** 1 + a Σ (1−b)(2−b)…(n−b)/n! · xⁿ/(a+n). */
function powerSeries(x: number, a: number, b: number): number {
  let coefficient = 1;
  let sum = 0;
  for (let n = 1; n < MOST_STEPS; n++) {
    coefficient *= ((n - b) / n) * x;
    const term = coefficient / (a + n);
    sum += term;
    if (Math.abs(term) <= EPSILON * Math.abs(sum)) break;
  }
  return 1 + a * sum;
}

function continuedFraction(x: number, y: number, a: number, b: number): number {
  const lambda = a * y - b * x;
  let fraction = (a * (lambda + 1)) / (a + 1);
  if (fraction === 0) fraction = TINY;
  let c = fraction;
  let d = 0;
  for (let m = 1; m < MOST_STEPS; m++) {
    const step = a + 2 * m - 1;
    const shared = (m * (b - m) * x) / step;
    const numerator = (((a + m - 1) * (a + b + m - 1)) / step) * shared * x;
    const denominator = m + shared + ((a + m) * (lambda + 1 + m * (1 + y))) / (a + 2 * m + 1);
    d = denominator + numerator * d;
    if (d === 0) d = TINY;
    c = denominator + numerator / c;
    if (c === 0) c = TINY;
    d = 1 / d;
    const change = c * d;
    fraction *= change;
    if (Math.abs(change - 1) <= EPSILON * 4) break;
  }
  return fraction;
}
