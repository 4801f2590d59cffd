import { Tails } from './incomplete-beta';
import { normalTail } from './normal';
import { isSeen, overScale, scaleStep } from './over-scale';

/**
 * Both tails of noncentral t: T = (Z + ncp)/S, S = √(χ²_df/df). df > 0, may be Infinity; NaN off the domain.
 * P(T ≤ t) = E[Φ(tS − ncp)], averaged over S.
 */
export function noncentralTTails(t: number, df: number, ncp: number): Tails {
  if (Number.isNaN(t) || Number.isNaN(ncp) || !(df > 0)) return { lower: NaN, upper: NaN };
  if (Math.abs(t) === Infinity) return t > 0 ? { lower: 1, upper: 0 } : { lower: 0, upper: 1 };
  if (df === Infinity) return { lower: normalTail(ncp - t), upper: normalTail(t - ncp) };
  let lower = 0;
  let upper = 0;
  const weights = overScale(df, scaleStep(df, t, ncp), (s, weight) => {
    const z = t * s - ncp;
    const small = weight * normalTail(Math.abs(z));
    const below = z < 0 ? small : weight - small;
    const above = z < 0 ? weight - small : small;
    lower += below;
    upper += above;
    return isSeen(below, lower) || isSeen(above, upper);
  });
  return { lower: lower / weights, upper: upper / weights };
}
