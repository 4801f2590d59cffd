import { plainWords } from './column-words';
import { DecimalMark, decimalOf, isNoValue, parseNumber } from './cells';
import { Head, kindOf } from './head';
import { Unit, splitHeader, unitOf } from './units';

/** A column as its header and first readings show it. */
export interface TableColumn {
  readonly position: number;
  readonly header: string;
  /** The header without its unit, made comparable; and with it. */
  readonly words: string;
  readonly allWords: string;
  readonly unit: Unit | null;
  readonly cells: readonly string[];
  readonly decimal: DecimalMark;
  readonly mostly: 'number' | 'time' | 'text' | 'blank';
  readonly firstReading: string;
}

/** Rows that show what a column holds, and rows searched for a decimal mark. */
const SHOWN_ROWS = 20;
const SEARCHED_ROWS = 300;

function mostlyOf(cells: readonly string[]): TableColumn['mostly'] {
  const counts = { number: 0, time: 0, text: 0, blank: 0 };
  for (const cell of cells) counts[kindOf(cell)] += 1;
  const filled = cells.length - counts.blank;
  if (filled === 0) return 'blank';
  if (counts.number > filled / 2) return 'number';
  return counts.time > filled / 2 ? 'time' : 'text';
}

/** The decimal mark of a column by as few rows as tell it. */
function markOf(head: Head, position: number): DecimalMark | 'unclear' {
  const cells = (rows: number) => head.sample.slice(0, rows).map((row) => row.cells[position] ?? '');
  const mark = decimalOf(cells(SHOWN_ROWS));
  return mark === '.' || mark === ',' ? mark : decimalOf(cells(SEARCHED_ROWS));
}

/** Describes every column of the table from its head. */
export function describeColumns(head: Head): TableColumn[] {
  const sample = head.sample.slice(0, SHOWN_ROWS);
  const width = Math.max(head.names.length, ...sample.map((row) => row.cells.length));
  const marks = Array.from({ length: width }, (_, position) => markOf(head, position));
  // One program wrote all columns: where one column cannot tell the mark, the others do.
  const told = marks.includes(',') ? ',' : marks.includes('.') ? '.' : 'unclear';
  const columns = marks.map((own, position): TableColumn => {
    const cells = sample.map((row) => row.cells[position] ?? '');
    const header = head.names[position] ?? '';
    const parts = splitHeader(header);
    const unit = unitOf(head.units[position] ?? '') ?? parts.unit;
    let mark: DecimalMark | 'unclear' = own === 'unclear' ? told : own;
    // 45,125 °C with a thousands comma would be hotter than any sensor, and 1,2 rpm is no fan.
    if (mark === 'unclear' && unit?.quantity === 'temperature') mark = ',';
    if (mark === 'unclear' && unit?.quantity === 'rotation') mark = '.';
    return {
      position,
      header,
      words: plainWords(parts.words),
      allWords: plainWords(header),
      unit,
      cells,
      decimal: mark === 'unclear' ? 'either' : mark,
      mostly: mostlyOf(cells),
      firstReading: cells.find((cell) => !isNoValue(cell))?.trim() ?? '',
    };
  });
  // The last column is an artefact of a delimiter at the line's end when nothing names or fills it.
  while (
    columns.length > 0 &&
    columns[columns.length - 1].header === '' &&
    columns[columns.length - 1].mostly === 'blank'
  ) {
    columns.pop();
  }
  return columns;
}

/**
 * How many columns the header names and the rows fill, when the two differ: names and readings may then be shifted
 * against each other. Null when they agree, or when there is no header.
 */
export function headerMismatch(head: Head): { readonly names: number; readonly cells: number } | null {
  const trimmed = (cells: readonly string[]) => {
    let end = cells.length;
    while (end > 0 && cells[end - 1].trim() === '') end -= 1;
    return end;
  };
  const names = trimmed(head.names);
  if (names === 0) return null;
  const widths = head.sample.slice(0, SHOWN_ROWS).map((row) => row.cells.length);
  const filled = head.sample.slice(0, SHOWN_ROWS).map((row) => trimmed(row.cells));
  const agreeing = widths.filter((width, i) => filled[i] <= names && width >= names).length;
  if (agreeing >= widths.length / 2) return null;
  const usual = [...filled].sort((a, b) => a - b)[Math.floor(filled.length / 2)];
  return usual === names ? null : { names, cells: usual };
}

/** The sample's numbers of a column; NaN where a cell has none. */
export const sampleNumbers = (column: TableColumn): number[] =>
  column.cells.map((cell) => parseNumber(cell, column.decimal));
