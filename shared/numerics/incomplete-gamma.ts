import { Tails } from './incomplete-beta';
import { log1pMinus, stirlingError } from './stirling';

const EPSILON = 2 ** -54;
const TINY = 1e-300;
const MOST_STEPS = 20_000;

/** x^a e^−x / Γ(a). */
export function gammaPrefix(a: number, x: number): number {
  const u = (x - a) / a;
  const front = Math.sqrt(a / (2 * Math.PI));
  if (Math.abs(u) < 0.5) return front * Math.exp(a * log1pMinus(u) - stirlingError(a));
  const power = a < 150 ? Math.pow(x / a, a) : 0;
  return power > 1e-290 && power < 1e290
    ? front * power * Math.exp(a - x) * Math.exp(-stirlingError(a))
    : front * Math.exp(a * (Math.log(x / a) - u) - stirlingError(a));
}

/**
 * Regularised incomplete gamma functions P(a, x) (`lower`) and Q(a, x) (`upper`), a > 0, x ≥ 0.
 * Series below a + 1, continued fraction above (Abramowitz and Stegun 6.5.29, 6.5.31); NaN off the domain.
 */
export function gammaTails(a: number, x: number): Tails {
  if (!(a > 0) || !(x >= 0)) return { lower: NaN, upper: NaN };
  if (x === 0) return { lower: 0, upper: 1 };
  if (x === Infinity) return { lower: 1, upper: 0 };
  const prefix = gammaPrefix(a, x);
  if (x < a + 1) {
    const lower = (prefix * series(a, x)) / a;
    return { lower, upper: 1 - lower };
  }
  const upper = prefix * fraction(a, x);
  return { lower: 1 - upper, upper };
}

function series(a: number, x: number): number {
  let term = 1;
  let sum = 1;
  for (let n = 1; n < MOST_STEPS; n++) {
    term *= x / (a + n);
    sum += term;
    if (term <= EPSILON * sum) break;
  }
  return sum;
}

function fraction(a: number, x: number): number {
  let b = x + 1 - a;
  let c = 1 / TINY;
  let d = 1 / (b === 0 ? TINY : b);
  let value = d;
  for (let n = 1; n < MOST_STEPS; n++) {
    const numerator = n * (a - n);
    b += 2;
    d = numerator * d + b;
    if (d === 0) d = TINY;
    c = b + numerator / c;
    if (c === 0) c = TINY;
    d = 1 / d;
    const change = c * d;
    value *= change;
    if (Math.abs(change - 1) <= EPSILON * 4) break;
  }
  return value;
}
