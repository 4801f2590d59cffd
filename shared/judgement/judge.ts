import {
  CoolerResult,
  Finding,
  JudgedCooler,
  Judgement,
  JudgementInput,
  PairResult,
} from '../contracts/judgement';
import { mean, sampleStandardDeviation } from '../numerics';
import { drift } from './drift';
import {
  Evidence,
  mountComponent,
  mountEvidence,
  ownInterval,
  runEvidence,
  runsOf,
  showsRemounting,
  withinMounts,
} from './evidence';
import { findingsOf, worstFirst } from './findings';
import { leftOutWords } from './findings/evidence-checks';
import { finding } from './findings/finding';
import { adjustedMargin, CONFOUNDED, orderedValues } from './findings/order-checks';
import { judgePair, mountCount, Rules } from './judge-pair';
import { Unit } from './quantity-format';
import { verdictWords } from './words';

/** Version of the engine as a whole; stored with every verdict. */
export const ENGINE_VERSION = '1.1.0';

function median(values: readonly number[]): number | null {
  if (values.length === 0) return null;
  const sorted = [...values].sort((a, b) => a - b);
  const middle = Math.floor(sorted.length / 2);
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

/** How one pair is judged under an edition of the rules. */
export type JudgeOne = (a: JudgedCooler, b: JudgedCooler) => PairResult;

/** The thresholds in the metric's unit: a gap in °C is worth gap ÷ median power in K/W. */
export function rulesFor(input: JudgementInput): Rules {
  const { confidence, power, gapThatMatters } = input.thresholds;
  if (input.metric === 'rise') return { confidence, power, gapThatMatters, inDegrees: true };
  const watts = median(
    input.coolers
      .flatMap(runsOf)
      .map((run) => run.watts)
      .filter((value) => value !== null),
  );
  return {
    confidence,
    power,
    gapThatMatters: watts === null ? gapThatMatters : gapThatMatters / watts,
    inDegrees: false,
  };
}

function coolerResult(cooler: JudgedCooler, confidence: number): CoolerResult {
  const evidence: Evidence = showsRemounting(cooler) ? mountEvidence(cooler) : runEvidence(cooler);
  const n = evidence.values.length;
  const within = withinMounts(cooler);
  const component = mountComponent(cooler);
  const known = (value: number): number | null => (Number.isFinite(value) ? value : null);
  return {
    name: cooler.name,
    runs: runsOf(cooler).length,
    mounts: mountCount(cooler),
    mean: known(evidence.mean),
    standardDeviation: known(sampleStandardDeviation(evidence.values)),
    units: n,
    standardError: n > 1 ? known(Math.sqrt(evidence.variance / n)) : null,
    interval: ownInterval(evidence, confidence),
    spreadBetweenRuns: known(Math.sqrt(within.variance)),
    spreadBetweenMounts: component.spread,
    spreadBetweenMountsTruncated: component.truncated,
    mountMeans: cooler.mountsRecorded
      ? cooler.mounts
          .filter(({ runs }) => runs.length > 0)
          .map(({ name, runs }) => ({ name, mean: mean(runs.map(({ value }) => value)), runs: runs.length }))
      : [],
  };
}

/** When order and cooler can hardly be told apart, a gap counts only if it stands with the drift taken out. */
export function withheldIfConfounded(
  pair: PairResult,
  a: JudgedCooler,
  b: JudgedCooler,
  confidence: number,
): PairResult {
  if (pair.flag !== 'outside noise') return pair;
  const values = orderedValues(a, b);
  const result = values ? drift(values, confidence) : null;
  if (!result || result.varianceInflation < CONFOUNDED) return pair;
  if (Math.abs(result.adjustedGap) > adjustedMargin({ pair }, result)) return pair;
  return {
    ...pair,
    flag: 'not judged',
    sizeCall: 'size open',
    notJudged: {
      code: 'order confounded',
      reason: `${a.name} and ${b.name} were tested one after the other, and with a drift over the order of testing taken out the gap does not stand. Alternate the coolers and run again.`,
    },
  };
}

/** Coolers with the runs that a person left out put back in, to tell what difference it makes. */
function withLeftOut(input: JudgementInput): readonly JudgedCooler[] {
  return input.coolers.map((cooler) => {
    const back = input.leftOut.filter((left) => left.cooler === cooler.name);
    const mounts = cooler.mounts.map((mount) => ({
      ...mount,
      runs: [
        ...mount.runs,
        ...back.filter((left) => !cooler.mountsRecorded || left.mount === mount.name).map(({ run }) => run),
      ],
    }));
    const missing = [...new Set(back.map(({ mount }) => mount))].filter(
      (name): name is string =>
        cooler.mountsRecorded && name !== null && !mounts.some((mount) => mount.name === name),
    );
    for (const name of missing)
      mounts.push({ name, runs: back.filter(({ mount }) => mount === name).map(({ run }) => run) });
    return { ...cooler, mounts };
  });
}

function leftOutFinding(input: JudgementInput, judgeOne: JudgeOne, pairs: readonly PairResult[]): Finding[] {
  if (input.leftOut.length === 0) return [];
  const full = withLeftOut(input);
  return pairs.flatMap((pair) => {
    const count = input.leftOut.filter(({ cooler }) => cooler === pair.a || cooler === pair.b).length;
    const [a, b] = [pair.a, pair.b].map((name) => full.find((cooler) => cooler.name === name));
    if (count === 0 || !a || !b) return [];
    const whole = judgeOne(a, b);
    const changes = whole.flag !== pair.flag;
    return [
      finding(
        'runs-left-out',
        changes ? 'caution' : 'note',
        'Runs left out',
        leftOutWords(count, whole.flag, whole.clearance, changes),
        {
          leftOut: count,
          gapWithThem: whole.gap,
          marginWithThem: whole.marginOfError,
        },
      ),
    ];
  });
}

/** Which numbered recipe the data call for. */
function methodFor(coolers: readonly JudgedCooler[]): string {
  const remounted = coolers.filter(showsRemounting).length;
  if (remounted === coolers.length) return 'welch-mounts/1';
  return remounted === 0 ? 'welch-runs/1' : 'welch-each-pair/1';
}

/** All pairs of the coolers, a before b in the order of comparison. */
export const pairsOf = (coolers: readonly JudgedCooler[]): (readonly [JudgedCooler, JudgedCooler])[] =>
  coolers.flatMap((a, i) => coolers.slice(i + 1).map((b) => [a, b] as const));

/** The first edition of the rules: Welch's test on mount means where both coolers were remounted, else on runs. */
export function judgeByWelch(input: JudgementInput): Judgement {
  const rules = rulesFor(input);
  const judgeOne: JudgeOne = (a, b) => judgePair(a, b, rules);
  const pairs = pairsOf(input.coolers).map(([a, b]) =>
    withheldIfConfounded(judgeOne(a, b), a, b, rules.confidence),
  );
  return { method: methodFor(input.coolers), ...told(input, rules, pairs, judgeOne) };
}

/** Everything a judgement says of pairs already judged. */
export function told(
  input: JudgementInput,
  rules: Rules,
  pairs: PairResult[],
  judgeOne: JudgeOne,
): Omit<Judgement, 'method'> {
  const unit: Unit = input.metric === 'rise' ? '°C' : 'K/W';
  const coolers = input.coolers.map((cooler) => coolerResult(cooler, rules.confidence));
  const several = input.coolers.length > 2;
  const resultOf = (cooler: JudgedCooler) => coolers[input.coolers.indexOf(cooler)];
  const findings = pairsOf(input.coolers).flatMap(([a, b], index) => {
    const pair = pairs[index];
    const own = findingsOf({
      pair,
      a,
      b,
      resultA: resultOf(a),
      resultB: resultOf(b),
      input,
      rules,
      unit,
    });
    return own.map((one) => (several ? { ...one, text: `${a.name} against ${b.name}: ${one.text}` } : one));
  });
  findings.push(...leftOutFinding(input, judgeOne, pairs));
  return {
    engine: ENGINE_VERSION,
    unit,
    coolers,
    pairs,
    words: pairs.map((pair) => verdictWords(pair, coolers, input, unit)),
    findings: worstFirst(findings),
  };
}
