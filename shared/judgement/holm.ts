/**
 * Holm's step-down rule over several comparisons: with m of them the smallest p is held against α/m, the next against
 * α/(m − 1), and so on until one fails; all after it fail too.
 * Source: Holm 1979, Scandinavian Journal of Statistics 6, 65–70.
 */
export interface HolmStep {
  /** min(1, (m − k + 1) p), never below that of a smaller p. */
  readonly adjusted: number;
  /** The level that this comparison was held against; for those after the first failure, that failure's. */
  readonly level: number;
}

/** @param ps raw p values, in any order @returns steps in the same order */
export function holm(ps: readonly number[], alpha: number): HolmStep[] {
  const order = ps.map((p, index) => ({ p, index })).sort((x, y) => x.p - y.p || x.index - y.index);
  const steps = new Array<HolmStep>(ps.length);
  let adjusted = 0;
  let level = alpha;
  let failed = false;
  order.forEach(({ p, index }, rank) => {
    const left = ps.length - rank;
    adjusted = Math.min(1, Math.max(adjusted, left * p));
    if (!failed) {
      level = alpha / left;
      failed = !(p < level);
    }
    steps[index] = { adjusted, level };
  });
  return steps;
}
