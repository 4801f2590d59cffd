/**
 * Means over S = √(χ²_df/df), the estimated standard deviation over the true one, by the trapezoid rule.
 *
 * With S = exp(u) and u = v + C(1 − e^−v) the density falls off doubly exponentially on both sides, so the rule converges
 * faster than any power of its step (Trefethen and Weideman 2014, SIAM Review 56, 385–458); the weights are divided by
 * their own sum. Each mean is a sum of positive terms, so small tails keep their digits.
 */

/** Bends the grid so that few degrees of freedom, whose S reaches down to e^−40 and beyond, need no more points than many. */
const BEND = 0.25;
/** Terms this far below the sum cannot be seen in it. */
const UNSEEN = 1e-19;

/**
 * Step in v. `rate` · S − `offset` is what the averaged function is a smooth step of, with unit width, like a normal tail.
 * Its three parts are the widths of the function, of the density and of the strip where exp(−e^u) stays small; all are in u,
 * and the slope brings them to v, taken where the function's step lies. Constants by trial against steps five times finer:
 * error 2e-15 for offsets to 30, degrees of freedom 0.3 to 30,000 and tails to 1e-12.
 */
export function scaleStep(df: number, rate: number, offset: number): number {
  const width = Math.abs(offset) + 0.1 * Math.min(Math.abs(rate), 15);
  const depth = Math.max(0, Math.log(Math.abs(rate) / (Math.abs(offset) + 1)));
  const slope = 1 + BEND + 0.7 * depth;
  return 1 / (slope * Math.sqrt(6.5 * 6.5 + (width * width + 2 * df) / (0.62 * 0.62)));
}

/**
 * Visits the points from the peak of the density outwards, until neither the density nor the visitor sees anything more.
 * A small tail's own peak lies to one side, where its terms still grow, so the visitor decides and not the density alone.
 * @param visit adds up weight times function; returns whether what it added could be seen
 * @returns sum of the weights
 */
export function overScale(df: number, step: number, visit: (s: number, weight: number) => boolean): number {
  let total = 0;
  const at = (index: number): boolean => {
    const v = index * step;
    const bent = Math.expm1(-v);
    const u = v - BEND * bent;
    const double = Math.expm1(2 * u);
    const log = df * (df > 500 && Math.abs(u) < 0.25 ? -excess(u) : u - double / 2);
    if (!(log > -700)) return false;
    const weight = Math.exp(log) * (1 + BEND + BEND * bent);
    total += weight;
    const seen = visit(u < -1 ? Math.exp(u) : Math.sqrt(1 + double), weight);
    return seen || weight > UNSEEN * total;
  };
  at(0);
  for (let index = 1; at(index); index++);
  for (let index = -1; at(index); index--);
  return total;
}

/** Whether a term can be seen in its sum. */
export const isSeen = (term: number, sum: number): boolean => term > UNSEEN * sum;

/** (e^2u − 1)/2 − u = Σ 2ⁿ⁻¹ uⁿ/n! from n = 2, without the cancellation that many degrees of freedom would magnify. */
function excess(u: number): number {
  let sum = 1;
  for (let n = 17; n >= 3; n--) sum = 1 + (sum * 2 * u) / n;
  return u * u * sum;
}
