import * as Papa from 'papaparse';
import { parseDate } from './calendar';
import { isNoValue, parseNumber } from './cells';
import { parseClock, parseStamp } from './clock';
import { unitOf } from './units';

/** A parsed line with its physical row, from 1. */
export interface Row {
  readonly number: number;
  readonly cells: readonly string[];
}

/** What the beginning of a log shows. */
export interface Head {
  readonly newline: '\n' | '\r';
  readonly delimiter: string;
  readonly headerRow: number | null;
  readonly unitsRow: number | null;
  /** Names of the columns, blanks trimmed; empty strings where the log names none. */
  readonly names: readonly string[];
  /** Unit cells of the row below the header, or empty. */
  readonly units: readonly string[];
  readonly firstDataRow: number;
  /** Rows of readings seen so far, in order. */
  readonly sample: readonly Row[];
  readonly titles: readonly Row[];
}

export type HeadFault = 'empty' | 'no readings' | 'one row' | 'one column';

export type CellKind = 'blank' | 'number' | 'time' | 'text';

/** What a cell looks like by itself. */
export function kindOf(cell: string): CellKind {
  if (isNoValue(cell)) return 'blank';
  const text = cell.trim();
  if (!Number.isNaN(parseNumber(text, '.')) || !Number.isNaN(parseNumber(text, ','))) return 'number';
  if (parseClock(text) || parseDate(text) || parseStamp(text)) return 'time';
  return 'text';
}

/** Splits text into rows, complete lines only. Quoted cells may hold line ends, so the rows are counted by them. */
export function splitRows(text: string, delimiter: string, newline: string, firstRow: number): Row[] {
  const rows: Row[] = [];
  let number = firstRow;
  for (const cells of Papa.parse<string[]>(text, { delimiter, newline: newline as '\n' }).data) {
    rows.push({ number, cells });
    number += 1;
    for (const cell of cells) if (cell.includes(newline)) number += cell.split(newline).length - 1;
  }
  return rows;
}

const filled = (row: Row): number => row.cells.filter((cell) => cell.trim() !== '').length;

/** Width without the empty cells that a delimiter at the line's end leaves. */
function width(row: Row): number {
  let end = row.cells.length;
  while (end > 0 && row.cells[end - 1].trim() === '') end -= 1;
  return end;
}

function looksLikeReadings(row: Row): boolean {
  const kinds = row.cells.map(kindOf);
  const readable = kinds.filter((kind) => kind === 'number' || kind === 'time').length;
  const texts = kinds.filter((kind) => kind === 'text').length;
  return readable >= 2 && readable > 1.5 * texts;
}

/** How well a delimiter fits: the share of rows of one width that read as numbers, weighed by that share's evenness. */
function fitOf(rows: readonly Row[]): { score: number; width: number } {
  const tail = rows.filter((row) => filled(row) > 0).slice(-60);
  const counts = new Map<number, number>();
  for (const row of tail) {
    if (row.cells.length > 1 && looksLikeReadings(row)) {
      counts.set(row.cells.length, (counts.get(row.cells.length) ?? 0) + 1);
    }
  }
  let best = { score: 0, width: 1 };
  for (const [cells, count] of counts) {
    const score = count / tail.length;
    if (score > best.score) best = { score, width: cells };
  }
  return best;
}

const DELIMITERS = [',', ';', '\t', '|'];

function chooseDelimiter(text: string, newline: string): { delimiter: string; rows: Row[] } | null {
  let best: { delimiter: string; rows: Row[]; score: number } | null = null;
  // The first lines are enough to compare by; the winner then splits the whole head.
  let end = 0;
  for (let lines = 0; lines < 120 && end !== -1 && end < 40000; lines += 1)
    end = text.indexOf(newline, end + 1);
  const short = end === -1 ? text : text.slice(0, end);
  for (const delimiter of DELIMITERS) {
    if (!short.includes(delimiter)) continue;
    const rows = splitRows(short, delimiter, newline, 1);
    const fit = fitOf(rows);
    // A tie is won by the delimiter that makes more columns.
    const score = fit.score + Math.min(fit.width, 1000) * 1e-6;
    if (fit.score > 0 && (!best || score > best.score)) best = { delimiter, rows, score };
  }
  if (!best) return null;
  return { delimiter: best.delimiter, rows: splitRows(text, best.delimiter, newline, 1) };
}

const isUnitsRow = (row: Row): boolean => {
  const cells = row.cells.filter((cell) => cell.trim() !== '');
  return cells.length > 0 && cells.every((cell) => unitOf(cell) !== null);
};

const cleanName = (cell: string): string =>
  cell
    .replace(/^[\ufeff#\s]+/, '')
    .replace(/\s+/g, ' ')
    .trim();

/**
 * Finds delimiter, header, units and first readings.
 * @param text the log's first lines, complete but perhaps for the last when the file ends there
 */
export function findHead(text: string): Head | HeadFault {
  if (text.trim() === '') return 'empty';
  const newline = text.includes('\n') ? '\n' : text.includes('\r') ? '\r' : '\n';
  const chosen = chooseDelimiter(text, newline);
  if (!chosen) return DELIMITERS.some((delimiter) => text.includes(delimiter)) ? 'no readings' : 'one column';
  const { rows, delimiter } = chosen;
  const usual = fitOf(rows).width;
  const readings = rows.filter(
    (row) =>
      looksLikeReadings(row) &&
      width(row) > 1 &&
      row.cells.length >= Math.min(usual, 3) &&
      Math.abs(row.cells.length - usual) <= 1,
  );
  if (readings.length === 0) return 'no readings';
  if (readings.length === 1) return 'one row';
  const first = readings[0];
  const above = rows.filter((row) => row.number < first.number && filled(row) > 0);
  let header = above.at(-1) ?? null;
  let units: Row | null = null;
  if (header && isUnitsRow(header) && above.length > 1) {
    units = header;
    header = above.at(-2) ?? null;
  }
  // A title line is narrower than the table; a header names at least two columns.
  if (header && (filled(header) < 2 || filled(header) < width(first) / 3)) header = null;
  return {
    newline,
    delimiter,
    headerRow: header?.number ?? null,
    unitsRow: units?.number ?? null,
    names: header ? header.cells.map(cleanName) : [],
    units: units ? units.cells.map((cell) => cell.trim()) : [],
    firstDataRow: first.number,
    sample: rows.filter((row) => row.number >= first.number && filled(row) > 0),
    titles: above.filter((row) => row !== header && row !== units),
  };
}
