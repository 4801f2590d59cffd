import {
  ColumnMap,
  FoundColumn,
  LogProblem,
  RunSummary,
  TraceSketch,
} from '../../../shared/contracts/run-summary';

/** What a person chose about a log beyond what was recognised. */
export interface LogChoices {
  readonly columnMap: ColumnMap | null;
  /** °C, for a log without an ambient column. */
  readonly fixedAmbient: number | null;
  readonly window: { readonly from: number; readonly to: number; readonly reason: string } | null;
  readonly nominalWatts: number | null;
}

/** To the worker. */
export type LogRequest =
  | { readonly kind: 'read'; readonly id: number; readonly file: File; readonly choices: LogChoices }
  /** The same columns, another window or ambient: no need to read the file again. */
  | { readonly kind: 'reduce'; readonly id: number; readonly choices: LogChoices }
  | { readonly kind: 'forget'; readonly id: number };

/** A log as read and reduced. */
export interface LogReadout {
  readonly columns: readonly FoundColumn[];
  readonly columnMap: ColumnMap | null;
  readonly summary: RunSummary | null;
  readonly sketch: TraceSketch;
  readonly problems: readonly LogProblem[];
  /** Length of the log, s; 0 when it could not be read. */
  readonly seconds: number;
}

/** From the worker. */
export type LogReply =
  | { readonly kind: 'progress'; readonly id: number; readonly share: number }
  | { readonly kind: 'read'; readonly id: number; readonly digest: string; readonly readout: LogReadout }
  | { readonly kind: 'reduced'; readonly id: number; readonly readout: LogReadout }
  | { readonly kind: 'failed'; readonly id: number; readonly text: string };
