import { ColumnMap, FoundColumn, LogProblem, RunFinding } from '../contracts/run-summary';

/** How a file was written, as told by its own bytes. */
export interface Dialect {
  readonly encoding: string;
  readonly delimiter: string;
  /** Mark before the fraction; `either` when no number in the log has one. */
  readonly decimal: '.' | ',' | 'either';
  /** Row of the column names, from 1; null when the log has none. */
  readonly headerRow: number | null;
  readonly firstDataRow: number;
}

/** A log read into columns of numbers. Only the columns somebody needs are kept. */
export interface Log {
  readonly fileName: string;
  readonly columns: readonly FoundColumn[];
  /** The columns as read: recognised, or as given to `startReading`. */
  readonly columnMap: ColumnMap;
  readonly dialect: Dialect;
  /** Seconds since the first reading, never falling. */
  readonly seconds: Float64Array;
  /** Physical row of each reading, from 1 with header and title lines counted. */
  readonly rows: Uint32Array;
  /** Kept readings by column position, in °C, W or rpm; NaN where the log has no value. */
  readonly kept: ReadonlyMap<number, Float64Array>;
  /** Start as the log tells it, ISO 8601 without offset; null when it has only seconds or the date is unclear. */
  readonly startedAt: string | null;
  /** What reading noticed: skipped readings, rows left out, a clock set back. */
  readonly findings: readonly RunFinding[];
}

/** `log` is null only when the file cannot be read at all; a problem beside a log asks for a choice or tells of one not made. */
export interface ReadLog {
  readonly log: Log | null;
  readonly problems: LogProblem[];
}

/** Choices a person or a bench has made about a log. */
export interface ReadingOptions {
  /** Columns by position; null or left out: as recognised. */
  readonly columnMap?: ColumnMap | null;
  /** Order of day and month in dates such as 03/04/2026, when the log itself cannot tell. */
  readonly dateOrder?: 'day first' | 'month first';
}

/** A log being read: bytes in by chunks of any size, then `end`. */
export interface LogReading {
  write(bytes: Uint8Array): void;
  end(): ReadLog;
}
