import { betaPrefix, betaTails } from './incomplete-beta';
import { fQuantile } from './fisher-f';

/** P(X ≤ x) of the beta distribution. */
export const betaCdf = (x: number, a: number, b: number): number =>
  x <= 0 ? 0 : x >= 1 ? 1 : betaTails(x, 1 - x, a, b).lower;

/** Density of the beta distribution at 0 < x < 1. */
export const betaDensity = (x: number, a: number, b: number): number =>
  x > 0 && x < 1 ? betaPrefix(x, 1 - x, a, b) / (x * (1 - x)) : 0;

/** x with P(X ≤ x) = p, through the F distribution: X = a F/(b + a F) with 2a and 2b degrees of freedom. */
export function betaQuantile(p: number, a: number, b: number): number {
  const f = fQuantile(p, 2 * a, 2 * b);
  if (f === Infinity) return 1;
  return (a * f) / (b + a * f);
}
