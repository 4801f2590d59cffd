import { JudgedCooler, Judgement, JudgementInput, PairResult } from '../contracts/judgement';
import { mountEvidence, runEvidence, showsRemounting, side } from './evidence';
import { holm } from './holm';
import { JudgeOne, pairsOf, rulesFor, told, withheldIfConfounded } from './judge';
import { judgePairFully, pOf } from './judge-pair-fully';
import { PairSetting } from './pair-setting';
import { bars, welchAnova } from './several';

/** Which numbered recipe the data call for: by the grounds on which pairs stand. */
function methodFor(pairs: readonly PairResult[], coolers: readonly JudgedCooler[]): string {
  const remounted = coolers.filter(showsRemounting).length;
  if (remounted === coolers.length) return 'welch-mounts/2';
  if (remounted > 0) return 'welch-each-pair/2';
  return pairs.some(({ basis }) => basis === 'bench history') ? 'welch-history/2' : 'welch-runs/2';
}

/**
 * The second edition of the rules. Beside the first: noise of remounting from the bench's past or borrowed from the other
 * cooler, exact permutation and trimmed means as second opinions, units that stand out, units needed, an uncertainty budget,
 * and with three coolers or more Holm's rule, so that one false call among all pairs stays as rare as the thresholds ask.
 */
export function judgeFully(input: JudgementInput): Judgement {
  const rules = rulesFor(input);
  const setting: PairSetting = {
    rules,
    bench: input.metric === 'rise' ? input.bench : null,
    uncertainties: input.uncertainties ?? [],
    seed: input.seed,
  };
  const judgeAt = (confidence: number): JudgeOne => {
    const at = { ...setting, rules: { ...rules, confidence } };
    return (a, b) => withheldIfConfounded(judgePairFully(a, b, at), a, b, confidence);
  };
  const both = pairsOf(input.coolers);
  const ps = both.map(([a, b]) => pOf(a, b, setting));
  const steps = holm(
    ps.filter((p) => p !== null),
    1 - rules.confidence,
  );
  // Each pair is judged at the level Holm's rule holds it against, so that its margin and its call say the same.
  let tested = 0;
  const pairs = both.map(([a, b], index) => {
    if (both.length === 1 || ps[index] === null) return judgeAt(rules.confidence)(a, b);
    const { adjusted, level } = steps[tested++];
    return { ...judgeAt(1 - level)(a, b), adjustedP: adjusted };
  });
  return {
    method: methodFor(pairs, input.coolers),
    ...told(input, rules, pairs, judgeAt(rules.confidence)),
    several: both.length > 1 ? ranked(input.coolers, pairs) : null,
  };
}

function ranked(coolers: readonly JudgedCooler[], pairs: readonly PairResult[]): Judgement['several'] {
  const evidence = coolers.map((cooler) =>
    showsRemounting(cooler) ? mountEvidence(cooler) : runEvidence(cooler),
  );
  const alike = evidence.every(({ unit }) => unit === evidence[0].unit);
  const omnibus = alike ? welchAnova(evidence.map(side)) : null;
  const order = coolers.map((_, index) => index).sort((x, y) => evidence[x].mean - evidence[y].mean || x - y);
  const names = coolers.map(({ name }) => name);
  const apart = (x: number, y: number): boolean =>
    pairs.some(
      ({ a, b, flag }) =>
        flag === 'outside noise' &&
        ((a === names[x] && b === names[y]) || (a === names[y] && b === names[x])),
    );
  return {
    omnibus: omnibus && {
      statistic: omnibus.statistic,
      degreesOfFreedom: [...omnibus.degreesOfFreedom],
      p: omnibus.p,
    },
    ranking: order.map((index) => names[index]),
    bars: bars(order, apart).map((bar) => bar.map((index) => names[index])),
  };
}
