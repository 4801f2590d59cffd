import {
  decimalsForGap,
  formatInterval,
  formatLevel,
  formatPlusMinus,
  formatSigned,
  withUnit,
} from '../quantity/quantity-format';
import { GapRulePair, needleShape, NeedleShape } from './gap-rule-pair';
import { GapRuleSubject } from './gap-rule-drawing';

/** A row of the key line: it names a mark of the rule and is its text equivalent. */
export interface KeyRow {
  readonly mark: 'needle' | 'bracket' | 'band' | 'notch' | 'tick';
  readonly name: string;
  readonly value: string;
}

const NOT_MEASURED = 'not measured';

/** Names and values of every mark on the rule, in the order of the key line. */
export function keyRows(subject: GapRuleSubject, tickWorth: number): KeyRow[] {
  const { pair, unit } = subject;
  const rows: KeyRow[] = [];
  if (pair) {
    const decimals = decimalsForGap(pair.gap, pair.marginOfError, unit);
    const judged = pair.flag !== 'not judged';
    rows.push({
      mark: 'needle',
      name: 'measured gap',
      value: pair.gap === null ? NOT_MEASURED : withUnit(formatSigned(pair.gap, decimals), unit),
    });
    if (judged && pair.interval) {
      rows.push({
        mark: 'bracket',
        name: `${formatLevel(pair.confidence)} interval`,
        value: withUnit(formatInterval(pair.interval, decimals), unit),
      });
    }
    rows.push({
      mark: 'band',
      name: 'noise, as margin of error',
      value: pair.marginOfError
        ? withUnit(formatPlusMinus(pair.marginOfError, decimals), unit)
        : NOT_MEASURED,
    });
  }
  const matters = pair?.gapThatMatters ?? subject.gapThatMatters;
  if (matters !== null) {
    rows.push({
      mark: 'notch',
      name: 'smallest gap that matters',
      value: withUnit(formatMatters(matters, unit), unit),
    });
  }
  rows.push({ mark: 'tick', name: 'one tick', value: withUnit(shortest(tickWorth), unit) });
  return rows;
}

/** The rule in one sentence, for those who do not see it. */
export function ruleDescription(subject: GapRuleSubject): string {
  const { pair } = subject;
  if (!pair) return 'Nothing measured yet: the rule is unmarked.';
  const parts = keyRows(subject, 0)
    .filter(({ mark }) => mark !== 'tick')
    .map(({ name, value }) => `${name} ${value}`);
  return `${pair.a} minus ${pair.b}: ${parts.join('; ')}. ${STANDS[needleShape(pair)]}`;
}

const STANDS: Record<NeedleShape, string> = {
  solid: 'The needle stands outside the noise band.',
  half: 'The needle stands outside the noise band and between the notches.',
  hollow: 'The needle stands inside the noise band and between the notches.',
  broken: 'The needle stands inside the noise band.',
  ring: 'The gap is not judged.',
  'open V': 'The gap is not judged: no spread was measured.',
};

/** The small rule in words: headline, gap and margin. */
export function smallRuleLabel(
  pair: Pick<GapRulePair, 'a' | 'b' | 'gap' | 'marginOfError'> & { readonly headline: string },
  unit: GapRulePair['unit'],
): string {
  const decimals = decimalsForGap(pair.gap, pair.marginOfError, unit);
  const gap = pair.gap === null ? 'gap not known' : `gap ${withUnit(formatSigned(pair.gap, decimals), unit)}`;
  const margin =
    pair.marginOfError === null
      ? 'noise not measured'
      : `margin of error ${withUnit(formatPlusMinus(pair.marginOfError, decimals), unit)}`;
  return `${pair.headline}. ${pair.a} against ${pair.b}: ${gap}, ${margin}`;
}

/** A threshold as the lead set it, with at least the table's decimals. */
function formatMatters(value: number, unit: GapRulePair['unit']): string {
  return formatPlusMinus(value, decimalsForGap(null, null, unit));
}

/** A power of ten or its half, without the tail of binary arithmetic. */
function shortest(value: number): string {
  return String(Number(value.toPrecision(3)));
}
