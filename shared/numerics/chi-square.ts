import { gammaPrefix, gammaTails } from './incomplete-gamma';
import { normalQuantile } from './normal';
import { positiveQuantile } from './positive-quantile';

/** P(X > x) of chi-square with `df` > 0 degrees of freedom. */
export const chiSquareTail = (x: number, df: number): number =>
  x <= 0 ? (df > 0 ? 1 : NaN) : gammaTails(df / 2, x / 2).upper;

/** P(X ≤ x). */
export const chiSquareCdf = (x: number, df: number): number =>
  x <= 0 ? (df > 0 ? 0 : NaN) : gammaTails(df / 2, x / 2).lower;

/** x with P(X ≤ x) = p. Started from Wilson and Hilferty's cube. */
export function chiSquareQuantile(p: number, df: number): number {
  if (!(df > 0)) return NaN;
  const share = 2 / (9 * df);
  const cube = 1 - share + normalQuantile(p) * Math.sqrt(share);
  // Far down the lower tail is x^(df/2) over a constant, and the cube turns negative.
  const start = cube > 0.2 ? df * cube ** 3 : df * Math.pow(Math.max(p, 1e-300), 2 / df) * 0.5;
  return positiveQuantile(
    p,
    (x) => gammaTails(df / 2, x / 2),
    (x) => gammaPrefix(df / 2, x / 2),
    start,
  );
}
