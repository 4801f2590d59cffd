import { setImmediate as turn } from 'node:timers/promises';
import { reduceRun, startReading } from '../../shared/reduction';
import type { ColumnMap, FoundColumn, LogProblem, RunSummary, TraceSketch } from '../../shared/contracts';
import { storable } from '../db/storable';
import type { HandWindow } from './run-entity';

/** What was chosen about a log when it was brought in; with the bytes, all that its summary depends on. */
export interface LogChoices {
  readonly columnMap: ColumnMap | null;
  readonly fixedAmbient: number | null;
  readonly window: HandWindow | null;
  readonly nominalWatts: number | null;
}

export interface ReducedLog {
  readonly columns: FoundColumn[];
  readonly columnMap: ColumnMap;
  readonly summary: RunSummary;
  readonly sketch: TraceSketch;
}

/**
 * Raw bytes to run summary, as `shared/reduction` does it, in steps: others are served between the chunks of a
 * long log.
 * @returns the summary in the form in which it is stored, or why there is none
 */
export async function reduceLog(
  fileName: string,
  bytes: AsyncIterable<Uint8Array>,
  choices: LogChoices,
): Promise<{ reduced: ReducedLog } | { reduced: null; problems: LogProblem[] }> {
  const reading = startReading(fileName, { columnMap: choices.columnMap });
  for await (const chunk of bytes) {
    reading.write(chunk);
    await turn();
  }
  const { log, problems } = reading.end();
  if (!log) return { reduced: null, problems };
  await turn();
  const { summary, sketch, problems: more } = reduceRun(log, choices);
  if (!summary) return { reduced: null, problems: [...problems, ...more] };
  const { columns, columnMap } = log;
  return { reduced: storable({ columns: [...columns], columnMap, summary, sketch }) };
}
