import { LogProblem } from '../contracts/run-summary';
import { HeadFault } from './head';
import { TableColumn } from './table-column';
import { count, quoted } from './words';

const FAULT_TEXTS: Readonly<Record<HeadFault['fault'], (cells: number) => string>> = {
  empty: () => 'The file is empty. Check that the logger had finished writing it, then export it again.',
  'one column': () =>
    'No comma, semicolon or tab separates columns. A log needs at least a time and a heat-source column; export it as CSV.',
  'no readings': () =>
    'No rows of readings were found. Expected a header such as “time_s, plate_c, ambient_c, watts” and below it one row of numbers for each moment.',
  'one row': () =>
    'Only one row of readings was found. A run needs at least 10 minutes of readings; if this row holds means already taken, bring in the log they come from.',
  'quote left open': () =>
    'A quote mark opens in this row and is never closed, so the rows after it run together. Close or remove it, or export the log again.',
  'comma twice': () =>
    'Commas both separate the columns and mark the decimals, so the cells cannot be told apart. Export the log with semicolons or tabs between columns, or with decimal points.',
  'rows in quotes': () =>
    'Each row stands in quotes as a whole, so it reads as one cell. The table was probably pasted into one column of a spreadsheet; export it from the logger again, or take the outer quotes away.',
  'too many columns': (cells) =>
    `${count(cells, 'column')} in one row; a log may have up to 1,000. Export fewer channels, or check that rows end in line breaks.`,
};

/** Makes the problems of one file, so that each says where it lies. */
export class Problems {
  readonly list: LogProblem[] = [];

  constructor(readonly file: string) {}

  add(code: string, text: string, row: number | null = null, column: string | null = null): void {
    this.list.push({ code, file: this.file, row, column, text });
  }

  /** A file that is not text at all. */
  notText(what: string, archive: boolean): void {
    this.add(
      'not-text',
      archive
        ? `This is ${what}, not a text log. Open it and export the log's table as CSV, then drop that file.`
        : `This is ${what}, not a text log a person could read. Export the log as CSV text in UTF-8.`,
    );
  }

  /** A file whose head shows no table. */
  noTable({ fault, row, cells }: HeadFault): void {
    this.add(fault.replaceAll(' ', '-'), FAULT_TEXTS[fault](cells), row);
  }

  headerMismatch(names: number, cells: number, row: number | null): void {
    this.add(
      'header-mismatch',
      `The header names ${count(names, 'column')}, but the rows have ${count(cells, 'cell')}, so names and readings may be shifted against each other. Mend the header, or choose the columns by hand.`,
      row,
    );
  }

  longLine(row: number, length: number): void {
    this.add(
      'line-too-long',
      `A line runs on for more than ${count(length, 'character')}. Expected one line for each moment: a quote mark may be left open, or line breaks are missing. Export the log again.`,
      row,
    );
  }
}

/** Names of columns for sentences: quoted; by number too where a name is repeated, by number alone where there is none. */
export function columnNames(columns: readonly TableColumn[]): (column: TableColumn) => string {
  const uses = new Map<string, number>();
  for (const { header } of columns) uses.set(header, (uses.get(header) ?? 0) + 1);
  return ({ header, position }) => {
    if (header === '') return `column ${position + 1}`;
    return (uses.get(header) ?? 0) > 1 ? `column ${position + 1} (${quoted(header)})` : quoted(header);
  };
}

/** A column's header as a problem's `column` field gives it; its number where it has none. */
export const columnHeader = ({ header, position }: TableColumn): string =>
  header === '' ? `column ${position + 1}` : header;
