import * as Papa from 'papaparse';
import { Collector } from './collector';
import { chosenColumns, findColumns } from './find-columns';
import { Head, Row, findHead } from './head';
import { LogReading, ReadLog, ReadingOptions } from './log';
import { finishLog } from './finish-log';
import { Problems } from './problems';
import { TableColumn, describeColumns } from './table-column';
import { TextStream } from './text-decoding';

/** Text looked at before columns are decided. */
const HEAD_CHARACTERS = 65536;
/** A wide table may need more text to show a few rows. */
const HEAD_LINES = 40;
const HEAD_AT_MOST = 2_000_000;
const LONGEST_LINE = 500_000;
const MOST_COLUMNS = 1000;
/** Bytes decoded at a time, so that a whole file handed over at once is not held as text too. */
const DECODED_AT_ONCE = 262144;

interface Table {
  readonly head: Head;
  readonly columns: readonly TableColumn[];
  readonly found: ReturnType<typeof findColumns>;
  /** null when the log has no time: nothing can be collected then. */
  readonly collector: Collector | null;
}

/** Reads one log from its bytes; see `startReading`. */
class LogReader implements LogReading {
  private readonly text = new TextStream();
  private readonly problems: Problems;
  private pending = '';
  private table: Table | null = null;
  private row = 1;
  private stopped = false;

  constructor(
    fileName: string,
    private readonly options: ReadingOptions,
  ) {
    this.problems = new Problems(fileName);
  }

  write(bytes: Uint8Array): void {
    for (let at = 0; at < bytes.length && !this.stopped; at += DECODED_AT_ONCE) {
      this.takeText(this.text.write(bytes.subarray(at, at + DECODED_AT_ONCE)), false);
    }
  }

  end(): ReadLog {
    if (!this.stopped) this.takeText(this.text.end(), true);
    if (this.stopped || !this.table) return { log: null, problems: this.problems.list };
    return finishLog(this.table.head, this.table.columns, this.table.found, this.table.collector, {
      encoding: this.text.encoding ?? 'utf-8',
      problems: this.problems,
      options: this.options,
    });
  }

  private takeText(text: string, last: boolean): void {
    if (this.text.refused) {
      this.problems.notText(this.text.refused.notText, this.text.refused.archive);
      this.stop();
      return;
    }
    this.pending += text;
    if (!this.table && (last || this.headIsThere())) this.beginTable(last);
    if (this.table) this.takeRows(last);
    if (!this.stopped && this.pending.length > LONGEST_LINE && this.table) {
      this.problems.longLine(this.row, LONGEST_LINE);
      this.stop();
    }
  }

  private headIsThere(): boolean {
    if (this.pending.length < HEAD_CHARACTERS) return false;
    if (this.pending.length >= HEAD_AT_MOST) return true;
    let at = -1;
    for (let lines = 0; lines < HEAD_LINES; lines += 1) {
      at = this.pending.indexOf('\n', at + 1);
      if (at === -1) return false;
    }
    return true;
  }

  private beginTable(last: boolean): void {
    // A log that stops in the middle of a line still shows its head; the last line may be cut.
    const cut = Math.max(this.pending.lastIndexOf('\n'), this.pending.lastIndexOf('\r'));
    const whole = last || cut === -1 ? this.pending : this.pending.slice(0, cut + 1);
    if (cut === -1 && this.pending.length > LONGEST_LINE) {
      this.problems.longLine(1, LONGEST_LINE);
      this.stop();
      return;
    }
    const head = findHead(whole);
    if (typeof head === 'string') {
      this.problems.noTable(head, null);
      this.stop();
      return;
    }
    const columns = describeColumns(head);
    if (columns.length > MOST_COLUMNS) {
      this.problems.tooManyColumns(columns.length, head.firstDataRow);
      this.stop();
      return;
    }
    const map = this.options.columnMap;
    const found = map ? chosenColumns(columns, map) : findColumns(columns);
    const kept = new Set([...found.parts.values()].flatMap((part) => part.contenders));
    const collector = found.time
      ? new Collector(found.time.source, [...kept], columns.length, head.names)
      : null;
    this.table = { head, columns, found, collector };
  }

  /** Takes the complete rows of the pending text; Papa tells how far they reach. */
  private takeRows(last: boolean): void {
    const { head, collector } = this.table!;
    const parser = new Papa.Parser({ delimiter: head.delimiter, newline: head.newline });
    const parsed = parser.parse(this.pending, 0, !last) as { data: string[][]; meta: { cursor: number } };
    const quoted = this.pending.includes('"');
    for (const cells of parsed.data) {
      const row: Row = { number: this.row, cells };
      this.row += 1;
      if (quoted) {
        for (const cell of cells)
          if (cell.includes(head.newline)) this.row += cell.split(head.newline).length - 1;
      }
      if (row.number >= head.firstDataRow) collector?.take(row);
    }
    this.pending = last ? '' : this.pending.slice(parsed.meta.cursor);
  }

  private stop(): void {
    this.stopped = true;
    this.pending = '';
    this.table = null;
  }
}

/**
 * Starts reading a delimited log. The bytes may come in chunks of any size; memory stays near the size of the needed
 * columns. Never throws for what a file holds: every fault becomes a problem that says what to do.
 * @param fileName named in every problem
 * @param options columns chosen by a person or remembered by the bench; null: recognise them
 */
export function startReading(fileName: string, options: ReadingOptions = {}): LogReading {
  return new LogReader(fileName, options);
}
