import { chiSquareQuantile } from './chi-square';
import { gammaTails } from './incomplete-gamma';
import { betaPrefix, betaTails, Tails } from './incomplete-beta';
import { positiveQuantile } from './positive-quantile';

function fTails(f: number, df1: number, df2: number): Tails {
  if (!(df1 > 0) || !(df2 > 0) || Number.isNaN(f)) return { lower: NaN, upper: NaN };
  if (f <= 0) return { lower: 0, upper: 1 };
  if (f === Infinity) return { lower: 1, upper: 0 };
  if (df2 === Infinity) return gammaTails(df1 / 2, (df1 * f) / 2);
  const product = df1 * f;
  const sum = product + df2;
  const y = sum < Infinity ? df2 / sum : df2 / df1 / f;
  return betaTails(sum < Infinity ? product / sum : 1, y, df1 / 2, df2 / 2);
}

/** P(F > f) with `df1` and `df2` > 0 degrees of freedom; `df2` may be Infinity. */
export const fTail = (f: number, df1: number, df2: number): number => fTails(f, df1, df2).upper;

/** P(F ≤ f). */
export const fCdf = (f: number, df1: number, df2: number): number => fTails(f, df1, df2).lower;

/** f with P(F ≤ f) = p. */
export function fQuantile(p: number, df1: number, df2: number): number {
  if (!(df1 > 0) || !(df2 > 0)) return NaN;
  if (df2 === Infinity) return chiSquareQuantile(p, df1) / df1;
  const slope = (f: number): number => {
    const sum = df1 * f + df2;
    return betaPrefix((df1 * f) / sum, df2 / sum, df1 / 2, df2 / 2);
  };
  return positiveQuantile(p, (f) => fTails(f, df1, df2), slope, 1);
}
