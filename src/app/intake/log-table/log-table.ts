import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { Condition, StudyCooler } from '../../../../shared/contracts/studies';
import { FindingMark } from '../../ui/findings/finding-mark';
import { formatNumber, withUnit } from '../../ui/quantity/quantity-format';
import { TraceSketchDrawing } from '../../ui/trace-sketch/trace-sketch-drawing';
import { Assignment, DroppedLog, problemsOf } from '../dropped-log';
import { IntakeStore } from '../intake-store';

const MEGABYTE = 1024 * 1024;

/** Every log of the drop with what was read and where it belongs; problems stand under their log. */
@Component({
  selector: 'tm-log-table',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [TraceSketchDrawing, FindingMark],
  templateUrl: './log-table.html',
  styleUrl: './log-table.scss',
})
export class LogTable {
  protected readonly store = inject(IntakeStore);
  readonly coolers = input.required<readonly StudyCooler[]>();
  readonly conditions = input.required<readonly Condition[]>();

  private lastToggled: number | null = null;

  protected readonly allSelected = computed(
    () => this.store.logs().length > 0 && this.store.selected().size === this.store.logs().length,
  );
  protected readonly rows = computed(() => {
    const missing = this.store.missing();
    return this.store.logs().map((log) => ({
      log,
      size: sizeWords(log.file.size),
      state: stateWords(log),
      columns: (log.readout?.columns ?? [])
        .filter(({ role }) => role !== null)
        .map(({ header, role }) => header || role)
        .join(', '),
      rise: log.readout?.summary ? formatNumber(log.readout.summary.rise, 2) : null,
      resistance: resistanceWords(log.readout?.summary?.resistance ?? null),
      place: this.placeWords(log),
      problems: problemsOf(log),
      findings: (log.readout?.summary?.findings ?? []).filter(({ level }) => level !== 'note'),
      missing: missing.get(log.id) ?? null,
      fixed: log.state === 'done' || log.state === 'sending',
    }));
  });

  /** Where the log belongs and what it says, in one line. */
  private placeWords({ assignment, readout }: DroppedLog): string {
    const { coolerId, mount, run } = assignment;
    const place = `${coolerId === null ? 'Cooler not set' : this.store.coolerName(coolerId)}, ${mount === null ? 'mount not recorded' : `mount ${mount}`}, run ${run || 'not set'}`;
    return readout?.summary ? `${place}; ${withUnit(formatNumber(readout.summary.rise, 2), '°C')}` : place;
  }

  protected toggle(id: number, event: MouseEvent): void {
    const logs = this.store.logs();
    const from = logs.findIndex((log) => log.id === this.lastToggled);
    const to = logs.findIndex((log) => log.id === id);
    if (event.shiftKey && from >= 0) {
      const between = logs.slice(Math.min(from, to), Math.max(from, to) + 1).map((log) => log.id);
      this.store.selected.update((selected) => new Set([...selected, ...between]));
    } else {
      this.store.toggle(id);
    }
    this.lastToggled = id;
  }

  protected toggleAll(): void {
    this.store.selected.set(this.allSelected() ? new Set() : new Set(this.store.logs().map(({ id }) => id)));
  }

  protected set(log: DroppedLog, change: Partial<Assignment>): void {
    this.store.assign(new Set([log.id]), change);
  }
}

const sizeWords = (bytes: number): string =>
  bytes < MEGABYTE ? `${Math.max(1, Math.round(bytes / 1024))} kB` : `${(bytes / MEGABYTE).toFixed(1)} MB`;

const resistanceWords = (value: number | null): string | null =>
  value === null ? null : formatNumber(value, 4);

function stateWords(log: DroppedLog): string {
  if (log.outcome?.outcome === 'stored') return 'stored';
  if (log.outcome?.outcome === 'already stored' || log.sameAs !== null) return 'already here';
  if (log.outcome?.outcome === 'refused') return 'refused';
  if (log.state === 'failed') return 'not read';
  return log.state === 'done' ? 'stored' : log.state;
}
