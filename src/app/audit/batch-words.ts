import { RowResult } from './audit-row';
import { ReRunBatch } from './re-run-batch';

export interface HeadWords {
  readonly headline: string;
  readonly detail: string;
}

interface Counts {
  readonly identical: number;
  readonly sameVerdict: number;
  readonly changed: number;
  readonly cannot: number;
  readonly none: number;
}

function counts(results: readonly RowResult[]): Counts {
  const count = (matches: (result: RowResult) => boolean): number => results.filter(matches).length;
  return {
    identical: count(({ kind }) => kind === 'identical'),
    sameVerdict: count(({ kind, level }) => kind === 'differs' && level === 'caution'),
    changed: count(({ kind, level }) => kind === 'differs' && level === 'stop'),
    cannot: count(({ kind }) => kind === "can't re-run"),
    none: count(({ kind }) => kind === 'none'),
  };
}

const verdicts = (count: number): string => `${count} ${count === 1 ? 'verdict' : 'verdicts'}`;

/** What the list holds while nothing is re-run. */
export function listInWords(results: readonly RowResult[]): HeadWords {
  const { identical, none, ...rest } = counts(results);
  const toLookAt = rest.sameVerdict + rest.changed + rest.cannot;
  const parts = [
    toLookAt > 0 ? `${toLookAt} to look at` : null,
    none > 0 ? `${none} not re-run yet` : null,
    identical > 0 ? `${identical} identical` : null,
  ].filter((part) => part !== null);
  return {
    headline:
      parts.length > 0 ? `${verdicts(results.length)}: ${parts.join(', ')}` : verdicts(results.length),
    detail: 'A re-run reads the stored logs again and compares every field with the verdict as stored.',
  };
}

/** How a batch goes, or went. */
export function batchInWords(
  batch: Pick<ReRunBatch, 'running' | 'stopping' | 'queue' | 'done' | 'secondsLeft'>,
  results: readonly RowResult[],
): HeadWords {
  const { identical, sameVerdict, changed, cannot } = counts(results);
  const [total, done] = [batch.queue().length, batch.done()];
  const findings = [
    sameVerdict > 0
      ? `${sameVerdict} ${sameVerdict === 1 ? 'differs' : 'differ'} with the same verdict`
      : null,
    changed > 0 ? `${verdicts(changed)} ${changed === 1 ? 'changes' : 'change'}` : null,
    cannot > 0 ? `${cannot} can’t be re-run` : null,
  ].filter((part) => part !== null);
  const found =
    findings.length > 0
      ? `${findings.join(', ')}.`
      : done > 0
        ? 'Nothing differs so far.'
        : 'The stored logs of each are read again.';
  if (!batch.running()) {
    const stopped =
      done < total ? `Stopped after ${done} of ${verdicts(total)}` : `Re-ran ${verdicts(total)}`;
    return {
      headline: `${stopped}: ${identical} identical`,
      detail: findings.length > 0 ? found : done > 0 ? 'Nothing differs.' : '',
    };
  }
  return {
    headline: `Re-running ${verdicts(total)}: ${done} done, ${identical} identical`,
    detail: [found, batch.stopping() ? 'Stopping after this one.' : timeLeft(batch.secondsLeft())]
      .filter((part) => part !== '')
      .join(' '),
  };
}

function timeLeft(seconds: number | null): string {
  if (seconds === null) return '';
  if (seconds < 60) return `About ${Math.max(1, Math.round(seconds))} s left.`;
  return `About ${Math.round(seconds / 60)} min left.`;
}
