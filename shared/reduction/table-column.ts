import { DecimalMark, decimalOf, isNoValue, parseNumber } from './cells';
import { Head, kindOf } from './head';
import { Unit, splitHeader, unitOf } from './units';

/** A column as its header and first readings show it. */
export interface TableColumn {
  readonly position: number;
  readonly header: string;
  readonly words: string;
  readonly unit: Unit | null;
  readonly cells: readonly string[];
  readonly decimal: DecimalMark;
  /** Whether the decimal mark could not be told: all commas stand where a thousands comma would. */
  readonly decimalUnclear: boolean;
  readonly mostly: 'number' | 'time' | 'text' | 'blank';
  readonly firstReading: string;
}

const SAMPLE = 200;

function mostlyOf(cells: readonly string[]): TableColumn['mostly'] {
  const counts = { number: 0, time: 0, text: 0, blank: 0 };
  for (const cell of cells) counts[kindOf(cell)] += 1;
  const filled = cells.length - counts.blank;
  if (filled === 0) return 'blank';
  if (counts.number > filled / 2) return 'number';
  return counts.time > filled / 2 ? 'time' : 'text';
}

/** Describes every column of the table from its head. */
export function describeColumns(head: Head): TableColumn[] {
  const sample = head.sample.slice(0, SAMPLE);
  const width = Math.max(head.names.length, ...sample.slice(0, 20).map((row) => row.cells.length));
  const marks: (DecimalMark | 'unclear')[] = [];
  const columns: TableColumn[] = [];
  for (let position = 0; position < width; position += 1) {
    marks.push(decimalOf(sample.map((row) => row.cells[position] ?? '')));
  }
  // One program wrote all columns: where one column cannot tell the mark, the others do.
  const told = marks.includes(',') ? ',' : marks.includes('.') ? '.' : 'unclear';
  for (let position = 0; position < width; position += 1) {
    const cells = sample.map((row) => row.cells[position] ?? '');
    const header = head.names[position] ?? '';
    const parts = splitHeader(header);
    const unit = unitOf(head.units[position] ?? '') ?? parts.unit;
    let mark = marks[position] === 'unclear' ? told : marks[position];
    // 45,125 °C with a thousands comma would be hotter than any sensor: there the comma is the decimal mark.
    if (mark === 'unclear' && unit?.quantity === 'temperature') mark = ',';
    columns.push({
      position,
      header,
      words: parts.words,
      unit,
      cells,
      decimal: mark === 'unclear' ? 'either' : mark,
      decimalUnclear: mark === 'unclear',
      mostly: mostlyOf(cells),
      firstReading: cells.find((cell) => !isNoValue(cell))?.trim() ?? '',
    });
  }
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

/** The sample's numbers of a column; NaN where a cell has none. */
export const sampleNumbers = (column: TableColumn): number[] =>
  column.cells.map((cell) => parseNumber(cell, column.decimal));
