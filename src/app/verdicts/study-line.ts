import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { Verdict, VerdictRow } from '../../../shared/contracts';
import { conditionInWords, countsInWords, stateInWords } from './verdict-words';

/** What is compared, under what load, from how many runs, and where the verdict stands. */
@Component({
  selector: 'tm-study-line',
  imports: [RouterLink],
  template: `
    <a class="back" routerLink="/">← Waiting</a>
    <b
      ><a [routerLink]="['/studies', verdict().study.id]">{{ verdict().study.name }}</a></b
    >
    <span>{{ compared() }}</span>
    <span>{{ condition() }}</span>
    <span>{{ counts() }}</span>
    @if (otherMetric(); as other) {
      <span class="metrics">
        {{ metric() }}
        <a [routerLink]="['/verdicts', other.id]">{{ otherName() }}</a>
      </span>
    }
    <span class="state">{{ state() }}</span>
  `,
  styleUrl: './study-line.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class StudyLine {
  readonly verdict = input.required<Verdict>();
  /** The verdict on the same runs by the other quantity, when the study has one. */
  readonly otherMetric = input<VerdictRow | null>(null);

  protected readonly compared = computed(() => {
    const names = this.verdict().judgement.coolers.map(({ name }) => name);
    return `${names.slice(0, -1).join(', ')} against ${names.at(-1) ?? ''}`;
  });
  protected readonly condition = computed(() => conditionInWords(this.verdict().condition));
  protected readonly counts = computed(() => countsInWords(this.verdict().judgement.coolers));
  protected readonly state = computed(() => stateInWords(this.verdict(), new Date()));
  protected readonly metric = computed(() => METRIC_NAMES[this.verdict().metric]);
  protected readonly otherName = computed(
    () => METRIC_NAMES[this.verdict().metric === 'rise' ? 'resistance' : 'rise'],
  );
}

const METRIC_NAMES: Record<Verdict['metric'], string> = {
  rise: 'ΔT over ambient',
  resistance: 'Thermal resistance',
};
