import { fTail } from './fisher-f';
import { Fraction, minus, toNumber } from './fraction';
import { between, groupReadings, GroupedReadings, together, within } from './grouped-readings';
import { PowerSums } from './whole-readings';

/** A line of an analysis-of-variance table; squares in the square of the readings' unit. */
export interface VarianceSource {
  readonly sumOfSquares: number;
  readonly degreesOfFreedom: number;
  /** NaN without degrees of freedom. */
  readonly meanSquare: number;
}

export interface OneWayAnalysis {
  readonly between: VarianceSource;
  readonly within: VarianceSource;
  /** Between over within mean square; ∞ when only the latter is 0, NaN when both are or either is missing. */
  readonly f: number;
  /** P(F > f) when all groups have one mean. */
  readonly p: number;
}

const MISSING: VarianceSource = { sumOfSquares: NaN, degreesOfFreedom: 0, meanSquare: NaN };

/** A sum of squares back in the readings' unit, rounded once; so is its mean square. */
function source(squares: Fraction, degreesOfFreedom: number, { unit }: GroupedReadings): VarianceSource {
  const scale = BigInt(unit.decimals) ** 2n;
  const inUnits = (divisor: bigint): number =>
    toNumber({ top: squares.top, bottom: squares.bottom * scale * divisor }, 2 * unit.exponent);
  return {
    sumOfSquares: inUnits(1n),
    degreesOfFreedom,
    meanSquare: degreesOfFreedom > 0 ? inUnits(BigInt(degreesOfFreedom)) : NaN,
  };
}

/** Mean square of `a` over that of `b`, rounded once. */
function ratio(a: Fraction, dfA: number, b: Fraction, dfB: number): number {
  if (dfA < 1 || dfB < 1) return NaN;
  if (b.top === 0n) return a.top === 0n ? NaN : Infinity;
  return toNumber({ top: a.top * b.bottom * BigInt(dfB), bottom: a.bottom * b.top * BigInt(dfA) });
}

/**
 * One-way analysis of variance. Every figure but p is exact up to one rounding, in any order of readings and groups.
 * Groups without readings are left out; NaN throughout when a reading is not finite or there is none.
 */
export function oneWayAnalysis(groups: readonly (readonly number[])[]): OneWayAnalysis {
  const readings = groupReadings(groups.filter(({ length }) => length > 0));
  if (!readings) return { between: MISSING, within: MISSING, f: NaN, p: NaN };
  const count = Number(together(readings.groups).count);
  const dfBetween = readings.groups.length - 1;
  const dfWithin = count - readings.groups.length;
  const squaresBetween = between(readings.groups);
  const squaresWithin = within(readings.groups);
  const f = ratio(squaresBetween, dfBetween, squaresWithin, dfWithin);
  return {
    between: source(squaresBetween, dfBetween, readings),
    within: source(squaresWithin, dfWithin, readings),
    f,
    p: fTail(f, dfBetween, dfWithin),
  };
}

/** Three-level nested design: outer groups of inner groups of readings. */
export type NestedReadings = readonly (readonly (readonly number[])[])[];

export interface NestedAnalysis {
  readonly outer: VarianceSource;
  /** Inner groups within outer groups. */
  readonly inner: VarianceSource;
  readonly residual: VarianceSource;
}

/** Inner and outer groups that hold readings. */
export const filled = (readings: NestedReadings): NestedReadings =>
  readings.map((outer) => outer.filter(({ length }) => length > 0)).filter(({ length }) => length > 0);

/** Nested analysis of variance, exact like `oneWayAnalysis`. */
export function nestedAnalysis(design: NestedReadings): NestedAnalysis {
  const outerGroups = filled(design);
  const readings = groupReadings(outerGroups.flat());
  if (!readings) return { outer: MISSING, inner: MISSING, residual: MISSING };
  const innerSums = readings.groups;
  let from = 0;
  const outerSums: PowerSums[] = outerGroups.map(({ length }) =>
    together(innerSums.slice(from, (from += length))),
  );
  const count = Number(together(innerSums).count);
  return {
    outer: source(between(outerSums), outerSums.length - 1, readings),
    inner: source(
      minus(between(innerSums), between(outerSums)),
      innerSums.length - outerSums.length,
      readings,
    ),
    residual: source(within(innerSums), count - innerSums.length, readings),
  };
}
