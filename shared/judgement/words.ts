import { CoolerResult, JudgementInput, PairResult, VerdictWords } from '../contracts/judgement';
import {
  decimalsForGap,
  formatLevel,
  formatNumber,
  formatPlusMinus,
  formatRatio,
  formatSigned,
  Unit,
  withUnit,
} from './quantity-format';

const NUMBER_WORDS = [
  'no',
  'one',
  'two',
  'three',
  'four',
  'five',
  'six',
  'seven',
  'eight',
  'nine',
  'ten',
  'eleven',
  'twelve',
];

/** A small count as a word: `ten`; from thirteen on in digits. */
export const countWord = (count: number): string => NUMBER_WORDS[count] ?? String(count);

/** "only just" up to 1.2 margins, "clearly" from 2. */
function qualifier(clearance: number): string {
  if (clearance < 1.2) return ', only just';
  return clearance < 2 ? '' : ', clearly';
}

/** Which noise a call is about: with one mount each only repeating was seen. */
const noiseOf = ({ scope }: PairResult): string => (scope === 'runs only' ? 'run-to-run noise' : 'noise');

/** The verdict's headline, without its ratio. */
export function headline(pair: PairResult): string {
  if (pair.flag === 'not judged') return `Not judged: ${pair.notJudged?.code ?? 'no reason recorded'}`;
  if (pair.flag === 'outside noise') {
    const smaller =
      pair.sizeCall === 'too small to matter' ? ', smaller than matters' : qualifier(pair.clearance ?? 1);
    return `Outside ${noiseOf(pair)}${smaller}`;
  }
  return `Within ${noiseOf(pair)}${pair.sizeCall === 'too small to matter' ? '' : ', unresolved'}`;
}

interface Figures {
  readonly unit: Unit;
  readonly decimals: number;
  readonly gap: string;
  readonly margin: string;
  readonly matters: string;
  readonly low: string;
  readonly high: string;
}

function figures(pair: PairResult, unit: Unit): Figures {
  const decimals = decimalsForGap(pair.gap, pair.marginOfError, unit);
  const usual = unit === '°C' ? 2 : decimals;
  return {
    unit,
    decimals,
    gap: withUnit(formatNumber(Math.abs(pair.gap ?? 0), decimals), unit),
    margin: withUnit(formatPlusMinus(pair.marginOfError ?? 0, decimals), unit),
    matters: withUnit(formatNumber(pair.gapThatMatters, usual), unit),
    low: formatSigned(pair.interval?.[0] ?? 0, decimals),
    high: withUnit(formatSigned(pair.interval?.[1] ?? 0, decimals), unit),
  };
}

const direction = (pair: PairResult): string => ((pair.gap ?? 0) < 0 ? 'lower' : 'higher');

function secondLine(pair: PairResult, unit: Unit): string {
  const f = figures(pair, unit);
  if (pair.flag === 'not judged') return pair.notJudged?.reason ?? '';
  const ran = `${pair.a} ran ${f.gap} ${direction(pair)} than ${pair.b}.`;
  if (pair.flag === 'outside noise') {
    if (pair.sizeCall === 'too small to matter')
      return `${ran} The gap is there, but it is under ${f.matters}.`;
    const open = pair.sizeCall === 'size open' ? ` Whether the gap reaches ${f.matters} is open.` : '';
    return `${ran} The margin of error is ${f.margin}.${open}`;
  }
  if (pair.sizeCall === 'too small to matter') return `A gap of ${f.matters} or more is ruled out.`;
  const more =
    pair.unitOfEvidence === 'mount' ? 'More mounts would tell.' : 'More runs, on more mounts, would tell.';
  return `A gap of ${f.matters} is neither shown nor ruled out: it could be from ${f.low} to ${f.high}. ${more}`;
}

/** "ten runs over five mounts each", "ten runs each, mounts not recorded". */
function evidenceWords(a: CoolerResult, b: CoolerResult): string {
  const runs = (count: number) => `${countWord(count)} ${count === 1 ? 'run' : 'runs'}`;
  const mounts = ({ mounts: count }: CoolerResult) =>
    count === null ? '' : ` over ${countWord(count)} ${count === 1 ? 'mount' : 'mounts'}`;
  const same = a.runs === b.runs && a.mounts === b.mounts;
  const unrecorded = a.mounts === null || b.mounts === null ? ', mounts not recorded' : '';
  return same
    ? `${runs(a.runs)}${mounts(a)} each${unrecorded}`
    : `${runs(a.runs)}${mounts(a)} of ${a.name} and ${runs(b.runs)}${mounts(b)} of ${b.name}${unrecorded}`;
}

function closing(pair: PairResult, f: Figures): string {
  if (pair.flag === 'outside noise') {
    const just =
      pair.sizeCall === 'too small to matter' ? '' : qualifier(pair.clearance ?? 1).replace(', ', '');
    const outside = `That is ${just ? `${just} ` : ''}outside the bench’s ${noiseOf(pair)}`;
    const limits =
      pair.scope === 'runs only'
        ? '; each cooler was fitted once, so the fitting may be the cause'
        : pair.sizeCall === 'too small to matter'
          ? `, and smaller than the ${f.matters} that matters`
          : '';
    return `${outside}${limits}.`;
  }
  if (pair.sizeCall === 'too small to matter')
    return `That is within the bench’s ${noiseOf(pair)}; a gap of ${f.matters} or more is ruled out.`;
  return `That is within the bench’s ${noiseOf(pair)}; the gap could be from ${f.low} to ${f.high}.`;
}

function quote(
  pair: PairResult,
  a: CoolerResult,
  b: CoolerResult,
  input: JudgementInput,
  unit: Unit,
): string {
  const f = figures(pair, unit);
  const load = input.nominalWatts ? `At ${withUnit(String(input.nominalWatts), 'W')} ` : '';
  if (pair.flag === 'not judged' || a.mean === null || b.mean === null)
    return `${load ? `${load}n` : 'N'}o claim can be made about ${pair.a} and ${pair.b}: ${lowerFirst(pair.notJudged?.reason ?? '')}`;
  const over = unit === '°C' ? ' over ambient' : '';
  const mean = (value: number) => withUnit(formatNumber(value, f.decimals), unit);
  const level = formatLevel(pair.confidence);
  const margin = withUnit(formatNumber(pair.marginOfError ?? 0, f.decimals), unit);
  return (
    `${load}${pair.a} averaged ${mean(a.mean)}${over} and ${pair.b} ${mean(b.mean)}: a gap of ${f.gap}, ` +
    `give or take ${margin} at ${level} confidence, from ${evidenceWords(a, b)}. ${closing(pair, f)}`
  );
}

const lowerFirst = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);

/** What no verdict of this kind reaches. */
function limits(pair: PairResult, input: JudgementInput): string[] {
  const load = input.nominalWatts
    ? `other loads than ${withUnit(String(input.nominalWatts), 'W')}`
    : 'other loads';
  return [
    'other units of the same models: one of each was measured',
    'other benches, rooms and fittings',
    load,
    ...(pair.scope === 'runs only'
      ? ['remounting: each cooler was fitted once, or mounts were not recorded']
      : []),
    ...(pair.basis === 'bench history' || pair.basis === 'borrowed mounts'
      ? ['a cooler that is harder to fit than those its noise of remounting is taken from']
      : []),
  ];
}

/** A verdict on one pair in words, never stronger than its numbers. */
export function verdictWords(
  pair: PairResult,
  coolers: readonly CoolerResult[],
  input: JudgementInput,
  unit: Unit,
): VerdictWords {
  const named = (name: string) => coolers.find((cooler) => cooler.name === name) ?? coolers[0];
  return {
    headline: headline(pair),
    ratio:
      pair.clearance === null || pair.flag === 'not judged'
        ? null
        : `${formatRatio(pair.clearance)} the margin of error`,
    secondLine: secondLine(pair, unit),
    quote: quote(pair, named(pair.a), named(pair.b), input, unit),
    doesNotCover: limits(pair, input),
  };
}
