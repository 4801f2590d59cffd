import { createReadStream } from 'node:fs';
import { basename, resolve } from 'node:path';
import { Metric } from '../../../shared/contracts/common';
import { Finding, JudgedRun } from '../../../shared/contracts/judgement';
import { LogProblem } from '../../../shared/contracts/run-summary';
import { reduceRun, startReading } from '../../../shared/reduction';
import { BadRequest, RequestedRun } from './judge-request';

/** Notes that tell of cells or rows not used; other notes of a log say that all is well. */
const SKIPS = new Set(['bad-cells', 'blank-cells', 'rows-skipped', 'last-row-cut', 'end-block']);

/** Where a run stands in the request, for messages and defaults. */
interface RunPlace {
  readonly folder: string;
  readonly name: string;
  readonly metric: Metric;
  readonly nominalWatts: number | null;
  /** Takes what was noticed while a log was read, so that nothing skipped goes unsaid. */
  readonly tell: (finding: Finding) => void;
}

/**
 * The run as the judgement sees it: from its value, or from its log read and reduced.
 * @throws BadRequest naming file, row and column when a log can't be used
 */
export async function readRun(run: RequestedRun, place: RunPlace): Promise<JudgedRun> {
  const given: JudgedRun = {
    name: run.name ?? place.name,
    value: run.value ?? NaN,
    order: run.order ?? null,
    ambient: run.ambient ?? null,
    ambientRange: null,
    watts: run.watts ?? null,
    fanSpeed: run.fanSpeed ?? null,
    settled: 'no trace',
    windowSetByHand: false,
    sensorStep: null,
    withinStandardDeviation: null,
    digest: null,
  };
  return run.file === undefined ? given : readLog(run.file, given, place);
}

async function readLog(file: string, given: JudgedRun, place: RunPlace): Promise<JudgedRun> {
  const reading = startReading(basename(file));
  try {
    for await (const chunk of createReadStream(resolve(place.folder, file)))
      reading.write(chunk as Uint8Array);
  } catch (error) {
    const { code, message } = error as NodeJS.ErrnoException;
    throw new BadRequest(`${file}: ${code === 'ENOENT' ? 'no such file beside the request' : message}`);
  }
  const { log, problems } = reading.end();
  if (!log) throw new BadRequest(inOneLine(file, problems));
  const { summary, problems: more } = reduceRun(log, {
    columnMap: null,
    fixedAmbient: null,
    window: null,
    nominalWatts: place.nominalWatts,
  });
  if (!summary) throw new BadRequest(inOneLine(file, [...problems, ...more]));
  const value = place.metric === 'rise' ? summary.rise : summary.resistance;
  if (value === null)
    throw new BadRequest(`${file}: no column of watts, which resistance needs; add one, or judge the rise`);
  for (const { code, level, text, atSeconds } of summary.findings)
    if (level !== 'note' || SKIPS.has(code))
      place.tell({ code, level, title: 'Log', text: `${file}: ${text}`, numbers: { atSeconds } });
  return {
    ...given,
    value,
    ambient: summary.ambient.mean,
    ambientRange: summary.ambient.highest - summary.ambient.lowest,
    watts: summary.watts?.mean ?? given.watts,
    fanSpeed: summary.fanSpeed?.mean ?? given.fanSpeed,
    settled: summary.window.settled,
    sensorStep: summary.sensorStep,
    withinStandardDeviation: summary.within.standardDeviation,
  };
}

function inOneLine(file: string, problems: readonly LogProblem[]): string {
  const [first] = problems;
  if (!first) return `${file}: this log could not be reduced to a run`;
  const row = first.row === null ? '' : `, row ${first.row}`;
  const column = first.column === null ? '' : `, column "${first.column}"`;
  return `${file}${row}${column}: ${first.text.replace(/\s+/g, ' ')}`;
}
