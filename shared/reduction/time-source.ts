import { DateOrder, WrittenDate, dayNumber, parseDate } from './calendar';
import { DecimalMark, parseNumber } from './cells';
import { clockStart, datePart, parseClock } from './clock';
import { GrowingFloats } from './growing';

/** Where a log keeps its time and how it writes it. */
export interface TimeSource {
  readonly position: number;
  readonly kind: 'number' | 'clock' | 'stamp';
  /** Seconds per unit, for `number`. */
  readonly scale: number;
  /** Seconds are counted from 1970-01-01 (in `number` after scaling and shift). */
  readonly epoch: boolean;
  readonly shift: number;
  /** Whether `12:30` means minutes and seconds. */
  readonly minutesFirst: boolean;
  /** Column of the date beside a clock. */
  readonly datePosition: number | null;
  readonly decimal: DecimalMark;
}

/** The number of two digits at a place; NaN when they are none. */
function twoDigits(text: string, at: number): number {
  const tens = text.charCodeAt(at) - 48;
  const ones = text.charCodeAt(at + 1) - 48;
  return tens >= 0 && tens <= 9 && ones >= 0 && ones <= 9 ? tens * 10 + ones : NaN;
}

/** Times as they come in: seconds of the day or of the run, with the rows at which the date changes kept apart,
 *  because whether a date is day-first may only show later in the log. */
export class TimeTrack {
  private readonly seconds = new GrowingFloats();
  private readonly dates: { readonly from: number; readonly date: WrittenDate }[] = [];
  private dateText = '';
  /** The date cell of the row before, and what stood before its clock: where both are the same, so is the day. */
  private dateCell: string | null = null;
  private beforeClock = '';
  private offset: number | null = null;

  constructor(private readonly source: TimeSource) {}

  /** Takes the time of one row; false, and nothing taken, when the row has none. */
  take(cells: readonly string[]): boolean {
    const { position, datePosition } = this.source;
    return this.takeText(cells[position] ?? '', datePosition === null ? '' : (cells[datePosition] ?? ''));
  }

  /** Takes a time by its cell and, for a clock with its date apart, that date's cell. */
  takeText(timeCell: string, dateCell: string): boolean {
    const cell = timeCell.trim();
    if (cell === '') return false;
    if (this.source.kind === 'number') {
      const value = parseNumber(cell, this.source.decimal);
      if (!Number.isFinite(value)) return false;
      this.takeNumber(value);
      return true;
    }
    if (this.takeSameDay(cell, dateCell)) return true;
    let clockText = cell;
    let dateText: string | null = dateCell.trim() === '' ? null : dateCell.trim();
    if (this.source.kind === 'stamp') {
      dateText = datePart(cell);
      if (dateText === null) return false;
      clockText = cell.slice(clockStart(cell));
    }
    const clock = parseClock(clockText);
    if (!clock) return false;
    if (dateText !== null && dateText !== this.dateText) {
      const date = parseDate(dateText);
      if (!date) return false;
      this.dateText = dateText;
      this.dates.push({ from: this.seconds.length, date });
    }
    this.offset ??= clock.offset;
    this.dateCell = dateCell;
    this.beforeClock = cell.slice(0, cell.length - clockText.length);
    const seconds = clock.parts === 2 && this.source.minutesFirst ? clock.seconds / 60 : clock.seconds;
    // A change of the UTC offset inside a log is summer time beginning or ending: only the written hour jumps.
    this.seconds.push(seconds - (clock.offset - this.offset));
    return true;
  }

  /** Takes a time that is a number, in the unit of its column. */
  takeNumber(value: number): void {
    this.seconds.push(value * this.source.scale + this.source.shift);
  }

  /** The usual row: the date of the row before and a clock as hh:mm:ss, read without patterns. */
  private takeSameDay(cell: string, dateCell: string): boolean {
    if (this.dateCell !== dateCell || this.offset !== 0) return false;
    const at = cell.length - 8;
    if (at < 0 || at !== this.beforeClock.length || !cell.startsWith(this.beforeClock)) return false;
    const hours = twoDigits(cell, at);
    const minutes = twoDigits(cell, at + 3);
    const seconds = twoDigits(cell, at + 6);
    const colons = cell.charCodeAt(at + 2) === 58 && cell.charCodeAt(at + 5) === 58;
    if (!colons || !(hours < 100 && minutes < 60 && seconds < 60)) return false;
    this.seconds.push(hours * 3600 + minutes * 60 + seconds);
    return true;
  }

  get length(): number {
    return this.seconds.length;
  }

  /** The times in seconds, from midnight 1970-01-01 when the log has dates whose order is known. */
  settle(asked: DateOrder | undefined): SettledTimes {
    const seconds = this.seconds.release();
    if (this.dates.length === 0) {
      return { seconds, dated: this.source.epoch, dateUnclear: null };
    }
    const possible = this.possibleOrders();
    const same = this.dates.every(({ date }) => date.first === date.second);
    const order = possible.length === 1 || same ? possible[0] : (asked ?? null);
    const days = this.dates.map(({ date }) => dayNumber(date, order ?? 'day first'));
    for (let d = 0; d < days.length; d += 1) {
      const to = this.dates[d + 1]?.from ?? seconds.length;
      // Unclear on one day only: the day is the same in each reading, so the time inside the run is not in doubt.
      for (let i = d === 0 ? 0 : this.dates[d].from; i < to; i += 1) seconds[i] += days[d] * 86400;
    }
    return { seconds, dated: order !== null, dateUnclear: order === null ? this.dates[0].date : null };
  }

  /** Orders of day and month that make the dates of the log follow one another most closely. */
  private possibleOrders(): DateOrder[] {
    const unclear = this.dates.filter(({ date }) => date.order === 'unclear');
    if (unclear.length === 0) return ['day first'];
    const known = this.dates.find(({ date }) => date.order === 'day first' || date.order === 'month first');
    if (known) return [known.date.order as DateOrder];
    if (this.dates.length === 1) return ['day first', 'month first'];
    const leap = (order: DateOrder): number => {
      let largest = 0;
      for (let d = 1; d < this.dates.length; d += 1) {
        const step = dayNumber(this.dates[d].date, order) - dayNumber(this.dates[d - 1].date, order);
        largest = Math.max(largest, step < 0 ? Infinity : step);
      }
      return largest;
    };
    const [dayFirst, monthFirst] = [leap('day first'), leap('month first')];
    if (dayFirst === monthFirst) return ['day first', 'month first'];
    return [dayFirst < monthFirst ? 'day first' : 'month first'];
  }
}

export interface SettledTimes {
  readonly seconds: Float64Array;
  /** Whether `seconds` counts from 1970-01-01. */
  readonly dated: boolean;
  /** A date that reads two ways, when the log does not tell which. */
  readonly dateUnclear: WrittenDate | null;
}
