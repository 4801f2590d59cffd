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
  /** Names of the columns, blanks trimmed; empty when the log has no header. */
  readonly names: readonly string[];
  /** Unit cells of the row below the header, or empty. */
  readonly units: readonly string[];
  readonly firstDataRow: number;
  /** Rows of readings seen so far, in order. */
  readonly sample: readonly Row[];
  /** Cells that the rows of readings usually have. */
  readonly width: number;
  /** Lines above the header, their cells joined by spaces. */
  readonly titles: readonly string[];
}

/** Why there is no table to be found, and the row that shows it. */
export interface HeadFault {
  readonly fault:
    | 'empty'
    | 'no readings'
    | 'one row'
    | 'one column'
    | 'quote left open'
    | 'comma twice'
    | 'rows in quotes'
    | 'too many columns';
  readonly row: number | null;
  readonly cells: number;
}

export type CellKind = 'blank' | 'number' | 'time' | 'text';

/** What a cell looks like by itself. */
export function kindOf(cell: string): CellKind {
  const text = cell.trim();
  if (!Number.isNaN(parseNumber(text, '.')) || !Number.isNaN(parseNumber(text, ','))) return 'number';
  if (isNoValue(text)) return 'blank';
  if (parseClock(text) || parseDate(text) || parseStamp(text)) return 'time';
  return 'text';
}

const MOST_COLUMNS = 1000;
const DELIMITERS = [',', ';', '\t', '|'];

interface SplitText {
  readonly rows: Row[];
  /** Row in which a quote mark opens that is never closed, or null. */
  readonly openQuote: number | null;
}

/** Splits text into rows by Papa Parse. Quoted cells may hold line ends, so the physical rows are counted with them. */
function splitRows(text: string, delimiter: string, newline: '\n' | '\r'): SplitText {
  const parsed = Papa.parse<string[]>(text, { delimiter, newline });
  const rows: Row[] = [];
  let number = 1;
  for (const cells of parsed.data) {
    rows.push({ number, cells });
    number += 1;
    for (const cell of cells) if (cell.includes(newline)) number += cell.split(newline).length - 1;
  }
  const open = parsed.errors.find((error) => error.code === 'MissingQuotes');
  return { rows, openQuote: open ? (rows[open.row ?? 0]?.number ?? null) : null };
}

const filled = (row: Row): number => row.cells.reduce((n, cell) => n + (cell.trim() === '' ? 0 : 1), 0);

/** Width without the empty cells that a delimiter at the line's end leaves. */
function widthOf(row: Row): number {
  let end = row.cells.length;
  while (end > 0 && row.cells[end - 1].trim() === '') end -= 1;
  return end;
}

/** Some cells of a row: all of a narrow one, the first and then every so-many-th of a wide one. */
function someCells(row: Row): readonly string[] {
  if (row.cells.length <= 40) return row.cells;
  const stride = Math.ceil(row.cells.length / 24);
  return row.cells.filter((_, i) => i < 12 || i % stride === 0);
}

function looksLikeReadings(row: Row): boolean {
  let readable = 0;
  let texts = 0;
  for (const cell of someCells(row)) {
    const kind = kindOf(cell);
    if (kind === 'number' || kind === 'time') readable += 1;
    else if (kind === 'text') texts += 1;
  }
  return readable >= 2 && readable > 1.5 * texts;
}

/** Whether a row can be a header: at least two cells, and words in most of those filled. */
function looksLikeHeader(row: Row): boolean {
  const texts = someCells(row).filter((cell) => cell.trim() !== '');
  return texts.length >= 2 && texts.filter((cell) => kindOf(cell) === 'text').length > texts.length / 2;
}

/** How well a delimiter fits: the share of late rows that have one width and read as readings. */
function fitOf(rows: readonly Row[]): { share: number; width: number } {
  const late = rows.filter((row) => filled(row) > 0).slice(-24);
  const counts = new Map<number, number>();
  for (const row of late) {
    if (row.cells.length > 1 && looksLikeReadings(row)) {
      counts.set(row.cells.length, (counts.get(row.cells.length) ?? 0) + 1);
    }
  }
  let best = { share: 0, width: 1 };
  for (const [width, n] of counts) if (n / late.length > best.share) best = { share: n / late.length, width };
  return best;
}

/** The first lines, enough to compare delimiters by. */
function firstLines(text: string, newline: string): string {
  let end = 0;
  for (let lines = 0; lines < 60 && (lines < 12 || end < 20000); lines += 1) {
    const next = text.indexOf(newline, end);
    if (next === -1) return text;
    end = next + 1;
  }
  return text.slice(0, end);
}

/** The delimiter that makes the most even table of readings; a tie is won by the one that makes more columns. */
function chooseDelimiter(text: string, newline: '\n' | '\r'): string | null {
  const short = firstLines(text, newline);
  let best: { delimiter: string; score: number } | null = null;
  for (const delimiter of DELIMITERS) {
    if (!short.includes(delimiter)) continue;
    const fit = fitOf(splitRows(short, delimiter, newline).rows);
    const score = fit.share + Math.min(fit.width, MOST_COLUMNS) * 1e-6;
    if (fit.share > 0 && (!best || score > best.score)) best = { delimiter, score };
  }
  return best?.delimiter ?? null;
}

/** Whether a row names units: most of its filled cells are units, and none reads as a number. */
function isUnitsRow(row: Row): boolean {
  const cells = row.cells.filter((cell) => cell.trim() !== '');
  // “Date”, “Time” and “Watts” are as likely to be names.
  const units = cells.filter(
    (cell) =>
      unitOf(cell) !== null && !/^(date|time|text|count|watts?|seconds?|minutes?)$/i.test(cell.trim()),
  ).length;
  return cells.length > 0 && units >= 0.6 * cells.length && !cells.some((cell) => kindOf(cell) === 'number');
}

const cleanName = (cell: string): string =>
  cell
    .replace(/^[\ufeff#\s]+/, '')
    .replace(/\s+/g, ' ')
    .trim();

/** Where commas both part columns and mark fractions, rows of whole numbers are shorter, and all are longer than the header. */
function commaTwice(delimiter: string, header: Row | null, rows: readonly Row[]): boolean {
  if (delimiter !== ',' || !header) return false;
  const names = widthOf(header);
  const widths = rows.slice(0, 40).map(widthOf);
  const wider = widths.filter((width) => width > names).length;
  const whole = rows.slice(0, 40).every((row) => row.cells.every((cell) => !cell.includes('.')));
  return whole && wider > 0.8 * widths.length && Math.max(...widths) <= 2 * names;
}

/** Whether whole rows stand in quotes, as when a table was pasted into one column of a spreadsheet. */
function rowsInQuotes(text: string, newline: string): boolean {
  const lines = text.split(newline, 20).map((line) => line.trim());
  const whole = lines.filter((line) => /^"[^"]*[,;\t][^"]*"$/.test(line));
  return whole.length >= 3 && whole.length > lines.length / 2;
}

/**
 * Finds delimiter, header, units and first readings.
 * @param text the log's first lines, complete but perhaps for the last one where the file ends there
 */
export function findHead(text: string): Head | HeadFault {
  const fault = (name: HeadFault['fault'], row: number | null = null, cells = 0): HeadFault => ({
    fault: name,
    row,
    cells,
  });
  if (text.trim() === '') return fault('empty');
  const newline = text.includes('\n') || !text.includes('\r') ? '\n' : '\r';
  const lineEnd = text.indexOf(newline);
  const firstLine = lineEnd === -1 ? text : text.slice(0, lineEnd);
  for (const delimiter of DELIMITERS) {
    const cells = firstLine.split(delimiter).length;
    if (cells > MOST_COLUMNS) return fault('too many columns', 1, cells);
  }
  const delimiter = chooseDelimiter(text, newline);
  if (delimiter === null) {
    const used = DELIMITERS.filter((candidate) => text.includes(candidate));
    const open = splitRows(firstLines(text, newline), used[0] ?? ',', newline).openQuote;
    if (open !== null) return fault('quote left open', open);
    if (rowsInQuotes(text, newline)) return fault('rows in quotes', 1);
    return fault(used.length > 0 ? 'no readings' : 'one column');
  }
  const { rows, openQuote } = splitRows(text, delimiter, newline);
  const { width } = fitOf(rows);
  const fits = (row: Row) =>
    Math.abs(row.cells.length - width) <= 1 && widthOf(row) > 1 && looksLikeReadings(row);
  const first = rows.findIndex(fits);
  const second = rows.findIndex((row, i) => i > first && fits(row));
  if (first === -1) return openQuote === null ? fault('no readings') : fault('quote left open', openQuote);
  if (second === -1)
    return openQuote === null ? fault('one row', rows[first].number) : fault('quote left open', openQuote);
  // Sensors that warm up leave the first rows half blank: the header is the nearest row of words above.
  const above = rows.slice(0, first).filter((row) => filled(row) > 0);
  let headerAt = above.length - 1;
  while (headerAt >= 0 && (isUnitsRow(above[headerAt]) ? headerAt > 0 : !looksLikeHeader(above[headerAt])))
    headerAt -= 1;
  let header = headerAt >= 0 ? above[headerAt] : null;
  // A title line is narrower than the table.
  if (header && filled(header) < Math.min(width, widthOf(rows[first])) / 3) header = null;
  const below = header ? above[headerAt + 1] : undefined;
  const units = below && isUnitsRow(below) ? below : null;
  const firstDataRow = header ? (units ?? header).number + 1 : rows[first].number;
  const sample = rows.filter((row) => row.number >= firstDataRow && filled(row) > 0);
  if (commaTwice(delimiter, header, sample)) return fault('comma twice', sample[0].number);
  if (width > MOST_COLUMNS) return fault('too many columns', rows[first].number, width);
  return {
    newline,
    delimiter,
    headerRow: header?.number ?? null,
    names: header ? header.cells.map(cleanName) : [],
    units: units ? units.cells.map((cell) => cell.trim()) : [],
    firstDataRow,
    sample,
    width,
    titles: above.filter((row) => row !== header && row !== units).map((row) => row.cells.join(' ').trim()),
  };
}
