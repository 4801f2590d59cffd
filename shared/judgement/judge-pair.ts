import { JudgedCooler, NotJudgedCode, PairResult, SizeCall } from '../contracts/judgement';
import {
  degreesOfFreedomCap,
  Evidence,
  filledMounts,
  mountEvidence,
  runEvidence,
  showsRemounting,
  side,
} from './evidence';
import { stepEffect } from './sensor-step';
import { leaveOneOut, moreEvidence } from './what-would-change';
import { equivalence, isOutside, welch, WelchOptions, WelchResult } from './welch';
import { WelchPower, welchPower } from './welch-power';

/** The rules of one judgement, `gapThatMatters` already in the metric's unit. */
export interface Rules {
  readonly confidence: number;
  readonly power: number;
  readonly gapThatMatters: number;
  /** Whether values are °C of rise: a sensor's step in °C then bears on them directly. */
  readonly inDegrees: boolean;
}

export type Reason = NonNullable<PairResult['notJudged']>;

/** Both coolers' evidence in the same unit, or why there is none. */
export function commonEvidence(a: JudgedCooler, b: JudgedCooler): readonly [Evidence, Evidence] | Reason {
  const remounted = [a, b].map(showsRemounting);
  if (remounted[0] && remounted[1]) return [mountEvidence(a), mountEvidence(b)];
  if (remounted[0] !== remounted[1]) {
    const [several, single] = remounted[0] ? [a, b] : [b, a];
    return {
      code: 'mixed mounts',
      reason: `${several.name} was remounted, ${single.name} was not: how far remounting moves ${single.name} is unknown. Add a second mount of ${single.name}, and better a third.`,
    };
  }
  return [runEvidence(a), runEvidence(b)];
}

export function tooLittle(a: Evidence, b: Evidence): Reason | null {
  const [na, nb] = [a.values.length, b.values.length];
  if (na === 1 && nb === 1)
    return reason(
      'single run each',
      'One run of each cooler leaves nothing to judge the gap by. Add a second mount of each cooler.',
    );
  const fewest = na <= nb ? a : b;
  if (fewest.values.length === 1)
    return reason(
      'too few runs',
      `${fewest.name} has a single run, so its spread is unknown. Add runs of it, each on a new mount.`,
    );
  if (a.unit === 'run' && fewest.values.length === 2)
    return reason(
      'too few runs',
      `${fewest.name} has two runs, too few to tell its spread. Add a third, on a new mount.`,
    );
  if (!(a.variance > 0) && !(b.variance > 0))
    return reason(
      'no spread measured',
      'Every run of each cooler reads the same, so noise is unknown: the sensor is too coarse for this gap.',
    );
  return null;
}

export const reason = (code: NotJudgedCode, words: string): Reason => ({ code, reason: words });

export function optionsFor(
  a: JudgedCooler,
  b: JudgedCooler,
  evidence: readonly [Evidence, Evidence],
  rules: Rules,
): WelchOptions {
  const least = Math.min(...evidence.map(({ values }) => values.length));
  const steps = rules.inDegrees ? [a, b].map((cooler) => stepEffect(cooler)?.uncertainty ?? 0) : [0, 0];
  return {
    confidence: rules.confidence,
    degreesOfFreedomCap: degreesOfFreedomCap(evidence[0].unit, least),
    extraVariance: steps[0] ** 2 + steps[1] ** 2,
  };
}

function sizeCall(result: WelchResult, interval: readonly [number, number], matters: number): SizeCall {
  if (Math.abs(result.gap) - result.marginOfError > matters) return 'matters';
  return interval[0] > -matters && interval[1] < matters ? 'too small to matter' : 'size open';
}

/** Judges the gap a − b by Welch's test on the units that are independent evidence. */
export function judgePair(a: JudgedCooler, b: JudgedCooler, rules: Rules): PairResult {
  const common = commonEvidence(a, b);
  if ('code' in common) return withoutCall(a, b, rules, common, null);
  const [first, second] = common;
  const lacking = tooLittle(first, second);
  const options = optionsFor(a, b, common, rules);
  const result = welch(side(first), side(second), options);
  if (lacking && (lacking.code !== 'too few runs' || !result))
    return withoutCall(a, b, rules, lacking, common);
  if (!result)
    return withoutCall(
      a,
      b,
      rules,
      reason('no spread measured', 'No spread was measured, so noise is unknown.'),
      common,
    );

  const power = welchPower(side(first), side(second), rules.confidence);
  const outside = isOutside(result);
  return {
    ...concluded(a, b, rules, result, power, lacking),
    scope: first.unit === 'mount' ? 'mounts' : 'runs only',
    unitOfEvidence: first.unit,
    tippingMountSpread: first.unit === 'run' && outside && !lacking ? tippingSpread(result) : null,
    naive: first.unit === 'mount' ? naiveResult(a, b, rules.confidence) : null,
    more: lacking ? [] : moreEvidence(a, b, common, result, rules.confidence),
    leaveOneOut: lacking ? null : leaveOneOut(a, b, first.unit, options, outside),
  };
}

/** What follows from a test's result whatever the evidence was: interval, call, equivalence, power. */
export function concluded(
  a: JudgedCooler,
  b: JudgedCooler,
  rules: Rules,
  result: WelchResult,
  power: WelchPower | null,
  lacking: Reason | null,
): PairResult {
  const test = equivalence(result, rules.gapThatMatters, rules.confidence);
  return {
    ...empty(a, b, rules),
    gap: result.gap,
    standardError: result.standardError,
    degreesOfFreedom: result.degreesOfFreedom,
    statistic: result.statistic,
    interval: [...result.interval],
    marginOfError: result.marginOfError,
    p: result.p,
    clearance: Math.abs(result.gap) / result.marginOfError,
    smallestVisibleGap: finiteOrNull(power?.gapAt(rules.power)),
    powerAtGapThatMatters: finiteOrNull(power?.powerAt(rules.gapThatMatters)),
    equivalence: { p: test.p, interval: [...test.interval], confidence: test.confidence },
    flag: lacking ? 'not judged' : isOutside(result) ? 'outside noise' : 'within noise',
    sizeCall: lacking ? 'size open' : sizeCall(result, test.interval, rules.gapThatMatters),
    notJudged: lacking,
  };
}

const finiteOrNull = (value: number | undefined): number | null =>
  value !== undefined && Number.isFinite(value) ? value : null;

function empty(a: JudgedCooler, b: JudgedCooler, rules: Rules): PairResult {
  return {
    a: a.name,
    b: b.name,
    gap: null,
    standardError: null,
    degreesOfFreedom: null,
    statistic: null,
    confidence: rules.confidence,
    interval: null,
    marginOfError: null,
    p: null,
    clearance: null,
    smallestVisibleGap: null,
    powerAtGapThatMatters: null,
    equivalence: null,
    gapThatMatters: rules.gapThatMatters,
    flag: 'not judged',
    sizeCall: 'size open',
    scope: null,
    unitOfEvidence: null,
    tippingMountSpread: null,
    naive: null,
    notJudged: null,
    more: [],
    leaveOneOut: null,
  };
}

/** The gap is still told, as the difference of the unit means, with nothing to judge it by. */
export function withoutCall(
  a: JudgedCooler,
  b: JudgedCooler,
  rules: Rules,
  why: Reason,
  evidence: readonly [Evidence, Evidence] | null,
): PairResult {
  const best = (cooler: JudgedCooler): number =>
    (showsRemounting(cooler) ? mountEvidence(cooler) : runEvidence(cooler)).mean;
  return {
    ...empty(a, b, rules),
    gap: best(a) - best(b),
    unitOfEvidence: evidence?.[0].unit ?? null,
    notJudged: why,
  };
}

/**
 * SD of remounting at which a gap seen on one mount each stops being outside noise: √(max(0, (|gap|/t)² − SE²)/2).
 */
export function tippingSpread({ gap, marginOfError, standardError }: WelchResult): number {
  const quantile = marginOfError / standardError;
  return Math.sqrt(Math.max(0, (gap / quantile) ** 2 - standardError ** 2) / 2);
}

/** What Welch's test says when runs of one mount are taken as independent, which over-claims. */
export function naiveResult(a: JudgedCooler, b: JudgedCooler, confidence: number): PairResult['naive'] {
  const result = welch(side(runEvidence(a)), side(runEvidence(b)), { confidence });
  if (!result) return null;
  const { gap, standardError, degreesOfFreedom, p, marginOfError } = result;
  return { gap, standardError, degreesOfFreedom, p, marginOfError };
}

/** Mounts of a cooler that hold runs, for words. */
export const mountCount = (cooler: JudgedCooler): number | null =>
  cooler.mountsRecorded ? filledMounts(cooler).length : null;
