import { TIME, wordScore } from './column-words';
import { parseDate } from './calendar';
import { parseClock, parseStamp } from './clock';
import { TableColumn, sampleNumbers } from './table-column';
import { TimeSource } from './time-source';

/** The time of a log with the words that say why; `unsure` asks for a second look once the whole log is read. */
export interface FoundTime {
  readonly source: TimeSource;
  readonly reason: string;
  readonly unsure: boolean;
}

const isShare = (column: TableColumn, test: (text: string) => boolean): boolean => {
  const filled = column.cells.filter((cell) => cell.trim() !== '');
  return filled.length > 0 && filled.filter((cell) => test(cell.trim())).length > 0.8 * filled.length;
};

export const isStampColumn = (column: TableColumn): boolean =>
  column.mostly === 'time' && isShare(column, (text) => parseStamp(text) !== null);
const isClockColumn = (column: TableColumn): boolean =>
  column.mostly === 'time' && isShare(column, (text) => parseClock(text) !== null);
const isDateColumn = (column: TableColumn): boolean => isShare(column, (text) => parseDate(text) !== null);

/** Whether numbers go one way, as time does: up, or down where the newest comes first. One turn is a restart. */
function goesOneWay(values: readonly number[]): boolean {
  const numbers = values.filter((value) => Number.isFinite(value));
  let falls = 0;
  let rises = 0;
  for (let i = 1; i < numbers.length; i += 1) {
    if (numbers[i] < numbers[i - 1]) falls += 1;
    else if (numbers[i] > numbers[i - 1]) rises += 1;
  }
  return falls + rises > 0 && Math.min(falls, rises) <= 1;
}

const base = { scale: 1, shift: 0, epoch: false, minutesFirst: false, datePosition: null } as const;

/** Reads a numeric column as time: by its unit, by its size, or as seconds for want of either. */
function numericTime(column: TableColumn): FoundTime {
  const source = { ...base, position: column.position, kind: 'number' as const, decimal: column.decimal };
  const named = column.header === '' ? 'It rises steadily' : `Header “${column.header}”`;
  if (column.unit?.quantity === 'time') {
    return {
      source: { ...source, scale: column.unit.scale },
      reason: `${named}; unit ${column.unit.name}.`,
      unsure: false,
    };
  }
  const words = column.allWords;
  for (const [pattern, scale, name] of [
    [/milli/, 0.001, 'ms'],
    [/\bsec|second/, 1, 's'],
    [/\bmin(ute)?s?\b/, 60, 'min'],
    [/\bhours?\b/, 3600, 'h'],
  ] as const) {
    if (pattern.test(words))
      return { source: { ...source, scale }, reason: `${named}; unit ${name}.`, unsure: false };
  }
  const values = sampleNumbers(column).filter((value) => Number.isFinite(value));
  const first = values[0] ?? 0;
  if (first > 1e9 && first < 4e9) {
    return { source: { ...source, epoch: true }, reason: `${named}; seconds since 1970.`, unsure: false };
  }
  if (first > 1e12 && first < 4e12) {
    return {
      source: { ...source, scale: 0.001, epoch: true },
      reason: `${named}; milliseconds since 1970.`,
      unsure: false,
    };
  }
  if (first > 30000 && first < 70000 && values[values.length - 1] - first < 1 && first % 1 !== 0) {
    // Day 25569 of spreadsheets that count from 1899-12-30 is 1970-01-01.
    return {
      source: { ...source, scale: 86400, shift: -25569 * 86400, epoch: true },
      reason: `${named}; days as a spreadsheet counts them.`,
      unsure: false,
    };
  }
  return { source, reason: `${named}; no unit is named, read as seconds.`, unsure: true };
}

function clockTime(column: TableColumn, columns: readonly TableColumn[], kind: 'clock' | 'stamp'): FoundTime {
  const readings = column.cells
    .map((cell) => (kind === 'stamp' ? (parseStamp(cell.trim())?.clock ?? null) : parseClock(cell.trim())))
    .filter((clock) => clock !== null);
  const twoParts = readings.length > 0 && readings.every((clock) => clock.parts === 2);
  const unitName = column.unit?.name ?? '';
  // `00:00, 00:01, …` may be a stopwatch in minutes and seconds or a clock in hours and minutes. Past 24:00 it is no clock,
  // beside a date it is one; else the length of the whole log has to tell.
  const minutesFirst =
    kind === 'clock' &&
    twoParts &&
    (unitName === 'mm:ss' || readings.some((clock) => clock.seconds >= 24 * 3600));
  const date =
    kind === 'clock' && !minutesFirst
      ? columns.find((other) => other !== column && isDateColumn(other))
      : undefined;
  const unsure = kind === 'clock' && twoParts && !minutesFirst && unitName !== 'hh:mm' && !date;
  const named = column.header === '' ? 'Cells' : `Header “${column.header}”`;
  const holds = kind === 'stamp' ? 'a date and a clock' : minutesFirst ? 'minutes and seconds' : 'a clock';
  return {
    source: {
      ...base,
      position: column.position,
      kind,
      minutesFirst,
      datePosition: date?.position ?? null,
      decimal: '.',
    },
    reason: `${named}; its cells hold ${holds}${date ? `, the date is in ${date.header === '' ? `column ${date.position + 1}` : `“${date.header}”`}` : ''}.`,
    unsure,
  };
}

/** The time in a column a person or a bench has chosen. Chosen after a doubt, `12:30` is minutes and seconds. */
export function timeIn(column: TableColumn, columns: readonly TableColumn[]): FoundTime | null {
  if (isStampColumn(column)) return clockTime(column, columns, 'stamp');
  if (isClockColumn(column)) {
    const found = clockTime(column, columns, 'clock');
    if (!found.unsure) return found;
    return {
      source: { ...found.source, minutesFirst: true },
      reason: 'Chosen; its cells hold minutes and seconds.',
      unsure: false,
    };
  }
  return column.mostly === 'number' ? { ...numericTime(column), unsure: false } : null;
}

/** Finds the column of time: elapsed numbers first, for their finer steps, then date and clock, then a clock. */
export function findTime(columns: readonly TableColumn[]): FoundTime | null {
  const numeric = columns
    .filter((column) => column.mostly === 'number' && column.unit?.quantity !== 'temperature')
    .map((column) => ({
      column,
      score:
        Math.max(wordScore(column.allWords, TIME), wordScore(column.words, TIME)) +
        (column.unit?.quantity === 'time' ? 3 : 0) -
        (column.unit && column.unit.quantity !== 'time' ? 20 : 0),
    }))
    .filter(({ column, score }) => score >= 3 && goesOneWay(sampleNumbers(column)))
    .sort((a, b) => b.score - a.score || a.column.position - b.column.position);
  if (numeric.length > 0) return numericTime(numeric[0].column);
  const stamp = columns.find(isStampColumn);
  if (stamp) return clockTime(stamp, columns, 'stamp');
  const clock = columns.find(isClockColumn);
  return clock ? clockTime(clock, columns, 'clock') : null;
}
