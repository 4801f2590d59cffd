import { fTail } from '../numerics';
import { Side } from './welch';

export interface OmnibusResult {
  readonly statistic: number;
  readonly degreesOfFreedom: readonly [number, number];
  readonly p: number;
}

/**
 * Welch's analysis of variance: are all true means equal, spreads not assumed so? Null with a side of one unit or no spread.
 * Source: Welch 1951, Biometrika 38, 330–336.
 */
export function welchAnova(sides: readonly Side[]): OmnibusResult | null {
  const k = sides.length;
  if (k < 2 || sides.some(({ units, variance }) => units < 2 || !(variance > 0))) return null;
  const weights = sides.map(({ units, variance }) => units / variance);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const centre = sides.reduce((sum, { mean }, index) => sum + weights[index] * mean, 0) / total;
  const between = sides.reduce((sum, { mean }, index) => sum + weights[index] * (mean - centre) ** 2, 0);
  const lambda = sides.reduce(
    (sum, { units }, index) => sum + (1 - weights[index] / total) ** 2 / (units - 1),
    0,
  );
  const statistic = between / (k - 1) / (1 + (2 * (k - 2) * lambda) / (k * k - 1));
  const degreesOfFreedom = [k - 1, (k * k - 1) / (3 * lambda)] as const;
  return { statistic, degreesOfFreedom, p: fTail(statistic, ...degreesOfFreedom) };
}

/**
 * Bars over coolers sorted by their means: each joins a longest stretch within which no pair is told apart. A cooler may
 * stand under two bars, since "not told apart" does not pass on from one to the next.
 * @param order positions of the coolers by mean, lowest first
 * @param apart whether two coolers are outside each other's noise
 * @returns positions of the coolers each bar joins; single coolers have no bar
 */
export function bars(order: readonly number[], apart: (a: number, b: number) => boolean): number[][] {
  const found: number[][] = [];
  let reached = -1;
  for (let from = 0; from < order.length; from++) {
    let to = from;
    while (
      to + 1 < order.length &&
      order.slice(from, to + 1).every((cooler) => !apart(cooler, order[to + 1]))
    )
      to++;
    // A stretch inside the one before says nothing new.
    if (to > from && to > reached) found.push(order.slice(from, to + 1));
    reached = Math.max(reached, to);
  }
  return found;
}
