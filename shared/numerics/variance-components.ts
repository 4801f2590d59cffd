import { filled, nestedAnalysis, NestedReadings, oneWayAnalysis } from './analysis-of-variance';
import { mean as meanOf, sampleVariance } from './exact-sums';
import { groupReadings, GroupSummary, summarise } from './grouped-readings';
import { maximiseRestricted } from './maximise-restricted';
import { NestedSummary } from './restricted-likelihood';

interface Estimated {
  /** Mean of all, weighted as the components imply, and its standard error; in the readings' unit. */
  readonly mean: number;
  readonly standardError: number;
  /** ln of the restricted likelihood; ∞ when readings of a group never differ. */
  readonly logLikelihood: number;
}

/** The parts of a reading's variance, in the square of the readings' unit. */
export interface OneWayParts {
  readonly between: number;
  readonly within: number;
}

export interface NestedParts {
  readonly outer: number;
  /** Of inner groups within an outer one. */
  readonly inner: number;
  readonly residual: number;
}

/** By restricted maximum likelihood, never below 0; NaN where the data cannot tell the parts apart. */
export interface OneWayComponents extends OneWayParts, Estimated {
  /** By equating mean squares with their expectations: `between` may be below 0. */
  readonly unbiased: OneWayParts;
}

/** By restricted maximum likelihood, never below 0; NaN where the data cannot tell the parts apart. */
export interface NestedComponents extends NestedParts, Estimated {
  /** By equating mean squares with their expectations: `outer` and `inner` may be below 0. */
  readonly unbiased: NestedParts;
}

const UNKNOWN: Estimated = { mean: NaN, standardError: NaN, logLikelihood: NaN };

const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);
const squared = (values: readonly number[]): number => sum(values.map((value) => value * value));
const size = (groups: readonly (readonly number[])[]): number => sum(groups.map(({ length }) => length));

/**
 * Random effects of groups around one common mean, any numbers of readings per group; groups without readings are left out.
 * Source of the unbiased estimates: Searle, Casella and McCulloch (1992), Variance Components, section 3.6.
 */
export function oneWayComponents(groups: readonly (readonly number[])[]): OneWayComponents {
  const held = groups.filter(({ length }) => length > 0);
  const { between, within } = oneWayAnalysis(held);
  const counts = held.map(({ length }) => length);
  const total = sum(counts);
  const typical = (total - squared(counts) / total) / (held.length - 1);
  const unbiased: OneWayParts = {
    between: (between.meanSquare - within.meanSquare) / typical,
    within: within.meanSquare,
  };
  if (!(between.degreesOfFreedom > 0) || !(within.degreesOfFreedom > 0)) {
    return { ...UNKNOWN, between: NaN, within: within.meanSquare, unbiased };
  }
  if (within.sumOfSquares === 0) {
    const means = held.map(([first]) => first);
    const variance = sampleVariance(means);
    return {
      between: variance,
      within: 0,
      unbiased,
      mean: meanOf(means),
      standardError: Math.sqrt(variance / means.length),
      logLikelihood: Infinity,
    };
  }
  const { variances, ...estimated } = estimate(held, (summaries) => inOrder(summaries), [
    unbiased.within,
    unbiased.between,
  ]);
  return { between: variances[1], within: variances[0], unbiased, ...estimated };
}

/**
 * Random effects of outer groups, and of inner groups within them, around one common mean; any numbers of readings.
 * Source of the unbiased estimates: Searle, Casella and McCulloch (1992), Variance Components, section 5.3 (Henderson's
 * method; the coefficients were derived anew and agree with R's nlme for a balanced design).
 */
export function nestedComponents(design: NestedReadings): NestedComponents {
  const held = filled(design);
  const { outer, inner, residual } = nestedAnalysis(held);
  const counts = held.map((groups) => groups.map(({ length }) => length));
  const total = sum(counts.flat());
  const shares = sum(counts.map((each) => squared(each) / sum(each)));
  const innerVariance =
    (inner.sumOfSquares - inner.degreesOfFreedom * residual.meanSquare) / (total - shares);
  const unbiased: NestedParts = {
    outer:
      (outer.sumOfSquares -
        outer.degreesOfFreedom * residual.meanSquare -
        (shares - squared(counts.flat()) / total) * innerVariance) /
      (total - squared(held.map(size)) / total),
    inner: innerVariance,
    residual: residual.meanSquare,
  };
  if (![outer, inner, residual].every(({ degreesOfFreedom }) => degreesOfFreedom > 0)) {
    return { ...UNKNOWN, outer: NaN, inner: NaN, residual: residual.meanSquare, unbiased };
  }
  if (residual.sumOfSquares === 0) {
    const { between, within, ...means } = oneWayComponents(
      held.map((groups) => groups.map(([first]) => first)),
    );
    return { ...means, outer: between, inner: within, residual: 0, unbiased, logLikelihood: Infinity };
  }
  const nest = (summaries: readonly GroupSummary[]): NestedSummary[] => {
    let from = 0;
    return held
      .map(({ length }) => inOrder(summaries.slice(from, (from += length))))
      .sort(byGroups)
      .map((groups) => ({ groups }));
  };
  const { variances, ...estimated } = estimate(held.flat(), nest, [
    unbiased.residual,
    unbiased.inner,
    unbiased.outer,
  ]);
  return { outer: variances[2], inner: variances[1], residual: variances[0], unbiased, ...estimated };
}

/** One order whatever order the groups came in, so that it changes no digit. */
const byMean = (a: GroupSummary, b: GroupSummary): number =>
  a.mean - b.mean || a.count - b.count || a.squares - b.squares;
const inOrder = (groups: readonly GroupSummary[]): GroupSummary[] => [...groups].sort(byMean);
const byGroups = (a: readonly GroupSummary[], b: readonly GroupSummary[]): number =>
  a.length - b.length || a.reduce((order, group, index) => order || byMean(group, b[index]), 0);

/** Works in units of the readings' own spread, so that the variances are of the order of 1. */
function estimate(
  groups: readonly (readonly number[])[],
  nest: (summaries: readonly GroupSummary[]) => readonly NestedSummary[],
  start: readonly number[],
): Estimated & { readonly variances: readonly number[] } {
  const all = groups.flat();
  const scale = Math.sqrt(sampleVariance(all));
  const readings = groupReadings(groups);
  if (!readings) return { ...UNKNOWN, variances: start.map(() => NaN) };
  const summaries = summarise(readings).map(({ count, mean, squares }) => ({
    count,
    mean: mean / scale,
    squares: squares / (scale * scale),
  }));
  const found = maximiseRestricted(
    { groups: nest(summaries) },
    start.map((variance) => Math.max(variance / (scale * scale), 0.01)),
  );
  return {
    variances: found.variances.map((variance) => variance * scale * scale),
    mean: meanOf(all) + found.mean * scale,
    standardError: Math.sqrt(found.varianceOfMean) * scale,
    logLikelihood: -(found.deviance.value + (all.length - 1) * Math.log(2 * Math.PI * scale * scale)) / 2,
  };
}
