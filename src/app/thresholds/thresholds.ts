import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import {
  changeThresholdsRequestSchema,
  thresholdsHistorySchema,
  ThresholdsVersion,
} from '../../../shared/contracts/thresholds';
import { Api } from '../core/api';
import { ApiProblem } from '../core/api-problem';
import { Session } from '../core/session';
import { contractErrors, fieldError } from '../ui/field-error/contract-errors';
import { FieldError } from '../ui/field-error/field-error';
import { load } from '../ui/loading/load';
import { WaitingFor } from '../ui/loading/waiting-for';
import { MomentPipe } from '../ui/moment/moment-pipe';
import { NoticeBoard } from '../ui/notices/notice-board';
import { formatLevel } from '../ui/quantity/quantity-format';

const number = () => new FormControl<number | null>(null);

/** The contract counts in shares, the form in percent, so its own words for what is out of range. */
const RANGE_WORDS: Readonly<Record<string, string>> = {
  'values.confidence': 'Give a percentage above 50 and below 100.',
  'values.power': 'Give a percentage above 50 and below 100.',
  'values.gapThatMatters': 'Give a gap above 0 °C.',
};

/** The rules a verdict is judged by. Each change makes a new numbered set with its reason; old sets stay. */
@Component({
  selector: 'tm-thresholds',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ReactiveFormsModule, WaitingFor, FieldError, MomentPipe],
  templateUrl: './thresholds.html',
  styleUrl: './thresholds.scss',
})
export class ThresholdsPage {
  private readonly api = inject(Api);
  private readonly notices = inject(NoticeBoard);
  private readonly session = inject(Session);

  protected readonly history = load(() => this.api.get('/thresholds', thresholdsHistorySchema));
  protected readonly mayChange = computed(() => this.session.has('lead'));
  protected readonly editing = signal(false);
  protected readonly busy = signal(false);
  protected readonly problem = signal<string | null>(null);
  private readonly errors = signal<Readonly<Record<string, string>>>({});
  protected readonly level = formatLevel;
  protected readonly form = new FormGroup({
    confidence: number(),
    power: number(),
    gapThatMatters: number(),
    reason: new FormControl('', { nonNullable: true }),
  });

  protected error(field: string): string | null {
    return fieldError(this.errors(), field);
  }

  /** What a set changed from the one before it, in words. */
  protected changes({ values }: ThresholdsVersion, before: ThresholdsVersion | undefined): string {
    if (!before) return 'first set';
    const old = before.values;
    const parts = [];
    if (values.gapThatMatters !== old.gapThatMatters)
      parts.push(`gap that matters ${old.gapThatMatters} → ${values.gapThatMatters} °C`);
    if (values.confidence !== old.confidence)
      parts.push(`confidence ${formatLevel(old.confidence)} → ${formatLevel(values.confidence)}`);
    if (values.power !== old.power)
      parts.push(`power ${formatLevel(old.power)} → ${formatLevel(values.power)}`);
    return parts.join(', ') || 'no value changed';
  }

  protected edit({ values }: ThresholdsVersion): void {
    this.form.setValue({
      // In percent, as people say it.
      confidence: Number((values.confidence * 100).toFixed(6)),
      power: Number((values.power * 100).toFixed(6)),
      gapThatMatters: values.gapThatMatters,
      reason: '',
    });
    this.errors.set({});
    this.problem.set(null);
    this.editing.set(true);
  }

  protected putInForce(current: ThresholdsVersion): void {
    if (this.busy()) return;
    const { confidence, power, gapThatMatters, reason } = this.form.getRawValue();
    const share = (percent: number | null): number => Number(((percent ?? NaN) / 100).toFixed(8));
    const parsed = changeThresholdsRequestSchema.safeParse({
      basedOn: current.number,
      values: { confidence: share(confidence), power: share(power), gapThatMatters: gapThatMatters ?? NaN },
      reason,
    });
    const errors = contractErrors(parsed);
    for (const path of Object.keys(errors)) errors[path] = RANGE_WORDS[path] ?? errors[path];
    this.errors.set(errors);
    this.problem.set(null);
    if (!parsed.success) return;
    this.busy.set(true);
    this.api.post('/thresholds', parsed.data, thresholdsHistorySchema).subscribe({
      next: (history) => {
        this.busy.set(false);
        this.editing.set(false);
        this.history.put(history);
        this.notices.done(`Thresholds set ${history.current.number} is in force.`);
      },
      error: (error: unknown) => {
        this.busy.set(false);
        this.problem.set(ApiProblem.from(error).words);
      },
    });
  }
}
