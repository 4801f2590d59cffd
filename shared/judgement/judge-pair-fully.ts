import { BenchHistory, JudgedCooler, PairResult } from '../contracts/judgement';
import { budgetOf, statedParts } from './budget';
import { Evidence, mountEvidence, runEvidence, showsRemounting, side } from './evidence';
import {
  concluded,
  commonEvidence,
  naiveResult,
  optionsFor,
  reason,
  Reason,
  Rules,
  tippingSpread,
  tooLittle,
  withoutCall,
} from './judge-pair';
import { Ground, PairSetting } from './pair-setting';
import { secondOpinions } from './second-opinions';
import { unitsNeeded } from './units-needed';
import { leaveOneOut, moreEvidence } from './what-would-change';
import { isOutside, VariancePart, welch, WelchOptions } from './welch';
import { plainPower, quickWelchPower } from './welch-power';

/** Fewer degrees of freedom say too little about how far remounting moves a reading. */
const LEAST_HISTORY = 4;
/** Fewer mounts of the one cooler are too few to stand for both. */
const LEAST_TO_BORROW = 3;

export const historyServes = (bench: BenchHistory | null): bench is BenchHistory =>
  bench !== null && bench.mountSpreadDegreesOfFreedom >= LEAST_HISTORY;

/** Judges the gap a − b by the second edition of the rules: history and borrowed mounts, second opinions, needs and budget. */
export function judgePairFully(a: JudgedCooler, b: JudgedCooler, setting: PairSetting): PairResult {
  const { rules } = setting;
  const ground = groundFor(a, b, setting);
  if ('code' in ground) return { ...withoutCall(a, b, rules, ground, null), basis: null };
  const { basis, evidence, result, options, lacking } = ground;
  const [first, second] = evidence;
  if (!result || (lacking && lacking.code !== 'too few runs')) {
    const why = lacking ?? reason('no spread measured', 'No spread was measured, so noise is unknown.');
    return { ...withoutCall(a, b, rules, why, evidence), basis: null };
  }
  const own = basis === 'mounts' || basis === 'runs';
  const certain = (options.extras ?? []).length === 0 && !options.extraVariance;
  const power =
    own && certain
      ? quickWelchPower(side(first), side(second), { ...options, confidence: rules.confidence })
      : plainPower(result.standardError, result.degreesOfFreedom, rules.confidence);
  const outside = isOutside(result);
  const pair: PairResult = {
    ...concluded(a, b, rules, result, power, lacking),
    scope: basis === 'bench history' ? 'bench history' : basis === 'runs' ? 'runs only' : 'mounts',
    unitOfEvidence: basis === 'borrowed mounts' ? 'mount' : first.unit,
    tippingMountSpread:
      basis === 'runs' && outside && !lacking
        ? tippingSpread(result)
        : basis === 'bench history'
          ? runsAloneTipping(evidence, rules)
          : null,
    naive: basis === 'runs' ? null : naiveResult(a, b, rules.confidence),
    more: lacking || !own ? [] : moreEvidence(a, b, evidence, result, rules.confidence),
    leaveOneOut: lacking || !own ? null : leaveOneOut(a, b, first.unit, options, outside),
    basis,
    unitsNeeded: lacking || !own ? null : unitsNeeded(a, b, evidence, rules),
    budget: budgetOf(ground, result, setting),
  };
  return { ...pair, ...secondOpinions(pair, a, b, evidence, setting) };
}

/** The pair's own p before anything is known of other pairs; null where there is no call to make. */
export function pOf(a: JudgedCooler, b: JudgedCooler, setting: PairSetting): number | null {
  const ground = groundFor(a, b, setting);
  return 'code' in ground || ground.lacking || !ground.result ? null : ground.result.p;
}

/** What the pair can be judged on, or why on nothing. */
function groundFor(a: JudgedCooler, b: JudgedCooler, setting: PairSetting): Ground | Reason {
  const remounted = [showsRemounting(a), showsRemounting(b)];
  if (remounted[0] !== remounted[1]) return borrowedGround(a, b, setting);
  const evidence = commonEvidence(a, b);
  if ('code' in evidence) return evidence;
  const [first, second] = evidence;
  const lacking = tooLittle(first, second);
  const options = {
    ...optionsFor(a, b, evidence, setting.rules),
    extras: statedParts(setting.uncertainties, first.mean, second.mean),
  };
  if (!remounted[0] && historyServes(setting.bench)) {
    const few = first.values.length < 2 || second.values.length < 2;
    const extras = [...options.extras, historyPart(setting.bench)];
    if (!few) {
      const result = welch(side(first), side(second), { ...options, extras });
      return {
        basis: 'bench history',
        evidence,
        result,
        options: { ...options, extras },
        lacking: null,
      };
    }
  }
  const result = welch(side(first), side(second), options);
  return { basis: first.unit === 'mount' ? 'mounts' : 'runs', evidence, result, options, lacking };
}

/** Both coolers were fitted once: each fitting moves its mean by what fittings moved means in the bench's past. */
export const historyPart = ({ mountSpread, mountSpreadDegreesOfFreedom }: BenchHistory): VariancePart => ({
  variance: 2 * mountSpread ** 2,
  degreesOfFreedom: mountSpreadDegreesOfFreedom,
});

/** What remounting would have to amount to, by the runs alone. */
function runsAloneTipping([first, second]: readonly [Evidence, Evidence], rules: Rules): number | null {
  const alone = welch(side(first), side(second), { confidence: rules.confidence });
  return alone && isOutside(alone) ? tippingSpread(alone) : null;
}

/**
 * One cooler remounted, the other fitted once: the first one's mount spread stands for both, with m − 1 degrees of freedom.
 * SE² = v(1 + 1/m) + s²/r. Satterthwaite's gain in degrees of freedom is not taken: it over-claims with few mounts.
 */
function borrowedGround(
  a: JudgedCooler,
  b: JudgedCooler,
  { rules, uncertainties }: PairSetting,
): Ground | Reason {
  const aHasMounts = showsRemounting(a);
  const [several, single] = aHasMounts ? [a, b] : [b, a];
  const lender = mountEvidence(several);
  const borrower = runEvidence(single);
  const m = lender.values.length;
  const evidence = aHasMounts ? ([lender, borrower] as const) : ([borrower, lender] as const);
  const lacking = reason(
    'mixed mounts',
    `${several.name} was remounted, ${single.name} was not: how far remounting moves ${single.name} is unknown. Add a second mount of ${single.name}, and better a third.`,
  );
  if (m < LEAST_TO_BORROW || borrower.values.length < 2) return lacking;
  const runs = borrower.variance / borrower.values.length;
  const variance = lender.variance * (1 + 1 / m) + runs;
  if (!(variance > 0)) return reason('no spread measured', 'No spread was measured, so noise is unknown.');
  const { extraVariance } = optionsFor(a, b, [borrower, borrower], rules);
  // As two sides of equal spread whose degrees of freedom are capped at m − 1, the arithmetic is Welch's own.
  const options: WelchOptions = {
    confidence: rules.confidence,
    degreesOfFreedomCap: m - 1,
    extraVariance,
    extras: statedParts(uncertainties, evidence[0].mean, evidence[1].mean),
  };
  const half = { variance: (variance * m) / 2, units: m };
  const result = welch({ ...half, mean: evidence[0].mean }, { ...half, mean: evidence[1].mean }, options);
  return { basis: 'borrowed mounts', evidence, result, options, lacking: null };
}
