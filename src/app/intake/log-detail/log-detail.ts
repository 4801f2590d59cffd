import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { ColumnMap } from '../../../../shared/contracts/run-summary';
import { formatNumber, formatSigned, withUnit } from '../../ui/quantity/quantity-format';
import { DroppedLog } from '../dropped-log';
import { IntakeStore } from '../intake-store';
import { clockWords, parseClock } from './clock-words';
import { TraceEditor } from './trace-editor';

const ROLES: readonly { readonly key: keyof ColumnMap; readonly name: string }[] = [
  { key: 'time', name: 'time' },
  { key: 'heatSource', name: 'heat source, °C' },
  { key: 'ambient', name: 'ambient, °C' },
  { key: 'watts', name: 'power, W' },
  { key: 'fanSpeed', name: 'fan speed, rpm' },
];

/** The open log: trace and steady window to move, its numbers, and which column is which. */
@Component({
  selector: 'tm-log-detail',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [TraceEditor],
  templateUrl: './log-detail.html',
  styleUrl: './log-detail.scss',
})
export class LogDetail {
  protected readonly store = inject(IntakeStore);
  readonly log = input.required<DroppedLog>();

  protected readonly roles = ROLES;
  protected readonly clock = clockWords;
  /** Whether a column change is meant for every log with the same header. */
  protected readonly alike = signal(true);
  protected readonly fieldProblem = signal<string | null>(null);

  protected readonly summary = computed(() => this.log().readout?.summary ?? null);
  protected readonly fixed = computed(() => this.log().state === 'done' || this.log().state === 'sending');
  protected readonly subtitle = computed(() => {
    const { assignment, readout } = this.log();
    const place = [
      this.store.coolerName(assignment.coolerId),
      assignment.mount === null ? 'mount not recorded' : `mount ${assignment.mount}`,
      `run ${assignment.run || 'not set'}`,
    ].join(', ');
    const summary = readout?.summary;
    const order = this.store.orderOf(this.log());
    const tested = order === null ? 'order of testing not known' : `tested as number ${order}`;
    return summary
      ? `${place}. ${Math.round(summary.duration / 60)} min, ${summary.readings} readings, ${tested}.`
      : `${place}.`;
  });
  protected readonly facts = computed(() => {
    const summary = this.summary();
    if (!summary) return [];
    const { window, ambient, watts, fanSpeed, within } = summary;
    const facts = [
      { name: 'ΔT over ambient, mean', value: withUnit(formatNumber(summary.rise, 2), '°C') },
      { name: 'Known to at least', value: withUnit(`±${formatNumber(within.standardError, 3)}`, '°C') },
      {
        name: 'Slope in the window',
        value: `${withUnit(formatSigned(window.slopePer5Minutes, 3), '°C')} in 5 min, ${window.settled}`,
      },
      {
        name: 'Ambient in the window',
        value: `${withUnit(formatNumber(ambient.mean, 1), '°C')}, moved ${withUnit(formatNumber(ambient.highest - ambient.lowest, 1), '°C')}`,
      },
    ];
    if (watts)
      facts.push({
        name: 'Power in the window',
        value: withUnit(`${formatNumber(watts.mean, 1)} ± ${formatNumber(watts.standardDeviation, 1)}`, 'W'),
      });
    if (summary.resistance !== null)
      facts.push({
        name: 'Resistance',
        value: `${withUnit(formatNumber(summary.resistance, 4), 'K/W')} (${withUnit(formatNumber(summary.resistance * 100, 2), '°C')} per 100 W)`,
      });
    if (fanSpeed) facts.push({ name: 'Fan', value: withUnit(formatNumber(fanSpeed.mean, 0), 'rpm') });
    if (summary.sensorStep !== null)
      facts.push({ name: 'Sensor step', value: withUnit(formatNumber(summary.sensorStep, 2), '°C') });
    return facts;
  });
  protected readonly notes = computed(() => this.summary()?.findings ?? []);
  protected readonly needsAmbient = computed(() => {
    const readout = this.log().readout;
    return readout?.columnMap?.ambient === null;
  });

  protected positionOf(key: keyof ColumnMap): string {
    const position = this.log().readout?.columnMap?.[key];
    return position === undefined || position === null ? '' : String(position);
  }

  protected reasonOf(key: keyof ColumnMap): string {
    const readout = this.log().readout;
    const position = readout?.columnMap?.[key];
    return readout?.columns.find((column) => column.position === position)?.reason ?? '';
  }

  protected setColumn(key: keyof ColumnMap, value: string): void {
    const map = this.log().readout?.columnMap;
    if (!map) return;
    const position = value === '' ? null : Number(value);
    this.store.setColumns(this.log().id, { ...map, [key]: position }, this.alike());
  }

  protected setAmbient(text: string): void {
    const value = text.trim() === '' ? null : Number(text.replace(',', '.'));
    if (value !== null && (!Number.isFinite(value) || value < -50 || value > 100)) {
      this.fieldProblem.set('Give the ambient in °C, from −50 to 100.');
      return;
    }
    this.fieldProblem.set(null);
    this.store.setFixedAmbient(this.log().id, value);
  }

  protected move(window: { readonly from: number; readonly to: number }): void {
    this.fieldProblem.set(null);
    this.store.setWindow(this.log().id, { ...window, reason: this.log().choices.window?.reason ?? '' });
  }

  protected typed(end: 'from' | 'to', text: string): void {
    const seconds = parseClock(text);
    const now = this.summary()?.window;
    if (!now) return;
    const next = { from: now.from, to: now.to, [end]: seconds ?? NaN };
    if (!(next.from < next.to) || next.to > (this.log().readout?.seconds ?? 0) + 1 || next.from < 0) {
      this.fieldProblem.set(
        'Give minutes and seconds inside the log, such as 17:33, the start before the end.',
      );
      return;
    }
    this.move(next);
  }

  protected byRule(): void {
    this.store.setWindow(this.log().id, null);
  }
}
