import { ColumnMap, ColumnRole, FoundColumn } from '../contracts/run-summary';
import { settleCandidates } from './behaviour';
import { isoFromSeconds } from './calendar';
import { Collector } from './collector';
import { FoundColumns, ROLE_KEYS, ROLE_NAMES } from './find-columns';
import { FoundTime } from './find-time';
import { Head } from './head';
import { Log, ReadLog, ReadingOptions } from './log';
import { Problems, columnHeader } from './problems';
import { readingFindings } from './reading-findings';
import { TableColumn } from './table-column';
import { TimeAxis, settleAxis } from './time-axis';
import { startInTitles } from './title-start';
import { SettledTimes } from './time-source';
import { asStopwatch, doubtOf } from './time-doubts';
import { count, fixed, quoted } from './words';

/** What reading a log has found out before its end. */
export interface ReadTable {
  readonly head: Head;
  readonly columns: readonly TableColumn[];
  readonly found: FoundColumns;
  readonly encoding: string;
  readonly problems: Problems;
  readonly options: ReadingOptions;
}

const NO_COLUMNS: ColumnMap = { time: null, heatSource: null, ambient: null, watts: null, fanSpeed: null };

function roleAt(map: ColumnMap, datePosition: number | null, position: number): FoundColumn['role'] {
  if (position === datePosition) return 'time';
  const found = Object.entries(ROLE_KEYS).find(([, key]) => map[key] === position);
  return found ? (found[0] as FoundColumn['role']) : null;
}

/** The log's description without its readings. */
function describe(
  table: ReadTable,
  map: ColumnMap,
  reasons: ReadonlyMap<number, string>,
): Omit<Log, 'seconds' | 'rows' | 'kept'> {
  const { head, columns, found, encoding, problems } = table;
  const marks = columns.map((column) => column.decimal);
  return {
    fileName: problems.file,
    columns: columns.map((column) => ({
      position: column.position,
      header: columnHeader(column),
      unit: column.unit?.name ?? null,
      role: roleAt(map, found.time?.source.datePosition ?? null, column.position),
      reason: reasons.get(column.position) ?? 'Not needed.',
      firstReading: column.firstReading,
    })),
    columnMap: map,
    dialect: {
      encoding,
      delimiter: head.delimiter,
      decimal: marks.includes(',') ? ',' : marks.includes('.') ? '.' : 'either',
      headerRow: head.headerRow,
      firstDataRow: head.firstDataRow,
    },
    startedAt: null,
    findings: [],
  };
}

/** A log whose columns can be shown and chosen, but whose readings cannot be used yet. */
const withoutReadings = (table: ReadTable): ReadLog => ({
  log: {
    ...describe(table, NO_COLUMNS, new Map()),
    seconds: new Float64Array(0),
    rows: new Uint32Array(0),
    kept: new Map(),
  },
  problems: table.problems.list,
});

/** Says what is wrong with the times; null when they cannot be used. */
function axisOf(
  table: ReadTable,
  time: FoundTime,
  rows: Float64Array,
  settled: SettledTimes,
): TimeAxis | null {
  const axis = settleAxis(asStopwatch(time, settled.seconds), rows, time.source.kind);
  if (!('fault' in axis)) return axis;
  const still = axis.fault === 'standing still';
  table.problems.add(
    still ? 'time-stands-still' : 'time-out-of-order',
    still
      ? 'The time is the same in every row. Expected times that rise from row to row; choose another column for time.'
      : `The time falls back at ${fixed(axis.falls, 0)} places, first in this row. Expected times that rise from row to row; sort the log by time, or choose another column.`,
    rows[axis.at],
    columnHeader(table.columns[time.source.position]),
  );
  return null;
}

function tellNoTime({ head, columns, options, problems }: ReadTable): void {
  const asked = options.columnMap?.time ?? null;
  const chosen = asked === null ? undefined : columns[asked];
  if (chosen) {
    problems.add(
      'no-time',
      `This column was chosen for time, but its cells are no times; the first is ${quoted(chosen.firstReading)}. Expected seconds since the start, a clock, or a date and clock.`,
      head.firstDataRow,
      columnHeader(chosen),
    );
    return;
  }
  problems.add(
    'no-time',
    'No column holds the time. Expected seconds since the start, a clock, or a date and clock; choose the column, or export the log with one.',
    head.headerRow,
  );
}

/** Takes out columns that hold hardly a reading, and says what they hold instead. */
function withoutEmptyColumns(table: ReadTable, collector: Collector, map: ColumnMap): ColumnMap {
  const usable = { ...map };
  for (const [role, key] of Object.entries(ROLE_KEYS)) {
    const kept = collector.kept.find(({ column }) => column.position === map[key]);
    if (role === 'time' || !kept) continue;
    const total = collector.readings;
    const empty = kept.blankCount + kept.badCount === total;
    if (!empty && kept.badCount <= total / 2) continue;
    const example = kept.bad[0] ?? kept.firstBlank;
    const holds =
      example.text.trim() === '' ? 'its cells are empty' : `row ${example.row} holds ${quoted(example.text)}`;
    table.problems.add(
      `${role.replace(' ', '-')}-unreadable`,
      `Expected numbers for the ${ROLE_NAMES[role as ColumnRole]}, but ${holds}${empty ? ', and no row has a number' : `, and ${count(kept.badCount, 'row')} of ${count(total, 'row')} are no numbers`}. Choose another column, or check the sensor.`,
      example.row,
      columnHeader(kept.column),
    );
    usable[key] = null;
  }
  return usable;
}

/** Start as the log tells it: by its own dates, else by a title line that dates the zero of its seconds. */
function startOf(table: ReadTable, time: FoundTime, settled: SettledTimes, axis: TimeAxis): string | null {
  if (settled.dated) return isoFromSeconds(axis.start);
  const wholeLog = axis.from === 0 && !axis.reversed;
  const titled = time.source.kind === 'number' && wholeLog ? startInTitles(table.head.titles) : null;
  return titled === null ? null : isoFromSeconds(titled + axis.start);
}

function tellUnclearDate(table: ReadTable, time: FoundTime, settled: SettledTimes): void {
  if (!settled.dateUnclear) return;
  const { first, second, year } = settled.dateUnclear;
  table.problems.add(
    'date-order-unclear',
    `The date ${first}/${second}/${year} reads two ways, and the log does not tell which number is the day. The times inside the run are the same either way; only the day it started on is left open.`,
    table.head.firstDataRow,
    columnHeader(table.columns[time.source.datePosition ?? time.source.position]),
  );
}

/** Turns what was collected into a log: order of time, parts of the columns, findings, problems. */
export function finishLog(table: ReadTable, collector: Collector | null): ReadLog {
  const { head, columns, found, problems, options } = table;
  if (!found.time || !collector) {
    if (problems.list.length === 0) tellNoTime(table);
    return withoutReadings(table);
  }
  const settled = collector.track.settle(options.dateOrder);
  if (settled.seconds.length < 2) {
    problems.noTable({
      fault: settled.seconds.length === 0 ? 'no readings' : 'one row',
      row: head.firstDataRow,
      cells: 0,
    });
    return { log: null, problems: problems.list };
  }
  const rowsTaken = collector.rows.release();
  const axis = axisOf(table, found.time, rowsTaken, settled);
  if (!axis) return withoutReadings(table);
  const timeColumn = columns[found.time.source.position];
  const pick = (values: Float64Array): Float64Array => {
    const used = values.subarray(axis.from, axis.to);
    return axis.reversed ? used.reverse() : used;
  };
  const kept = new Map(
    collector.kept.map((column) => [column.column.position, pick(column.values.release())]),
  );
  const { map, reasons } = settleCandidates(table, kept);
  reasons.set(timeColumn.position, found.time.reason);
  if (found.time.source.datePosition !== null)
    reasons.set(found.time.source.datePosition, 'The date of the time.');
  const doubt = doubtOf(found.time, axis.seconds);
  if (doubt) problems.add('time-unit-unclear', doubt, head.headerRow, columnHeader(timeColumn));
  tellUnclearDate(table, found.time, settled);
  const rows = pick(rowsTaken);
  const fullMap = withoutEmptyColumns(table, collector, { ...map, time: doubt ? null : timeColumn.position });
  return {
    log: {
      ...describe(table, fullMap, reasons),
      seconds: axis.seconds,
      rows: Uint32Array.from(rows),
      kept,
      startedAt: startOf(table, found.time, settled, axis),
      findings: [...axis.findings, ...readingFindings(table, collector, fullMap, axis, rows)],
    },
    problems: problems.list,
  };
}
