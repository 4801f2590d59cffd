import { LogProblem } from '../contracts/run-summary';
import { count, quoted } from './words';
import { HeadFault } from './head';

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
  noTable(fault: HeadFault, delimiterRow: number | null): void {
    const texts: Record<HeadFault, string> = {
      empty: 'The file is empty. Check that the logger had finished writing it, then export it again.',
      'one column':
        'No comma, semicolon or tab separates columns. A log needs at least a time and a heat-source column; export it as CSV.',
      'no readings':
        'No rows of readings were found. Expected a header such as “time_s, plate_c, ambient_c, watts” and below it one row of numbers for each moment.',
      'one row':
        'Only one row of readings was found. A run needs at least 10 minutes of readings; if these are means already taken, bring in the log they come from.',
    };
    this.add(fault.replaceAll(' ', '-'), texts[fault], delimiterRow);
  }

  tooManyColumns(columns: number, row: number): void {
    this.add(
      'too-many-columns',
      `${count(columns, 'column')} in one row; a log may have up to 1,000. Export fewer channels, or check that rows end in line breaks.`,
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

/** A column by name, or by number where it has no name of its own. */
export const columnName = (header: string, position: number): string =>
  header === '' ? `column ${position + 1}` : quoted(header);
