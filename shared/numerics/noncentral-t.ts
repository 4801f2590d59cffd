import { Tails } from './incomplete-beta';
import { normalTail } from './normal';

/** Terms this far below the largest cannot be seen in the sum. */
const UNSEEN = 1e-19;

/**
 * Both tails of noncentral t: T = (Z + ncp)/S, S = √(χ²_df/df). df > 0, may be Infinity; NaN off the domain.
 *
 * P(T ≤ t) = E[Φ(tS − ncp)]. With S = exp(u) the integrand falls off doubly exponentially, so the trapezoid rule in u
 * converges faster than any power of its step (Trefethen and Weideman 2014, SIAM Review 56, 385–458); the weights are
 * divided by their own sum. Each tail is a sum of positive terms, so small tails keep their digits.
 */
export function noncentralTTails(t: number, df: number, ncp: number): Tails {
  if (Number.isNaN(t) || Number.isNaN(ncp) || !(df > 0)) return { lower: NaN, upper: NaN };
  if (df === Infinity) return { lower: normalTail(ncp - t), upper: normalTail(t - ncp) };
  const size = Math.abs(ncp);
  const step = Math.min(
    0.06,
    0.33 / Math.sqrt(2 * df),
    0.4 / Math.min(Math.max(Math.abs(t), size), size + 9),
  );
  const sums = { lower: 0, upper: 0, weight: 0 };
  const add = (index: number): boolean => {
    const u = index * step;
    const log = df * (u - Math.expm1(2 * u) / 2);
    if (log < -700) return false;
    const weight = Math.exp(log);
    const z = t * Math.exp(u) - ncp;
    const lower = weight * normalTail(-z);
    const upper = weight * normalTail(z);
    sums.weight += weight;
    sums.lower += lower;
    sums.upper += upper;
    return weight > UNSEEN * sums.weight || lower > UNSEEN * sums.lower || upper > UNSEEN * sums.upper;
  };
  // From the peak of the weights outwards, until nothing is added any more. A small tail's own peak lies to one side,
  // where its terms still grow, so the sums decide and not the weights alone.
  add(0);
  for (let index = 1; add(index); index++);
  for (let index = -1; add(index); index--);
  return { lower: sums.lower / sums.weight, upper: sums.upper / sums.weight };
}
