import { FindingLevel } from '../../../shared/contracts/run-summary';
import { PairRow, ReRun, VerdictRow } from '../../../shared/contracts/verdicts';
import { needleShape, NeedleShape } from '../ui/gap-rule';
import {
  decimalsForGap,
  formatNumber,
  formatRatio,
  NO_VALUE,
  withUnit,
} from '../ui/quantity/quantity-format';
import { changesVerdict, reRunInWords } from '../verdicts/re-run-result';
import { ReRunOutcome } from './re-run-batch';

/** What a re-run came to, for one row: its weight, its words, and whether there is something to compare. */
export interface RowResult {
  readonly kind: 'none' | 'identical' | 'differs' | "can't re-run";
  readonly level: FindingLevel | null;
  readonly head: string;
  readonly rest: string;
  readonly reRun: ReRun | null;
}

export interface AuditRow {
  readonly verdict: VerdictRow;
  readonly pair: PairRow;
  readonly shape: NeedleShape;
  readonly more: string;
  readonly ratio: string;
  readonly result: RowResult;
}

/** A row of the audit table: the verdict's first pair and what its newest re-run came to. */
export function auditRow(verdict: VerdictRow, outcome: ReRunOutcome | undefined): AuditRow {
  const [pair, ...others] = verdict.pairs;
  return {
    verdict,
    pair,
    shape: needleShape(pair),
    more: others.length === 0 ? '' : `and ${others.length} more ${others.length === 1 ? 'pair' : 'pairs'}`,
    ratio: pair.clearance === null ? NO_VALUE : formatRatio(pair.clearance),
    result: outcome ? fromOutcome(verdict, outcome) : fromRecord(verdict),
  };
}

function fromOutcome(verdict: VerdictRow, outcome: ReRunOutcome): RowResult {
  if (outcome.kind === 'failed') {
    return { kind: "can't re-run", level: 'stop', head: 'Not re-run', rest: outcome.text, reRun: null };
  }
  const { reRun } = outcome;
  const { head, rest } = reRunInWords(reRun);
  switch (reRun.result) {
    case 'identical':
      return { kind: 'identical', level: 'note', head, rest, reRun };
    case 'differs': {
      const changes = changesVerdict(reRun);
      return {
        kind: 'differs',
        level: changes ? 'stop' : 'caution',
        head,
        rest: `${mainDifference(reRun, verdict) ?? `${reRun.differences.length} fields`}${changes ? becomes(reRun) : '; verdict unchanged'}`,
        reRun,
      };
    }
    case "can't re-run":
      return { kind: "can't re-run", level: 'stop', head, rest, reRun };
  }
}

/** The last re-run on record: its result is known, its fields are in the ledger. */
function fromRecord({ lastReRun }: VerdictRow): RowResult {
  if (lastReRun === null) {
    return { kind: 'none', level: null, head: 'Not re-run yet', rest: '', reRun: null };
  }
  const words = {
    identical: { level: 'note', head: 'Identical', rest: 'every field, to the last digit' },
    differs: { level: 'caution', head: 'Differs', rest: 're-run to see the fields' },
    "can't re-run": { level: 'stop', head: 'Can’t re-run', rest: 're-run to see why' },
  } as const;
  return { kind: lastReRun.result, ...words[lastReRun.result], reRun: null };
}

/** `margin of error 0.17 → 0.18 °C`: the figure that says most about what changed. */
function mainDifference(reRun: ReRun, { unit }: VerdictRow): string | null {
  const names = [
    ['marginOfError', 'margin of error'],
    ['gap', 'gap'],
    ['standardError', 'standard error'],
  ] as const;
  for (const [field, name] of names) {
    const found = reRun.differences.find(({ path }) => lastPart(path) === field);
    if (!found) continue;
    const [before, after] = [numberIn(found.stored), numberIn(found.reRun)];
    if (before === null || after === null) continue;
    const decimals = decimalsForGap(before, after, unit);
    return `${name} ${formatNumber(before, decimals)} → ${withUnit(formatNumber(after, decimals), unit)}`;
  }
  return null;
}

function becomes(reRun: ReRun): string {
  const headline = reRun.differences.find(({ path }) => lastPart(path) === 'headline');
  return headline ? `; verdict becomes ${unquoted(headline.reRun)}` : '; the call changes';
}

/** The pair as the re-run has it: the stored one with the differing fields of the first pair put in. */
export function pairAsReRun(pair: PairRow, reRun: ReRun): PairRow {
  const ofFirst = reRun.differences.filter(
    ({ path }) => /pairs[.[]0\b/.test(path) || /words[.[]0\b/.test(path),
  );
  const field = (name: string): string | undefined =>
    ofFirst.find(({ path }) => lastPart(path) === name)?.reRun;
  const number = (name: 'gap' | 'marginOfError' | 'clearance'): number | null => {
    const found = field(name);
    return found === undefined ? pair[name] : numberIn(found);
  };
  const text = (name: 'flag' | 'sizeCall' | 'headline'): string => {
    const found = field(name);
    return found === undefined ? pair[name] : unquoted(found);
  };
  return {
    ...pair,
    gap: number('gap'),
    marginOfError: number('marginOfError'),
    clearance: number('clearance'),
    flag: text('flag') as PairRow['flag'],
    sizeCall: text('sizeCall') as PairRow['sizeCall'],
    headline: text('headline'),
  };
}

function lastPart(path: string): string {
  return (
    path
      .split(/[.[\]/]+/)
      .filter(Boolean)
      .at(-1) ?? path
  );
}

function numberIn(written: string): number | null {
  const value = Number(written);
  return written.trim() !== '' && Number.isFinite(value) ? value : null;
}

/** Values come as written in the record, so words are in quotes. */
function unquoted(written: string): string {
  return written.replace(/^"(.*)"$/, '$1');
}
