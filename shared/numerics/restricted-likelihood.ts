import { GroupSummary } from './grouped-readings';
import { add, constant, Jet, logarithm, parameter, reciprocal, times } from './second-derivatives';

/** A group of groups, of readings at the bottom. */
export type NestedSummary = GroupSummary | { readonly groups: readonly NestedSummary[] };

export interface RestrictedLikelihood {
  /** −2 ln of the restricted likelihood, but for the constant (N − 1) ln 2π, with derivatives by each variance. */
  readonly deviance: Jet;
  readonly mean: number;
  /** Variance of the mean's estimate. */
  readonly varianceOfMean: number;
}

/**
 * Restricted likelihood of nested random effects with one common mean.
 * @param variances residual first, then of groups from the innermost level to the outermost, all of one design
 *
 * The mean of an innermost group has variance v = σ₁² + σ₀²/n; groups of groups combine by precision, w = 1/v, their mean
 * having 1/Σw plus the next level's variance. Each step leaves Σ ln v + ln Σw + Σ w (m − m̄)² behind, the readings
 * (n − 1) ln σ₀² + squares/σ₀² + ln n. Source: the block structure of V in Searle, Casella and McCulloch (1992, section 6.6),
 * derived here; agrees with lme4 and with high-precision solutions to the tolerances of reference-data/.
 */
export function restrictedLikelihood(
  design: { readonly groups: readonly NestedSummary[] },
  variances: readonly number[],
): RestrictedLikelihood {
  const parameters = variances.length;
  const jets = variances.map((variance, index) => parameter(variance, index, parameters));
  const residual = jets[0];
  const inverseResidual = reciprocal(residual);
  const logResidual = logarithm(residual);
  let deviance = constant(0, parameters);

  /** Mean of a group and the variance of that mean without the group's own effect. */
  const estimate = (
    group: NestedSummary,
  ): { readonly mean: Jet; readonly variance: Jet; readonly level: number } => {
    if (!('groups' in group)) {
      deviance = add(deviance, logResidual, group.count - 1);
      deviance = add(deviance, inverseResidual, group.squares);
      deviance = add(deviance, constant(Math.log(group.count), parameters));
      const variance = add(constant(0, parameters), residual, 1 / group.count);
      return { mean: constant(group.mean, parameters), variance, level: 1 };
    }
    const parts = group.groups.map((each) => {
      const { mean, variance, level } = estimate(each);
      const total = add(variance, jets[level]);
      deviance = add(deviance, logarithm(total));
      return { mean, level, weight: reciprocal(total) };
    });
    const weights = parts.reduce((sum, { weight }) => add(sum, weight), constant(0, parameters));
    const variance = reciprocal(weights);
    const weighted = parts.reduce(
      (sum, { mean, weight }) => add(sum, times(weight, mean)),
      constant(0, parameters),
    );
    const mean = times(weighted, variance);
    deviance = add(deviance, logarithm(weights));
    for (const part of parts) {
      const off = add(part.mean, mean, -1);
      deviance = add(deviance, times(part.weight, times(off, off)));
    }
    return { mean, variance, level: parts[0].level + 1 };
  };
  const { mean, variance } = estimate(design);
  return { deviance, mean: mean.value, varianceOfMean: variance.value };
}
