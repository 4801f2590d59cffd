import { isNoValue, parseNumber, readDecimal } from './cells';
import { GrowingFloats } from './growing';
import { Row } from './head';
import { TableColumn } from './table-column';
import { TimeSource, TimeTrack } from './time-source';

/** Makes a string of a stretch of a file's bytes. */
export type TextOf = (bytes: Uint8Array, from: number, to: number) => string;

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

/** Disconnected probes read −127, 850, 9999 or 32767: no such temperature is a reading of a bench. °C */
const COLDEST = -90;
const HOTTEST = 400;

/** One kept column: its numbers, and what could not be read. */
export class KeptColumn {
  readonly values = new GrowingFloats();
  readonly bad: BadCell[] = [];
  badCount = 0;
  blankCount = 0;
  firstBlank: BadCell | null = null;
  private readonly scale: number;
  private readonly shift: number;
  private readonly lowest: number;
  private readonly highest: number;
  private readonly mark: number;

  /** @param temperature whether the readings must be temperatures */
  constructor(
    readonly column: TableColumn,
    temperature: boolean,
  ) {
    this.scale = column.unit?.scale ?? 1;
    this.shift = column.unit?.shift ?? 0;
    this.lowest = temperature ? COLDEST : -1e9;
    this.highest = temperature ? HOTTEST : 1e9;
    this.mark = column.decimal === ',' ? 44 : 46;
  }

  /** Takes the cell between two places of a line in bytes; `textOf` makes a string of it where it is no plain number. */
  takeBytes(bytes: Uint8Array, from: number, to: number, row: number, textOf: TextOf): void {
    const value = readDecimal(bytes, from, to, this.mark);
    if (Number.isNaN(value) || !this.takeValue(value)) this.take(textOf(bytes, from, to), row);
  }

  take(cell: string, row: number): void {
    const value = parseNumber(cell, this.column.decimal);
    if (this.takeValue(value)) return;
    this.values.push(NaN);
    if (Number.isNaN(value) && isNoValue(cell)) {
      this.blankCount += 1;
      this.firstBlank ??= { row, text: cell.trim() };
      return;
    }
    this.badCount += 1;
    if (this.bad.length < 5) this.bad.push({ row, text: cell });
  }

  private takeValue(read: number): boolean {
    // Untouched unless converted: 45.3 °C stays the double that "45.3" reads as.
    const value = this.scale !== 1 || this.shift !== 0 ? read * this.scale + this.shift : read;
    if (!(value >= this.lowest && value <= this.highest)) return false;
    this.values.push(value);
    return true;
  }
}

const MOST_ODD_ROWS = 2000;

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
  /** Rows taken as readings. */
  readings = 0;
  readonly odd: OddRow[] = [];
  oddCount = 0;
  /** Cells a row must have. */
  readonly needed: number;
  private readonly headerText: string;
  private readonly unitsText: string;

  /**
   * @param columns those to keep, each with whether it is a temperature
   * @param width cells a row has at most
   */
  constructor(
    readonly time: TimeSource,
    columns: ReadonlyMap<TableColumn, boolean>,
    private readonly width: number,
    names: readonly string[],
    units: readonly string[],
  ) {
    this.track = new TimeTrack(time);
    this.kept = [...columns].map(([column, temperature]) => new KeptColumn(column, temperature));
    const positions = this.kept.map((kept) => kept.column.position);
    this.needed = 1 + Math.max(time.position, time.datePosition ?? 0, ...positions);
    this.headerText = comparable(names);
    this.unitsText = comparable(units);
  }

  take(row: Row): void {
    const { cells, number } = row;
    if (cells.length < this.needed) {
      this.setAside(row, 'too short');
      return;
    }
    if (cells.length > this.width && cells.slice(this.width).some((cell) => cell.trim() !== '')) {
      this.setAside(row, 'too long');
      return;
    }
    if (!this.track.take(cells)) {
      this.setAside(row, 'no time');
      return;
    }
    this.rows.push(number);
    this.readings += 1;
    for (const kept of this.kept) kept.take(cells[kept.column.position], number);
  }

  /**
   * Takes a row by the places of its needed cells in bytes; false, and nothing taken, when its time does not read plainly.
   * `take` then has the last word.
   */
  takeBytes(bytes: Uint8Array, starts: Int32Array, ends: Int32Array, row: number, textOf: TextOf): boolean {
    const { kind, position, datePosition } = this.time;
    const [from, to] = [starts[position], ends[position]];
    if (kind === 'number') {
      const value = readDecimal(bytes, from, to, this.time.decimal === ',' ? 44 : 46);
      if (Number.isNaN(value)) return false;
      this.track.takeNumber(value);
    } else {
      const date = datePosition === null ? '' : textOf(bytes, starts[datePosition], ends[datePosition]);
      if (!this.track.takeText(textOf(bytes, from, to), date)) return false;
    }
    this.rows.push(row);
    this.readings += 1;
    for (const kept of this.kept) {
      const { position: at } = kept.column;
      kept.takeBytes(bytes, starts[at], ends[at], row, textOf);
    }
    return true;
  }

  private setAside(row: Row, kind: OddRow['kind']): void {
    if (row.cells.every((cell) => cell.trim() === '')) return;
    this.oddCount += 1;
    if (this.odd.length >= MOST_ODD_ROWS) return;
    const text = comparable(row.cells);
    const again = this.headerText !== '' && (text === this.headerText || text === this.unitsText);
    this.odd.push({
      row: row.number,
      kind: again ? 'header again' : kind,
      text: row.cells.find((cell) => cell.trim() !== '')?.trim() ?? '',
      after: this.readings,
    });
  }
}
