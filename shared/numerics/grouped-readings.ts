import { Fraction, minus, plus, toNumber, ZERO } from './fraction';
import { PowerSums, powerSums, Shifted, spreadOf, toWholes, Unit } from './whole-readings';

/** Readings of several groups on one common whole-number scale, so that sums over groups stay exact. */
export interface GroupedReadings {
  readonly unit: Unit;
  readonly origin: bigint;
  /** Sums of each group, of readings less the origin. */
  readonly groups: readonly PowerSums[];
}

const slice = (shifted: Shifted, from: number, to: number): Shifted =>
  shifted instanceof Float64Array ? shifted.subarray(from, to) : shifted.slice(from, to);

/** Null when a reading is not finite or there is none. */
export function groupReadings(groups: readonly (readonly number[])[]): GroupedReadings | null {
  const all = groups.flat();
  if (all.length === 0 || !all.every((value) => Number.isFinite(value))) return null;
  const { unit, origin, shifted } = toWholes(all);
  let from = 0;
  return {
    unit,
    origin,
    groups: groups.map(({ length }) => powerSums(slice(shifted, from, (from += length)))),
  };
}

/** Sums of the groups together. */
export const together = (groups: readonly PowerSums[]): PowerSums =>
  groups.reduce(
    (all, { count, sum, squares }) => ({
      count: all.count + count,
      sum: all.sum + sum,
      squares: all.squares + squares,
    }),
    { count: 0n, sum: 0n, squares: 0n },
  );

/** Squared deviations from each group's own mean, in squares of the whole unit. */
export const within = (groups: readonly PowerSums[]): Fraction =>
  groups.reduce(
    (sum, group) => (group.count > 0n ? plus(sum, { top: spreadOf(group), bottom: group.count }) : sum),
    ZERO,
  );

/** Squared deviations of the groups' means from the mean of all, each counted as often as the group has readings. */
export const between = (groups: readonly PowerSums[]): Fraction =>
  minus(within([together(groups)]), within(groups));

/** A group of readings as far as a likelihood needs it. */
export interface GroupSummary {
  readonly count: number;
  /** Mean of the group less the mean of all readings. */
  readonly mean: number;
  /** Squared deviations from the group's mean. */
  readonly squares: number;
}

/** Groups, none empty, each figure rounded once: an offset common to all readings costs no digit. */
export function summarise({ unit, groups }: GroupedReadings): readonly GroupSummary[] {
  const all = together(groups);
  const decimals = BigInt(unit.decimals);
  return groups.map((group) => ({
    count: Number(group.count),
    mean: toNumber(
      {
        top: group.sum * all.count - all.sum * group.count,
        bottom: group.count * all.count * decimals,
      },
      unit.exponent,
    ),
    squares: toNumber({ top: spreadOf(group), bottom: group.count * decimals * decimals }, 2 * unit.exponent),
  }));
}
