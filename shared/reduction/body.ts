import * as Papa from 'papaparse';
import { Collector, TextOf } from './collector';
import { countByte } from './count-bytes';
import { Head } from './head';

/** What Papa Parse's own parser answers. */
interface ParsedText {
  readonly data: string[][];
  readonly errors: readonly { readonly code: string; readonly row: number }[];
  readonly meta: { readonly cursor: number };
}

/** What stopped the reading of rows. */
export interface BodyFault {
  readonly fault: 'quote left open' | 'line too long';
  readonly row: number;
}

export const LONGEST_LINE = 500_000;
const QUOTE = 34;
const RETURN = 13;

/** The rows below the head, by Papa Parse: any encoding, quotes and line ends inside quotes. */
class TextRows {
  private pending = '';
  private readonly decoder: InstanceType<typeof TextDecoder>;
  private readonly parser: Papa.Parser;

  constructor(
    private readonly head: Head,
    private readonly collector: Collector,
    encoding: string,
    private row: number,
  ) {
    this.decoder = new TextDecoder(encoding);
    this.parser = new Papa.Parser({ delimiter: head.delimiter, newline: head.newline });
  }

  take(bytes: Uint8Array, last: boolean): BodyFault | null {
    this.pending += this.decoder.decode(bytes, { stream: !last });
    // Without `last` Papa leaves the final row, which may go on, and tells how far the complete ones reach.
    const parsed = this.parser.parse(this.pending, 0, !last) as ParsedText;
    const open = parsed.errors.find((error) => error.code === 'MissingQuotes')?.row ?? -1;
    for (const [index, cells] of parsed.data.entries()) {
      if (index === open) return { fault: 'quote left open', row: this.row };
      this.collector.take({ number: this.row, cells });
      this.row += 1;
      for (const cell of cells) {
        if (cell.includes(this.head.newline)) this.row += cell.split(this.head.newline).length - 1;
      }
    }
    this.pending = this.pending.slice(parsed.meta.cursor);
    return !last && this.pending.length > LONGEST_LINE ? { fault: 'line too long', row: this.row } : null;
  }
}

/**
 * The rows below the head in bytes, for text whose delimiters, digits and line ends are single bytes: without quotes a cell
 * is just what stands between two delimiters, so only the needed cells are read and the others are merely counted. At the
 * first quote Papa Parse takes over; a test holds both ways to the same answer.
 */
class ByteRows {
  private rest: Uint8Array = new Uint8Array(0);
  private readonly starts: Int32Array;
  private readonly ends: Int32Array;
  private readonly delimiter: number;
  private readonly newline: number;
  private readonly decoder: InstanceType<typeof TextDecoder>;
  private text: TextRows | null = null;
  private words = new Int32Array(0);

  constructor(
    private readonly head: Head,
    private readonly collector: Collector,
    private readonly encoding: string,
    private row: number,
  ) {
    this.starts = new Int32Array(collector.needed);
    this.ends = new Int32Array(collector.needed);
    this.delimiter = head.delimiter.charCodeAt(0);
    this.newline = head.newline.charCodeAt(0);
    this.decoder = new TextDecoder(encoding);
  }

  take(chunk: Uint8Array, last: boolean): BodyFault | null {
    if (this.text) return this.text.take(chunk, last);
    // In memory of its own, which begins on a whole word for `countByte`.
    const bytes = new Uint8Array(this.rest.length + chunk.length);
    bytes.set(this.rest);
    bytes.set(chunk, this.rest.length);
    if (bytes.includes(QUOTE)) {
      this.text = new TextRows(this.head, this.collector, this.encoding, this.row);
      return this.text.take(bytes, last);
    }
    this.words = new Int32Array(bytes.buffer, 0, bytes.buffer.byteLength >> 2);
    let at = 0;
    while (at < bytes.length) {
      let end = bytes.indexOf(this.newline, at);
      if (end === -1) {
        if (!last) break;
        end = bytes.length;
      }
      this.takeLine(bytes, at, end);
      at = end + 1;
    }
    this.rest = bytes.slice(at);
    return this.rest.length > LONGEST_LINE ? { fault: 'line too long', row: this.row } : null;
  }

  private takeLine(bytes: Uint8Array, from: number, end: number): void {
    const { starts, ends, delimiter } = this;
    const to = end > from && bytes[end - 1] === RETURN ? end - 1 : end;
    const needed = starts.length;
    let cells = 0;
    let at = from;
    let cellStart = from;
    for (; at < to && cells < needed; at += 1) {
      if (bytes[at] !== delimiter) continue;
      starts[cells] = cellStart;
      ends[cells] = at;
      cells += 1;
      cellStart = at + 1;
    }
    if (cells < needed) {
      starts[cells] = cellStart;
      ends[cells] = to;
    }
    cells += 1 + countByte(bytes, this.words, delimiter, at, to);
    if (cells !== this.head.width || !this.collector.takeBytes(bytes, starts, ends, this.row, this.textOf)) {
      this.collector.take({
        number: this.row,
        cells: this.textOf(bytes, from, to).split(this.head.delimiter),
      });
    }
    this.row += 1;
  }

  private readonly textOf: TextOf = (bytes, from, to) => {
    // Short cells of plain ASCII are the rule: a call of the decoder costs more than the characters.
    if (to - from <= 32) {
      let text = '';
      let at = from;
      for (; at < to && bytes[at] < 128; at += 1) text += String.fromCharCode(bytes[at]);
      if (at === to) return text;
    }
    return this.decoder.decode(bytes.subarray(from, to));
  };
}

/** Rows below the head, whichever way they are read. */
export interface Body {
  take(bytes: Uint8Array, last: boolean): BodyFault | null;
}

/** The reader of the rows from `head.firstDataRow` on. */
export function bodyOf(head: Head, collector: Collector, encoding: string): Body {
  const singleBytes = encoding === 'utf-8' || encoding === 'windows-1252';
  const Rows = singleBytes ? ByteRows : TextRows;
  return new Rows(head, collector, encoding, head.firstDataRow);
}
