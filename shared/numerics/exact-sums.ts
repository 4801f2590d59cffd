/** Sums that no order of the readings can change: exact up to the one rounding of the result. */
import { toNumber } from './fraction';
import { powerSums, spreadOf, toWholes } from './whole-readings';

const allFinite = (values: readonly number[]): boolean => values.every((value) => Number.isFinite(value));

/** n times the first whole and the sum of what the others differ from it. */
function total(values: readonly number[]): {
  readonly sum: bigint;
  readonly decimals: bigint;
  readonly exponent: number;
} {
  const { unit, origin, shifted } = toWholes(values);
  return {
    sum: origin * BigInt(values.length) + powerSums(shifted).sum,
    decimals: BigInt(unit.decimals),
    exponent: unit.exponent,
  };
}

/** Sum of the readings, rounded once. NaN when any is not finite; 0 of none. */
export function exactSum(values: readonly number[]): number {
  if (values.length === 0) return 0;
  if (!allFinite(values)) return NaN;
  const { sum, decimals, exponent } = total(values);
  return toNumber({ top: sum, bottom: decimals }, exponent);
}

/** Arithmetic mean, rounded once; in the unit of the readings. NaN of none, or when any is not finite. */
export function mean(values: readonly number[]): number {
  if (values.length === 0 || !allFinite(values)) return NaN;
  const { sum, decimals, exponent } = total(values);
  return toNumber({ top: sum, bottom: BigInt(values.length) * decimals }, exponent);
}

/** Sum of squared deviations over `divisor`, rounded once. */
function spread(values: readonly number[], divisor: bigint): number {
  const { unit, shifted } = toWholes(values);
  const decimals = BigInt(unit.decimals);
  const bottom = BigInt(values.length) * divisor * decimals * decimals;
  return toNumber({ top: spreadOf(powerSums(shifted)), bottom }, 2 * unit.exponent);
}

/**
 * Sum of squared deviations from the mean, (n Σx² − (Σx)²)/n in whole numbers, rounded once.
 * NaN of none, or when any reading is not finite.
 */
export const sumOfSquaredDeviations = (values: readonly number[]): number =>
  values.length === 0 || !allFinite(values) ? NaN : spread(values, 1n);

/** Sample variance with divisor n − 1, rounded once. NaN of fewer than two readings. */
export const sampleVariance = (values: readonly number[]): number =>
  values.length < 2 || !allFinite(values) ? NaN : spread(values, BigInt(values.length - 1));

/** Sample standard deviation with divisor n − 1, in the unit of the readings. NaN of fewer than two readings. */
export const sampleStandardDeviation = (values: readonly number[]): number =>
  Math.sqrt(sampleVariance(values));
