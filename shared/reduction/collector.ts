import { isNoValue, parseNumber } from './cells';
import { GrowingFloats } from './growing';
import { Row } from './head';
import { TableColumn } from './table-column';
import { TimeSource, TimeTrack } from './time-source';

/** A cell that holds neither a number nor a word for "no value". */
export interface BadCell {
  readonly row: number;
  readonly text: string;
}

/** A line that is not a row of readings. */
export interface OddRow {
  readonly row: number;
  readonly kind: 'header again' | 'no time' | 'too short' | 'too long';
  readonly text: string;
  /** Readings taken before it. */
  readonly after: number;
}

/** One kept column: its numbers, and what could not be read. */
export class KeptColumn {
  readonly values = new GrowingFloats();
  readonly bad: BadCell[] = [];
  badCount = 0;
  blankCount = 0;
  firstBlankRow: number | null = null;
  private readonly scale: number;
  private readonly shift: number;
  private readonly lowest: number;
  private readonly highest: number;

  constructor(readonly column: TableColumn) {
    this.scale = column.unit?.scale ?? 1;
    this.shift = column.unit?.shift ?? 0;
    // Disconnected probes read −127, 850, 9999 or 32767: no such temperature is a reading of a bench.
    const isTemperature = column.unit?.quantity === 'temperature';
    this.lowest = isTemperature ? -90 : -1e9;
    this.highest = isTemperature ? 400 : 1e9;
  }

  take(cell: string, row: number): void {
    let value = parseNumber(cell, this.column.decimal);
    if (!Number.isNaN(value)) {
      // Untouched unless converted: 45.3 °C stays the double that "45.3" reads as.
      if (this.scale !== 1 || this.shift !== 0) value = value * this.scale + this.shift;
      if (value >= this.lowest && value <= this.highest) {
        this.values.push(value);
        return;
      }
    }
    this.values.push(NaN);
    if (Number.isNaN(value) && isNoValue(cell)) {
      this.blankCount += 1;
      this.firstBlankRow ??= row;
      return;
    }
    this.badCount += 1;
    if (this.bad.length < 5) this.bad.push({ row, text: cell });
  }
}

const MAX_ODD_ROWS = 2000;

/** A row's cells as one text, to tell a repeated header by; empty cells at its end do not count. */
const comparable = (cells: readonly string[]): string =>
  cells
    .map((cell) =>
      cell
        .replace(/^[\ufeff#\s]+/, '')
        .replace(/\s+/g, ' ')
        .trim()
        .toLowerCase(),
    )
    .join('\t')
    .trimEnd();

/** Takes the rows of a log and keeps the numbers of the columns somebody needs. */
export class Collector {
  readonly track: TimeTrack;
  readonly kept: readonly KeptColumn[];
  readonly rows = new GrowingFloats();
  readonly odd: OddRow[] = [];
  oddCount = 0;
  private readonly needed: number;
  private readonly headerText: string;

  constructor(
    readonly time: TimeSource,
    columns: readonly TableColumn[],
    private readonly width: number,
    names: readonly string[],
  ) {
    this.track = new TimeTrack(time);
    this.kept = columns.map((column) => new KeptColumn(column));
    this.needed =
      1 + Math.max(time.position, time.datePosition ?? 0, ...columns.map((column) => column.position));
    this.headerText = comparable(names);
  }

  take(row: Row): void {
    const { cells, number } = row;
    if (cells.length < this.needed || cells.length > this.width) {
      if (this.wrongWidth(row)) return;
    }
    if (!this.track.take(cells)) {
      this.setAside(row, 'no time');
      return;
    }
    this.rows.push(number);
    for (const kept of this.kept) kept.take(cells[kept.column.position] ?? '', number);
  }

  /** Whether a row of unusual width was dealt with here. */
  private wrongWidth(row: Row): boolean {
    const { cells } = row;
    if (cells.every((cell) => cell.trim() === '')) return true;
    if (cells.length < this.needed) {
      this.setAside(row, 'too short');
      return true;
    }
    if (cells.slice(this.width).some((cell) => cell.trim() !== '')) {
      this.setAside(row, 'too long');
      return true;
    }
    return false;
  }

  private setAside(row: Row, kind: OddRow['kind']): void {
    if (row.cells.every((cell) => cell.trim() === '')) return;
    this.oddCount += 1;
    if (this.odd.length >= MAX_ODD_ROWS) return;
    const again = this.headerText !== '' && comparable(row.cells) === this.headerText;
    this.odd.push({
      row: row.number,
      kind: again ? 'header again' : kind,
      text: row.cells.find((cell) => cell.trim() !== '')?.trim() ?? '',
      after: this.rows.length,
    });
  }
}
