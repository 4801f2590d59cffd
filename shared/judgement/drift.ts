import { studentQuantile, studentTwoSided, exactSum, mean } from '../numerics';

/** A run as drift sees it: which of the two coolers, its place in the order of testing, its value. */
export interface OrderedValue {
  readonly first: boolean;
  readonly order: number;
  readonly value: number;
}

export interface DriftResult {
  /** Mean place of the first cooler's runs minus that of the second's, in runs. */
  readonly orderDifference: number;
  /** 1/(1 − R²) of cooler on order: 1 when mixed, large when order and cooler can't be told apart. */
  readonly varianceInflation: number;
  /** Change per run, in the metric's unit. */
  readonly slope: number;
  readonly slopeP: number;
  readonly slopeInterval: readonly [number, number];
  /** Gap first − second with the drift taken out. */
  readonly adjustedGap: number;
  readonly adjustedStandardError: number;
  readonly adjustedDegreesOfFreedom: number;
  readonly adjustedP: number;
  readonly adjustedMargin: number;
}

/**
 * Straight-line drift over the order of testing, and the gap without it: least squares of value on 1, cooler and place
 * 1…N. The gap's variance takes each cooler's own residual variance, RSS_c/(n_c − 1.5), and Satterthwaite degrees of freedom.
 * Null with fewer than three runs of either, or when order and cooler are the same thing.
 */
export function drift(runs: readonly OrderedValue[], confidence: number): DriftResult | null {
  const sorted = [...runs].sort((a, b) => a.order - b.order || a.value - b.value);
  const n = sorted.length;
  const n1 = sorted.filter(({ first }) => first).length;
  const n2 = n - n1;
  if (n1 < 3 || n2 < 3) return null;
  const places = sorted.map((_, index) => index + 1);
  const placesOf = (first: boolean) => places.filter((_, index) => sorted[index].first === first);
  const centre1 = mean(placesOf(true));
  const centre2 = mean(placesOf(false));
  const centred = places.map((place, index) => place - (sorted[index].first ? centre1 : centre2));
  const insideSquares = exactSum(centred.map((place) => place * place));
  const middle = (n + 1) / 2;
  const allSquares = exactSum(places.map((place) => (place - middle) ** 2));
  if (!(insideSquares > 1e-9 * allSquares)) return null;
  const orderDifference = centre1 - centre2;

  const slope = exactSum(sorted.map(({ value }, index) => (value * centred[index]) / insideSquares));
  const valuesOf = (first: boolean) => sorted.filter((run) => run.first === first).map(({ value }) => value);
  const mean1 = mean(valuesOf(true));
  const mean2 = mean(valuesOf(false));
  const adjustedGap = mean1 - mean2 - slope * orderDifference;

  const residuals = sorted.map(
    ({ first, value }, index) => value - (first ? mean1 : mean2) - slope * centred[index],
  );
  const squaresOf = (first: boolean) =>
    exactSum(residuals.map((residual, index) => (sorted[index].first === first ? residual * residual : 0)));
  const weightsOf = (first: boolean) =>
    exactSum(
      sorted.map((run, index) => {
        if (run.first !== first) return 0;
        const weight = (first ? 1 / n1 : -1 / n2) - (orderDifference * centred[index]) / insideSquares;
        return weight * weight;
      }),
    );
  const part1 = (weightsOf(true) * squaresOf(true)) / (n1 - 1.5);
  const part2 = (weightsOf(false) * squaresOf(false)) / (n2 - 1.5);
  const variance = part1 + part2;
  const adjustedDegreesOfFreedom = variance ** 2 / (part1 ** 2 / (n1 - 1.5) + part2 ** 2 / (n2 - 1.5));
  const adjustedStandardError = Math.sqrt(variance);

  const slopeDf = n - 3;
  const slopeError = Math.sqrt((squaresOf(true) + squaresOf(false)) / slopeDf / insideSquares);
  const slopeMargin = studentQuantile((1 + confidence) / 2, slopeDf) * slopeError;
  return {
    orderDifference,
    varianceInflation: 1 / (1 - share(n1, n2, orderDifference, allSquares)),
    slope,
    slopeP: studentTwoSided(slope / slopeError, slopeDf),
    slopeInterval: [slope - slopeMargin, slope + slopeMargin],
    adjustedGap,
    adjustedStandardError,
    adjustedDegreesOfFreedom,
    adjustedP: studentTwoSided(adjustedGap / adjustedStandardError, adjustedDegreesOfFreedom),
    adjustedMargin: studentQuantile((1 + confidence) / 2, adjustedDegreesOfFreedom) * adjustedStandardError,
  };
}

/** R² of cooler on order: between-cooler part of the places' sum of squares. */
const share = (n1: number, n2: number, difference: number, allSquares: number): number =>
  ((n1 * n2) / (n1 + n2)) * ((difference * difference) / allSquares);
