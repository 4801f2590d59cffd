import { ChangeDetectionStrategy, Component, computed, inject, input, output, signal } from '@angular/core';
import { reasonSchema } from '../../../../shared/contracts/common';
import { ChangeRunsRequest, Run, StudyCooler } from '../../../../shared/contracts/studies';
import { ApiProblem } from '../../core/api-problem';
import { formatNumber } from '../../ui/quantity/quantity-format';
import { StudiesClient } from '../studies-client';
import { TraceSketchDrawing } from '../../ui/trace-sketch/trace-sketch-drawing';

/** Every run of a condition by cooler and mount; several at once can be moved, left out with a reason, or put back. */
@Component({
  selector: 'tm-run-table',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [TraceSketchDrawing],
  templateUrl: './run-table.html',
  styleUrl: './run-table.scss',
})
export class RunTable {
  private readonly client = inject(StudiesClient);
  readonly studyId = input.required<string>();
  readonly runs = input.required<readonly Run[]>();
  readonly coolers = input.required<readonly StudyCooler[]>();
  readonly mayEdit = input(false);
  readonly changed = output<Run[]>();

  protected readonly selected = signal<ReadonlySet<string>>(new Set());
  protected readonly reason = signal('');
  protected readonly mount = signal('');
  protected readonly problem = signal<string | null>(null);
  protected readonly busy = signal(false);

  protected readonly rows = computed(() => {
    const place = new Map(this.coolers().map(({ id }, index) => [id, index]));
    return [...this.runs()]
      .sort(
        (a, b) =>
          (place.get(a.coolerId) ?? 0) - (place.get(b.coolerId) ?? 0) ||
          (a.mount ?? '').localeCompare(b.mount ?? '', 'en', { numeric: true }) ||
          a.name.localeCompare(b.name, 'en', { numeric: true }),
      )
      .map((run) => ({
        run,
        cooler: this.coolers().find(({ id }) => id === run.coolerId)?.name ?? '',
        rise: formatNumber(run.summary.rise, 2),
        resistance: run.summary.resistance === null ? '–' : formatNumber(run.summary.resistance, 4),
        watts: run.summary.watts === null ? '–' : formatNumber(run.summary.watts.mean, 1),
      }));
  });
  protected readonly allSelected = computed(
    () => this.selected().size > 0 && this.selected().size === this.runs().length,
  );
  protected readonly selectedLeftOut = computed(() =>
    this.runs().some(({ id, leftOut }) => leftOut !== null && this.selected().has(id)),
  );

  protected toggle(id: string): void {
    this.selected.update((selected) => {
      const next = new Set(selected);
      if (!next.delete(id)) next.add(id);
      return next;
    });
  }

  protected toggleAll(): void {
    this.selected.set(this.allSelected() ? new Set() : new Set(this.runs().map(({ id }) => id)));
  }

  protected leaveOut(): void {
    const parsed = reasonSchema.safeParse(this.reason());
    if (!parsed.success) {
      this.problem.set(parsed.error.issues[0].message);
      return;
    }
    this.change({ leaveOut: { reason: parsed.data } });
  }

  protected putBack(): void {
    this.change({ leaveOut: null });
  }

  protected setMount(): void {
    this.change({ mount: this.mount().trim() || null });
  }

  protected setCooler(coolerId: string): void {
    if (coolerId) this.change({ coolerId });
  }

  private change(change: Omit<ChangeRunsRequest, 'runIds'>): void {
    if (this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    this.client.changeRuns(this.studyId(), { runIds: [...this.selected()], ...change }).subscribe({
      next: ({ runs }) => {
        this.busy.set(false);
        this.selected.set(new Set());
        this.reason.set('');
        this.mount.set('');
        this.changed.emit(runs);
      },
      error: (error: unknown) => {
        this.busy.set(false);
        this.problem.set(ApiProblem.from(error).words);
      },
    });
  }
}
