import { PairResult } from '../../contracts/judgement';
import { countWord } from '../words';
import { formatNumber, formatRatio } from '../quantity-format';
import { finding, PairCheck, quantity } from './finding';
import { lentMounts } from './lent-mounts';

/** No call: what is missing, which blocks sign-off. */
export const noCall: PairCheck = ({ pair }) =>
  pair.notJudged
    ? [finding(pair.notJudged.code.replaceAll(' ', '-'), 'stop', 'No call', pair.notJudged.reason)]
    : [];

/** Whether the noise of remounting was not seen on both coolers but taken from elsewhere. */
const isLent = ({ basis }: PairResult): boolean => basis === 'bench history' || basis === 'borrowed mounts';

/** Few units of evidence. */
export const fewUnits: PairCheck = ({ pair, resultA, resultB }) => {
  const least = Math.min(resultA.units, resultB.units);
  if (pair.flag === 'not judged' || isLent(pair)) return [];
  const numbers = { unitsA: resultA.units, unitsB: resultB.units };
  if (pair.unitOfEvidence === 'mount' && least === 2)
    return [
      finding(
        'two-mounts',
        'caution',
        'Few mounts',
        'Two mounts: only very large gaps can show. A third mount of each cooler is the least that gives a usable call.',
        numbers,
      ),
    ];
  if (pair.unitOfEvidence === 'run' && least < 5)
    return [
      finding(
        'too-few-runs',
        'caution',
        'Few runs',
        `With ${countWord(least)} runs of a cooler the margin of error is wide and easily off. Five each, on several mounts, is a fair start.`,
        numbers,
      ),
    ];
  return [];
};

/** How the numbers of units differ. */
export const unequalNumbers: PairCheck = ({ pair, resultA, resultB }) => {
  const [few, many] = [Math.min(resultA.units, resultB.units), Math.max(resultA.units, resultB.units)];
  if (pair.flag === 'not judged' || many < 3 * few) return [];
  return [
    finding(
      'unequal-numbers',
      'caution',
      'Unequal numbers',
      `${countWord(few)} of one against ${countWord(many)} of the other: the interval covers the true gap a little less often than it says. Even the numbers out.`,
      { few, many },
    ),
  ];
};

/** What remounting does, or that nothing is known of it. */
export const mounts: PairCheck = (checked) => {
  const { pair, a, b, resultA, resultB } = checked;
  if (isLent(pair)) return lentMounts(checked);
  if (pair.scope === 'mounts') {
    const both = (key: 'spreadBetweenMounts' | 'spreadBetweenRuns') =>
      [resultA[key], resultB[key]].filter((value) => value !== null);
    const larger = (values: number[]) => (values.length > 0 ? Math.max(...values) : null);
    const between = larger(both('spreadBetweenMounts'));
    const within = larger(both('spreadBetweenRuns'));
    const moved =
      between !== null && within !== null
        ? `Remounting moves a reading up to ${quantity(between, checked)}; repeating it moves up to ${quantity(within, checked)} (SD). `
        : '';
    const naive = pair.naive
      ? ` Counting all runs as independent would have claimed a margin of ${quantity(pair.naive.marginOfError, checked)}, which over-claims.`
      : '';
    return [
      finding('mounts', 'note', 'Mounts', `${moved}Noise is counted per mount, not per run.${naive}`, {
        spreadBetweenMounts: between,
        spreadBetweenRuns: within,
      }),
    ];
  }
  if (pair.scope !== 'runs only') return [];
  const unrecorded = !a.mountsRecorded || !b.mountsRecorded;
  const why = unrecorded ? 'Mounts were not recorded' : 'Each cooler was fitted once';
  const tipping =
    pair.tippingMountSpread !== null
      ? ` The gap stops being outside noise if remounting alone moves a cooler by ${quantity(pair.tippingMountSpread, checked)} (SD) or more.`
      : '';
  return [
    finding(
      unrecorded ? 'mounts-not-recorded' : 'one-mount-each',
      'stop',
      'Mounts',
      `${why}, so only run-to-run noise is known and the fitting may be the cause of a gap.${tipping} Remount each cooler and record it.`,
      { tippingMountSpread: pair.tippingMountSpread },
    ),
  ];
};

/** Whether a gap that matters would have been seen. */
export const detectableGap: PairCheck = (checked) => {
  const { pair, rules } = checked;
  if (pair.smallestVisibleGap === null || pair.flag === 'not judged') return [];
  const seen = quantity(pair.smallestVisibleGap, checked);
  const matters = quantity(rules.gapThatMatters, checked);
  const numbers = {
    smallestVisibleGap: pair.smallestVisibleGap,
    powerAtGapThatMatters: pair.powerAtGapThatMatters,
  };
  const often = `${Math.round(rules.power * 100)}\u00a0% of the time`;
  return pair.smallestVisibleGap > rules.gapThatMatters
    ? [
        finding(
          'detectable-gap',
          'caution',
          'Detectable gap',
          `This much evidence finds a gap of ${seen} ${often}. A true gap of ${matters}, the smallest that matters, could be missed.`,
          numbers,
        ),
      ]
    : [
        finding(
          'detectable-gap',
          'note',
          'Detectable gap',
          `This much evidence finds a gap of ${seen} ${often}, so a gap that matters would show.`,
          numbers,
        ),
      ];
};

/** Whether single mounts or runs carry the verdict. */
export const singleUnits: PairCheck = ({ pair }) => {
  const left = pair.leaveOneOut;
  if (!left) return [];
  const numbers = { units: left.units, tips: left.tips };
  if (left.tips === 0)
    return [
      finding(
        'leave-one-out',
        'note',
        'Single mounts and runs',
        `Leaving out any one ${left.unit} changes nothing in the call.`,
        numbers,
      ),
    ];
  const to =
    pair.flag === 'outside noise'
      ? 'brings the gap back inside the noise'
      : 'takes the gap outside the noise';
  return [
    finding(
      'leave-one-out',
      'caution',
      'Single mounts and runs',
      `Leaving out any one of ${left.tips} of the ${left.units} ${left.unit}s ${to}: ${left.which.slice(0, 3).join('; ')}${left.tips > 3 ? ' and more' : ''}.`,
      numbers,
    ),
  ];
};

/** Spreads that differ much. */
export const unequalSpread: PairCheck = (checked) => {
  const { pair, resultA, resultB } = checked;
  const [sa, sb] = [resultA.standardDeviation, resultB.standardDeviation];
  if (pair.flag === 'not judged' || sa === null || sb === null) return [];
  const [low, high] = [Math.min(sa, sb), Math.max(sa, sb)];
  if (low === 0)
    return [
      finding(
        'no-spread-one-side',
        'caution',
        'Spread',
        `All ${pair.unitOfEvidence ?? 'run'}s of ${sa === 0 ? pair.a : pair.b} read the same, so the noise comes from the other cooler alone. The sensor may be too coarse.`,
        { spreadA: sa, spreadB: sb },
      ),
    ];
  if (high < 3 * low) return [];
  const noisy = sa > sb ? pair.a : pair.b;
  const fewer = sa > sb ? resultA.units < resultB.units : resultB.units < resultA.units;
  return [
    finding(
      'unequal-spread',
      fewer ? 'caution' : 'note',
      'Spread',
      `${noisy} scatters ${formatNumber(high / low, 1)} times as much as the other. Welch’s test allows for it${fewer ? ', but the noisier cooler has fewer units, where it errs most' : ''}.`,
      { spreadA: sa, spreadB: sb },
    ),
  ];
};

/** Runs that a person left out, and the verdict with them. */
export const leftOutWords = (
  count: number,
  flagWith: string,
  clearanceWith: number | null,
  changes: boolean,
): string =>
  `${count === 1 ? '1 run was' : `${count} runs were`} left out. With ${count === 1 ? 'it' : 'them'} the gap is ${flagWith}${clearanceWith === null ? '' : `, ${formatRatio(clearanceWith)} its margin`}${changes ? ', which changes the call' : ''}.`;
