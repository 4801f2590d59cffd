import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { Verdict } from '../../../shared/contracts';
import { MomentPipe } from '../ui/moment/moment-pipe';

/** What became of the verdict, newest first, as the ledger has it. */
@Component({
  selector: 'tm-life-steps',
  imports: [MomentPipe],
  template: `
    <h2 class="section-head">Life of this verdict <small>as the ledger has it, newest first</small></h2>
    <ol>
      @for (step of newestFirst(); track $index) {
        <li>
          <span class="what">{{ step.action }}</span>
          <span class="who">{{ step.by }}, {{ step.role }}</span>
          <time [attr.datetime]="step.at">{{ step.at | tmMoment }}</time>
          @if (step.comment) {
            <p>{{ step.comment }}</p>
          }
        </li>
      }
    </ol>
  `,
  styleUrl: './life-steps.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LifeSteps {
  readonly verdict = input.required<Verdict>();
  protected readonly newestFirst = computed(() =>
    [...this.verdict().steps].sort((one, other) => other.at.localeCompare(one.at)),
  );
}
