import { PairResult, StatedUncertainty } from '../contracts/judgement';
import { Ground, PairSetting } from './pair-setting';
import { combine, standardUncertainty } from './uncertainty-budget';
import { VariancePart, WelchResult } from './welch';

type Stated = readonly StatedUncertainty[];
type Line = NonNullable<PairResult['budget']>['lines'][number];

/** What a stated source does to a gap of two means, and why, where that is not plain. */
function effectOf(stated: StatedUncertainty, meanA: number, meanB: number): readonly [number, string | null] {
  const u = standardUncertainty(stated.value, stated.distribution);
  if (stated.varies === 'per mount' || stated.varies === 'per run')
    return [0, 'Already in the scatter of the units.'];
  if (stated.kind === 'additive')
    return stated.varies === 'never'
      ? [0, 'The same for both coolers, so it cancels in the gap.']
      : [Math.SQRT2 * u, null];
  return [stated.varies === 'never' ? Math.abs(meanA - meanB) * u : Math.hypot(meanA, meanB) * u, null];
}

/** Parts of the gap's variance that were stated rather than measured; those that cancel are not among them. */
export function statedParts(stated: Stated, meanA: number, meanB: number): VariancePart[] {
  return stated.flatMap((one) => {
    const [u] = effectOf(one, meanA, meanB);
    return u > 0 ? [{ variance: u * u, degreesOfFreedom: one.degreesOfFreedom ?? Infinity }] : [];
  });
}

/** The gap's uncertainty by source. The verdict's standard error is the combined one, so both say the same. */
export function budgetOf(
  ground: Ground,
  result: WelchResult,
  { bench, uncertainties, rules }: PairSetting,
): PairResult['budget'] {
  const { basis, evidence, options } = ground;
  const [first, second] = evidence;
  const lines: Line[] = [];
  const add = (source: string, uncertainty: number, df: number, note: string | null = null) =>
    lines.push({ source, uncertainty, degreesOfFreedom: Number.isFinite(df) ? df : null, note });
  if (basis === 'borrowed mounts') {
    const [lender, borrower] = first.unit === 'mount' ? [first, second] : [second, first];
    const m = lender.values.length;
    const n = borrower.values.length;
    add(`Mounting of ${lender.name}`, Math.sqrt(lender.variance / m), m - 1);
    add(`Mounting of ${borrower.name}`, Math.sqrt(lender.variance), m - 1, `Taken from ${lender.name}.`);
    add(`Repeatability of ${borrower.name}`, Math.sqrt(borrower.variance / n), n - 1);
  } else {
    const what = basis === 'mounts' ? 'Mounting and repeatability' : 'Repeatability';
    for (const { name, variance, values } of evidence)
      add(`${what} of ${name}`, Math.sqrt(variance / values.length), values.length - 1);
  }
  if (basis === 'bench history' && bench)
    add('Mounting, from the bench’s past', Math.SQRT2 * bench.mountSpread, bench.mountSpreadDegreesOfFreedom);
  if (options.extraVariance) add('Sensor step', Math.sqrt(options.extraVariance), Infinity);
  for (const one of uncertainties) {
    const [u, note] = effectOf(one, first.mean, second.mean);
    add(one.source, u, one.degreesOfFreedom ?? Infinity, note);
  }
  const whole = combine(
    lines.map(({ uncertainty, degreesOfFreedom }) => ({
      uncertainty,
      degreesOfFreedom: degreesOfFreedom ?? Infinity,
    })),
    rules.confidence,
  );
  // The judgement's own degrees of freedom may be capped below the formula's: the wider figure is told.
  return {
    lines,
    standardUncertainty: whole.standardUncertainty,
    degreesOfFreedom: result.degreesOfFreedom,
    coverageFactor: result.marginOfError / result.standardError,
    expanded: result.marginOfError,
  };
}
