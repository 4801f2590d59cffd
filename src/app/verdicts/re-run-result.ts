import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { ReRun } from '../../../shared/contracts';
import { FindingMark } from '../ui/findings/finding-mark';
import { plural } from './verdict-words';

/** What a re-run from the stored raw files found: identical, or exactly what differs. */
@Component({
  selector: 'tm-re-run-result',
  imports: [FindingMark],
  templateUrl: './re-run-result.html',
  styleUrl: './re-run-result.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReRunResult {
  readonly reRun = input.required<ReRun>();

  protected readonly level = computed(() => {
    const { result } = this.reRun();
    return result === 'identical'
      ? 'note'
      : result === 'differs' && !changesVerdict(this.reRun())
        ? 'caution'
        : 'stop';
  });
  protected readonly summary = computed(() => reRunInWords(this.reRun()));
  protected readonly counted = computed(() => {
    const { logsRead, fieldsCompared, engine, method } = this.reRun();
    const engines =
      engine.stored === engine.now
        ? `engine ${engine.now}`
        : `engine ${engine.stored} then, ${engine.now} now`;
    return `${plural(logsRead, 'log')} read, ${plural(fieldsCompared, 'field')} compared; method ${method}, ${engines}.`;
  });
}

/** Fields whose change is a change of the verdict itself, not of its figures. */
const CALL = /(^|\.)(flag|sizeCall|scope|headline)$/;

/** Whether a difference reaches the call itself. */
export function changesVerdict({ differences }: Pick<ReRun, 'differences'>): boolean {
  return differences.some(({ path }) => CALL.test(path));
}

/** The result in one line: `Identical: every field, to the last digit`. */
export function reRunInWords(reRun: ReRun): { readonly head: string; readonly rest: string } {
  switch (reRun.result) {
    case 'identical':
      return { head: 'Identical', rest: 'every field, to the last digit' };
    case 'differs': {
      const fields = plural(reRun.differences.length, 'field');
      return changesVerdict(reRun)
        ? { head: 'Differs, verdict changes', rest: fields }
        : { head: 'Differs', rest: `${fields}; verdict unchanged` };
    }
    case "can't re-run":
      return { head: 'Can’t re-run', rest: reRun.reason ?? 'no reason given' };
  }
}
