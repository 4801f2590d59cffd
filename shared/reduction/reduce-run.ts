import {
  ColumnMap,
  LogProblem,
  RunSummary,
  SteadyWindow,
  TraceSketch,
  WindowMean,
} from '../contracts/run-summary';
import { Log } from './log';
import { Rise, formRise } from './rise';
import { FoundWindow, SHORTEST_WINDOW, findSteadyWindow, settledBy, slopePer5Minutes } from './steady-window';
import { Weighing, meanOf, timeWeights, windowMean } from './window-mean';
import { meanError } from './initial-positive-sequence';
import { Problems } from './problems';
import { PlateauFit, fitPlateau } from './plateau-fit';
import { runFindings } from './run-findings';
import { samplingOf, weighingOf } from './sampling';
import { sketchOf } from './sketch';
import { smallestStep } from './sensor-step';
import { clock, count } from './words';

/** What a person, a bench or a study says about a run beyond its log. */
export interface RunChoices {
  /** Columns by position; null: as the log was read. Columns the log was not read with need reading again. */
  readonly columnMap: ColumnMap | null;
  /** Ambient for the whole run, °C, for a log without an ambient column. */
  readonly fixedAmbient: number | null;
  /** Steady window set by hand, seconds since the log's start; null: the rule decides. */
  readonly window: { readonly from: number; readonly to: number; readonly reason: string } | null;
  /** Watts of the condition, to compare with. */
  readonly nominalWatts: number | null;
}

export interface ReducedRun {
  /** null when something is missing; `problems` then says what, or those of reading the log did. */
  readonly summary: RunSummary | null;
  readonly sketch: TraceSketch;
  readonly problems: LogProblem[];
}

const NO_SKETCH: TraceSketch = { seconds: [], rise: [], ambient: [] };

/** Everything about a run that its findings are judged from. */
export interface RunFacts {
  readonly log: Log;
  readonly trace: Rise;
  readonly window: SteadyWindow;
  /** Index of the window's first and last sample in the trace. */
  readonly from: number;
  readonly to: number;
  readonly weighing: Weighing;
  readonly rise: number;
  readonly heatSource: WindowMean;
  readonly ambient: WindowMean;
  readonly watts: WindowMean | null;
  readonly fanSpeed: WindowMean | null;
  readonly plateau: PlateauFit | null;
  readonly sensorStep: number | null;
  readonly hole: number;
  readonly choices: RunChoices;
}

/** The columns of a log that the choices name; problems say what is missing. */
function columnsFor(log: Log, choices: RunChoices, problems: Problems) {
  const map = choices.columnMap ?? log.columnMap;
  const found = log.columns.filter((column) => column.header !== '').map((column) => column.header);
  const list =
    found.length === 0
      ? ''
      : ` Columns found: ${found.slice(0, 8).join(', ')}${found.length > 8 ? ' and others' : ''}.`;
  const column = (position: number | null): Float64Array | null => {
    if (position === null) return null;
    const kept = log.kept.get(position);
    if (kept) return kept;
    const name = log.columns[position]?.header;
    problems.add(
      'column-not-there',
      name === undefined
        ? `Column ${position + 1} was asked for, but the log has ${count(log.columns.length, 'column')}. Choose the columns of this log.`
        : `Column “${name}” was not read. Read the log again with this choice of columns.`,
      log.dialect.headerRow,
      name ?? null,
    );
    return null;
  };
  if (map.time === null || log.columnMap.time !== map.time) {
    problems.add('no-time', `No column is chosen for time.${list} Choose one.`, log.dialect.headerRow);
  }
  if (map.heatSource === null) {
    problems.add(
      'no-heat-source',
      `No heat-source column.${list} Choose the one that measured the heated side.`,
      log.dialect.headerRow,
    );
  }
  if (map.ambient === null && choices.fixedAmbient === null) {
    problems.add(
      'no-ambient',
      `No ambient column.${list} Choose a column, or enter a fixed ambient. Without it there is no ΔT.`,
      log.dialect.headerRow,
    );
  }
  return {
    heat: column(map.heatSource),
    ambient: column(map.ambient),
    watts: column(map.watts),
    fan: column(map.fanSpeed),
  };
}

/** The window by hand, or by the rule. */
function windowOf(trace: Rise, choices: RunChoices, problems: Problems): FoundWindow | null {
  if (!choices.window) return findSteadyWindow(trace.seconds, trace.rise);
  const { from: start, to: end } = choices.window;
  let from = trace.seconds.findIndex((t) => t >= start - 1e-9);
  if (from === -1) from = trace.seconds.length;
  let to = trace.seconds.length - 1;
  while (to >= 0 && trace.seconds[to] > end + 1e-9) to -= 1;
  if (to - from < 1) {
    problems.add(
      'window-empty',
      `The steady window set by hand, ${clock(start)} to ${clock(end)}, holds fewer than two readings; the log runs to ${clock(trace.seconds[trace.seconds.length - 1])}. Set the window inside the log.`,
    );
    return null;
  }
  const slope = slopePer5Minutes(trace.seconds, trace.rise, from, to);
  const settled = settledBy(slope);
  const short = trace.seconds[to] - trace.seconds[from] < SHORTEST_WINDOW - 1;
  return {
    from,
    to,
    slopePer5Minutes: slope,
    settled: short && settled === 'settled' ? 'nearly settled' : settled,
  };
}

/**
 * Reduces a log to one run: ΔT sample by sample, steady window, means over it, resistance, the window's own uncertainty
 * and the run's findings. Nothing is resampled. Readings at even steps are averaged alike; at uneven steps each counts
 * for the time it stands for, and a finding says so. Specification: `methods.md` section 6, S1 and S13.
 */
export function reduceRun(log: Log, choices: RunChoices): ReducedRun {
  const problems = new Problems(log.fileName);
  // A log whose time could not be read has said so already.
  if (log.seconds.length === 0) return { summary: null, sketch: NO_SKETCH, problems: [] };
  const { heat, ambient, watts, fan } = columnsFor(log, choices, problems);
  if (problems.list.length > 0 || !heat) return { summary: null, sketch: NO_SKETCH, problems: problems.list };
  const trace = formRise(log.seconds, heat, ambient ?? choices.fixedAmbient ?? NaN);
  if (trace.rise.length < 2 || trace.seconds[trace.seconds.length - 1] === trace.seconds[0]) {
    problems.add(
      'no-readings-together',
      'The heat source and the ambient are never read at the same time. Expected both in each row, or ambient at least once a minute; check the chosen columns.',
    );
    return { summary: null, sketch: NO_SKETCH, problems: problems.list };
  }
  const { hole } = samplingOf(trace.seconds);
  const sketch = sketchOf(trace, hole);
  const found = windowOf(trace, choices, problems);
  if (!found) return { summary: null, sketch, problems: problems.list };

  const { from, to } = found;
  const seconds = trace.seconds.subarray(from, to + 1);
  const weighing = weighingOf(seconds);
  const weights = weighing === 'plain' ? null : timeWeights(seconds, hole);
  const riseInWindow = trace.rise.subarray(from, to + 1);
  const riseMean = windowMean(riseInWindow, weights)!;
  const rise = riseMean.mean;
  const heatInWindow = Float64Array.from(trace.at.subarray(from, to + 1), (i) => heat[i]);
  // Watts and fan speed may be logged in other rows than the heat source: all theirs between the same moments count.
  const [rowFrom, rowTo] = [trace.at[from], trace.at[to]];
  const rowSeconds = log.seconds.subarray(rowFrom, rowTo + 1);
  const rowWeights = weighing === 'plain' ? null : timeWeights(rowSeconds, hole);
  const inRows = (values: Float64Array | null) =>
    values ? windowMean(values.subarray(rowFrom, rowTo + 1), rowWeights) : null;
  const power = inRows(watts);
  const error = meanError(riseInWindow, meanOf(Array.from(riseInWindow), null));
  const plateau = fitPlateau(trace.seconds, trace.rise);
  const tooFarFromPlateau = plateau !== null && Math.abs(plateau.plateau - rise) > 0.3;
  const window: SteadyWindow = {
    from: trace.seconds[from],
    to: trace.seconds[to],
    readings: to - from + 1,
    slopePer5Minutes: found.slopePer5Minutes,
    settled:
      found.settled === 'settled' && tooFarFromPlateau && !choices.window ? 'nearly settled' : found.settled,
    setBy: choices.window ? 'hand' : 'rule',
    reason: choices.window?.reason ?? null,
  };
  const facts: RunFacts = {
    log,
    trace,
    window,
    from,
    to,
    weighing,
    rise,
    heatSource: windowMean(heatInWindow, weights)!,
    ambient: windowMean(trace.ambient.subarray(from, to + 1), weights)!,
    watts: power,
    fanSpeed: inRows(fan),
    plateau: tooFarFromPlateau ? plateau : null,
    sensorStep: smallestStep(heat),
    hole,
    choices,
  };
  const summary: RunSummary = {
    rise,
    resistance: power && power.mean > 0 ? rise / power.mean : null,
    heatSource: facts.heatSource,
    ambient: facts.ambient,
    watts: facts.watts,
    fanSpeed: facts.fanSpeed,
    window,
    within: {
      standardDeviation: riseMean.standardDeviation,
      standardError: error.standardError,
      effectiveReadings: error.effectiveReadings,
    },
    sensorStep: facts.sensorStep,
    readings: log.seconds.length,
    duration: log.seconds[log.seconds.length - 1],
    startedAt: log.startedAt,
    findings: [...log.findings, ...runFindings(facts)],
  };
  return { summary, sketch, problems: problems.list };
}
