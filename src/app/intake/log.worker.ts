/// <reference lib="webworker" />
import { sha256 } from '@noble/hashes/sha2';
import { bytesToHex } from '@noble/hashes/utils';
import { Log, reduceRun, startReading } from '../../../shared/reduction';
import { LogProblem } from '../../../shared/contracts/run-summary';
import { LogChoices, LogReadout, LogReply, LogRequest } from './log-messages';

interface KeptLog {
  readonly log: Log | null;
  readonly problems: readonly LogProblem[];
}

/** Logs read here, so that a moved window needs no second reading. */
const kept = new Map<number, KeptLog>();

const reply = (message: LogReply): void => postMessage(message);

/** Progress is told in steps of this share, so that the page is not flooded. */
const PROGRESS_STEP = 0.1;

/** Reads piece by piece: the file never stands in memory whole, and its digest is taken on the way. */
async function read(id: number, file: File, choices: LogChoices): Promise<void> {
  const reading = startReading(file.name, { columnMap: choices.columnMap });
  const digest = sha256.create();
  const reader = file.stream().getReader();
  let done = 0;
  let told = 0;
  for (;;) {
    const piece = await reader.read();
    if (piece.done) break;
    digest.update(piece.value);
    reading.write(piece.value);
    done += piece.value.length;
    const share = done / file.size;
    if (share - told >= PROGRESS_STEP && share < 1) {
      told = share;
      reply({ kind: 'progress', id, share });
    }
  }
  kept.set(id, reading.end());
  reply({ kind: 'read', id, digest: bytesToHex(digest.digest()), readout: reduce(id, choices) });
}

function reduce(id: number, choices: LogChoices): LogReadout {
  const { log, problems } = kept.get(id) ?? { log: null, problems: [] };
  if (!log)
    return {
      columns: [],
      columnMap: null,
      summary: null,
      sketch: { seconds: [], rise: [], ambient: [] },
      problems,
      seconds: 0,
    };
  const reduced = reduceRun(log, { ...choices, columnMap: choices.columnMap ?? log.columnMap });
  return {
    columns: log.columns,
    columnMap: log.columnMap,
    summary: reduced.summary,
    sketch: reduced.sketch,
    problems: [...problems, ...reduced.problems],
    seconds: log.seconds.at(-1) ?? 0,
  };
}

addEventListener('message', ({ data }: MessageEvent<LogRequest>) => {
  const { id } = data;
  const failed = (error: unknown): void =>
    reply({ kind: 'failed', id, text: error instanceof Error ? error.message : String(error) });
  try {
    if (data.kind === 'read') read(id, data.file, data.choices).catch(failed);
    else if (data.kind === 'reduce') reply({ kind: 'reduced', id, readout: reduce(id, data.choices) });
    else kept.delete(id);
  } catch (error) {
    failed(error);
  }
});
