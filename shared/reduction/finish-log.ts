import { ColumnMap, FoundColumn, RunFinding } from '../contracts/run-summary';
import { Collector } from './collector';
import { settleCandidates } from './behaviour';
import { FoundColumns, ROLE_KEYS } from './find-columns';
import { Head } from './head';
import { isoFromSeconds } from './calendar';
import { ReadLog, ReadingOptions } from './log';
import { Problems, columnName } from './problems';
import { readingFindings } from './reading-findings';
import { TableColumn } from './table-column';
import { settleAxis } from './time-axis';
import { fixed } from './words';

interface Context {
  readonly encoding: string;
  readonly problems: Problems;
  readonly options: ReadingOptions;
}

const NO_COLUMNS: ColumnMap = { time: null, heatSource: null, ambient: null, watts: null, fanSpeed: null };

function dialectOf(head: Head, columns: readonly TableColumn[], encoding: string) {
  const marks = columns.map((column) => column.decimal);
  return {
    encoding,
    delimiter: head.delimiter,
    decimal: marks.includes(',')
      ? (',' as const)
      : marks.includes('.')
        ? ('.' as const)
        : ('either' as const),
    headerRow: head.headerRow,
    firstDataRow: head.firstDataRow,
  };
}

/** Turns what was collected into a log: order of time, roles of the columns, findings, problems. */
export function finishLog(
  head: Head,
  columns: readonly TableColumn[],
  found: FoundColumns,
  collector: Collector | null,
  { encoding, problems, options }: Context,
): ReadLog {
  const dialect = dialectOf(head, columns, encoding);
  const shown = (map: ColumnMap, reasons: ReadonlyMap<number, string>): FoundColumn[] =>
    columns.map((column) => ({
      position: column.position,
      header: column.header,
      unit: column.unit?.name ?? null,
      role: roleAt(map, found, column.position),
      reason: reasons.get(column.position) ?? 'Not needed.',
      firstReading: column.firstReading,
    }));
  const bare = (map: ColumnMap, reasons: ReadonlyMap<number, string>): ReadLog => ({
    log: {
      fileName: problems.file,
      columns: shown(map, reasons),
      columnMap: map,
      dialect,
      seconds: new Float64Array(0),
      rows: new Uint32Array(0),
      kept: new Map(),
      startedAt: null,
      findings: [],
    },
    problems: problems.list,
  });
  if (!found.time || !collector) {
    problems.add(
      'no-time',
      'No column holds the time. Expected seconds since the start, a clock, or a date and clock; choose the column, or export the log with one.',
      head.headerRow,
    );
    return bare(NO_COLUMNS, new Map());
  }
  const timeColumn = columns[found.time.source.position];
  const settled = collector.track.settle(options.dateOrder);
  if (settled.seconds.length < 2) {
    problems.noTable('no readings', head.firstDataRow);
    return { log: null, problems: problems.list };
  }
  const axis = settleAxis(settled.seconds, collector.rows.view(), found.time.source.kind);
  if ('fault' in axis) {
    const row = collector.rows.view()[axis.at];
    problems.add(
      axis.fault === 'standing still' ? 'time-stands-still' : 'time-out-of-order',
      axis.fault === 'standing still'
        ? 'The time is the same in every row. Expected times that rise from row to row; choose another column for time.'
        : `The time falls back at ${fixed(axis.falls, 0)} places, first in this row. Expected times that rise from row to row; sort the log by time, or choose another column.`,
      row,
      columnName(timeColumn.header, timeColumn.position),
    );
    return bare({ ...NO_COLUMNS }, new Map());
  }
  const duration = axis.seconds[axis.seconds.length - 1];
  const pick = (values: Float64Array): Float64Array => {
    const used = values.slice(axis.from, axis.to);
    return axis.reversed ? used.reverse() : used;
  };
  const kept = new Map(collector.kept.map((column) => [column.column.position, pick(column.values.view())]));
  const { map, reasons } = settleCandidates(
    found,
    kept,
    problems,
    head.headerRow,
    (options.columnMap ?? null) !== null,
  );
  const reasonOfTime = new Map(reasons).set(timeColumn.position, found.time.reason);
  if (found.time.source.datePosition !== null)
    reasonOfTime.set(found.time.source.datePosition, 'The date of the time.');
  let time: number | null = timeColumn.position;
  if (found.time.unsure && (duration < 120 || duration > 7 * 86400)) {
    time = null;
    problems.add(
      'time-unit-unclear',
      `Read as seconds the log would last ${fixed(duration, 0)} s. Name the unit in the header, such as “time_min” or “time_ms”, or choose the column to have it read as seconds.`,
      head.headerRow,
      columnName(timeColumn.header, timeColumn.position),
    );
  }
  if (settled.dateUnclear) {
    const { first, second, year } = settled.dateUnclear;
    problems.add(
      'date-order-unclear',
      `The date ${first}/${second}/${year} reads two ways, and the log does not tell which number is the day. The times inside the run are the same either way; only the day it started on is left open.`,
      head.firstDataRow,
      columnName(timeColumn.header, timeColumn.position),
    );
  }
  const rows = pick(collector.rows.view());
  const fullMap = { ...map, time };
  const findings: RunFinding[] = [...axis.findings, ...readingFindings(collector, fullMap, axis, rows)];
  return {
    log: {
      fileName: problems.file,
      columns: shown(fullMap, reasonOfTime),
      columnMap: fullMap,
      dialect,
      seconds: axis.seconds,
      rows: Uint32Array.from(rows),
      kept,
      startedAt: settled.dated ? isoFromSeconds(axis.start) : null,
      findings,
    },
    problems: problems.list,
  };
}

function roleAt(map: ColumnMap, found: FoundColumns, position: number): FoundColumn['role'] {
  if (found.time && position === found.time.source.datePosition) return 'time';
  for (const [role, key] of Object.entries(ROLE_KEYS))
    if (map[key] === position) return role as FoundColumn['role'];
  return null;
}
