import { Body, BodyFault, LONGEST_LINE, bodyOf } from './body';
import { Collector } from './collector';
import { FoundColumns, chosenColumns, findColumns } from './find-columns';
import { finishLog } from './finish-log';
import { Head, findHead } from './head';
import { LogReading, ReadLog, ReadingOptions } from './log';
import { Problems } from './problems';
import { TableColumn, describeColumns, headerMismatch } from './table-column';
import { sniff } from './text-decoding';

/** Bytes looked at before the columns are decided; a wide table may need more to show a few rows. */
const HEAD_BYTES = 65536;
const HEAD_LINES = 40;
const HEAD_AT_MOST = 2_000_000;
/** Bytes taken at a time, so that a whole file handed over at once is not held a second time. */
const AT_ONCE = 262144;

interface Table {
  readonly head: Head;
  readonly columns: readonly TableColumn[];
  readonly found: FoundColumns;
  readonly encoding: string;
  /** null when the log has no time: nothing can be collected then. */
  readonly collector: Collector | null;
  readonly body: Body | null;
}

/** Reads one log from its bytes; see `startReading`. */
class LogReader implements LogReading {
  private readonly problems: Problems;
  private held: Uint8Array = new Uint8Array(HEAD_BYTES);
  private heldBytes = 0;
  private triedAt = 0;
  private table: Table | null = null;
  private stopped = false;

  constructor(
    fileName: string,
    private readonly options: ReadingOptions,
  ) {
    this.problems = new Problems(fileName);
  }

  write(bytes: Uint8Array): void {
    for (let at = 0; at < bytes.length && !this.stopped;) {
      const part = bytes.subarray(at, at + (this.table ? AT_ONCE : HEAD_BYTES));
      at += part.length;
      if (this.table && this.heldBytes === 0 && part.length >= HEAD_BYTES) {
        this.tell(this.table.body?.take(part, false) ?? null);
        continue;
      }
      this.hold(part);
      if (this.heldBytes < HEAD_BYTES) continue;
      if (this.table) this.passOn(false);
      else if (this.heldBytes >= Math.min(2 * this.triedAt, HEAD_AT_MOST)) this.beginTable(false);
    }
  }

  end(): ReadLog {
    if (!this.stopped && !this.table) this.beginTable(true);
    if (!this.stopped) this.passOn(true);
    if (this.stopped || !this.table) return { log: null, problems: this.problems.list };
    const { head, columns, found, encoding, collector } = this.table;
    const { problems, options } = this;
    return finishLog({ head, columns, found, encoding, problems, options }, collector);
  }

  /** Small chunks are gathered first: a line or quote left open would else be looked through again for each of them. */
  private hold(part: Uint8Array): void {
    if (this.heldBytes + part.length > this.held.length) {
      const larger = new Uint8Array(2 * (this.heldBytes + part.length));
      larger.set(this.held.subarray(0, this.heldBytes));
      this.held = larger;
    }
    this.held.set(part, this.heldBytes);
    this.heldBytes += part.length;
  }

  /** Hands the held bytes to the reader of rows. */
  private passOn(last: boolean): void {
    const fault = this.table?.body?.take(this.held.subarray(0, this.heldBytes), last) ?? null;
    this.heldBytes = 0;
    this.tell(fault);
  }

  /** Finds the table in the bytes held so far, once there are enough of them. */
  private beginTable(last: boolean): void {
    const bytes = this.held.subarray(0, this.heldBytes);
    const sniffed = sniff(bytes);
    if ('notText' in sniffed) {
      this.problems.notText(sniffed.notText, sniffed.archive);
      this.stop();
      return;
    }
    const { encoding } = sniffed;
    const text = new TextDecoder(encoding).decode(bytes, { stream: !last });
    this.triedAt = this.heldBytes;
    const { head: headText, lines } = firstLines(text, last);
    if (!last && this.heldBytes < HEAD_AT_MOST && lines < HEAD_LINES) return;
    if (!last && lines === 0) {
      this.tell({ fault: 'line too long', row: 1 });
      return;
    }
    const head = findHead(headText);
    if ('fault' in head) {
      this.problems.noTable(head);
      this.stop();
      return;
    }
    const columns = describeColumns(head);
    const found = this.columnsOf(head, columns);
    const kept = new Map<TableColumn, boolean>();
    for (const { role, contenders } of found.parts.values()) {
      const temperature = role === 'heat source' || role === 'ambient';
      for (const column of contenders) kept.set(column, temperature);
    }
    const collector = found.time
      ? new Collector(found.time.source, kept, columns.length, head.names, head.units)
      : null;
    const body = collector ? bodyOf(head, collector, encoding) : null;
    this.table = { head, columns, found, encoding, collector, body };
    const from = startOfRow(bytes, head, encoding);
    this.held.copyWithin(0, from, this.heldBytes);
    this.heldBytes -= from;
    this.passOn(false);
  }

  private columnsOf(head: Head, columns: readonly TableColumn[]): FoundColumns {
    const map = this.options.columnMap;
    if (map) return chosenColumns(columns, map);
    const mismatch = headerMismatch(head);
    if (!mismatch) return findColumns(columns);
    this.problems.headerMismatch(mismatch.names, mismatch.cells, head.headerRow);
    return { time: null, parts: new Map() };
  }

  private tell(fault: BodyFault | null): void {
    if (!fault) return;
    if (fault.fault === 'line too long') this.problems.longLine(fault.row, LONGEST_LINE);
    else this.problems.noTable({ fault: fault.fault, row: fault.row, cells: 0 });
    this.stop();
  }

  private stop(): void {
    this.stopped = true;
    this.held = new Uint8Array(0);
    this.table = null;
  }
}

/** The complete lines of a text's beginning, some tens of them; the unfinished last line too where the file ends with it. */
function firstLines(text: string, last: boolean): { head: string; lines: number } {
  const newline = text.includes('\n') || !text.includes('\r') ? '\n' : '\r';
  let end = 0;
  let lines = 0;
  while (lines < HEAD_LINES || end < HEAD_BYTES) {
    const next = text.indexOf(newline, end);
    if (next === -1) return { head: last ? text : text.slice(0, end), lines };
    end = next + 1;
    lines += 1;
  }
  return { head: text.slice(0, end), lines };
}

/** Where the first row of readings begins: so many line ends lie before it, quoted ones included. */
function startOfRow(bytes: Uint8Array, head: Head, encoding: string): number {
  const newline = head.newline.charCodeAt(0);
  const wide = encoding.startsWith('utf-16');
  const high = encoding === 'utf-16be' ? 0 : 1;
  let row = 1;
  let at = 0;
  for (; at < bytes.length && row < head.firstDataRow; at += wide ? 2 : 1) {
    if (wide ? bytes[at + 1 - high] === newline && bytes[at + high] === 0 : bytes[at] === newline) row += 1;
  }
  return at;
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
