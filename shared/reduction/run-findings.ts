import { FindingLevel, RunFinding } from '../contracts/run-summary';
import type { RunFacts } from './reduce-run';
import { SHORTEST_WINDOW } from './steady-window';
import { celsius, clock, count, fixed, rpm, stretch, watts } from './words';

/** Ambient that moves more than this inside the window leaves a cooler behind, °C (common practice, no source). */
const AMBIENT_MOVED = 1;
/** Share of the nominal watts by which a run may differ unremarked. */
const WATTS_OFF = 0.01;
/** Share of the mean by which watts may range inside the window unremarked. */
const WATTS_RANGE = 0.1;
/** A fan below this many rpm stands still (common practice, no source). */
const FAN_STANDS = 60;
/** A sensor whose step is at least this coarse is said to be, °C. */
const COARSE_STEP = 0.5;

/** A finely stepped sensor that does not move for this long, and for half the window, may be stuck, s. */
const STANDSTILL = 300;

const finding = (code: string, level: FindingLevel, text: string, atSeconds: number | null): RunFinding => ({
  code,
  level,
  text,
  atSeconds,
});

/** °C a minute from °C per five minutes, with its sign in words. */
const pace = (slopePer5: number): string =>
  `${slopePer5 >= 0 ? 'climbs' : 'falls'} ${celsius(Math.abs(slopePer5) / 5, 2)} a minute`;

function settling({ window, rise, plateau, log }: RunFacts): RunFinding[] {
  const found: RunFinding[] = [];
  const duration = log.seconds[log.seconds.length - 1];
  if (duration < SHORTEST_WINDOW - 1) {
    found.push(
      finding(
        'short-log',
        'caution',
        `The log lasts ${stretch(duration)}; a steady window needs 10 minutes. The mean over the whole log stands in for it and may be too low.`,
        0,
      ),
    );
  }
  if (window.settled === 'not settled') {
    found.push(
      finding(
        'not-settled',
        'caution',
        `No steady window found: the rise still ${pace(window.slopePer5Minutes)} at the end. The run does not count towards a gap until the window is set or the run is left out.`,
        window.from,
      ),
    );
  } else if (window.settled === 'nearly settled' && !plateau && duration >= SHORTEST_WINDOW - 1) {
    found.push(
      finding(
        'nearly-settled',
        'caution',
        `Nearly settled: over the ${window.setBy === 'hand' ? 'window' : 'last 10 minutes'} the rise ${pace(window.slopePer5Minutes)}. The mean of ${celsius(rise, 2)} may be off by a tenth or two.`,
        window.from,
      ),
    );
  }
  if (plateau) {
    found.push(
      finding(
        'plateau-differs',
        'caution',
        `An exponential through the last two thirds of the log heads for ${celsius(plateau.plateau, 2)}, ${celsius(Math.abs(plateau.plateau - rise), 2)} from the window's mean of ${celsius(rise, 2)}. The run may not have settled.`,
        window.from,
      ),
    );
  }
  if (window.setBy === 'hand') {
    found.push(
      finding(
        'window-by-hand',
        'note',
        `Steady window set by hand, ${clock(window.from)} to ${clock(window.to)}: ${window.reason ?? ''}`,
        window.from,
      ),
    );
  }
  return found;
}

function ambient({ ambient: air, window, trace, choices, log }: RunFacts): RunFinding[] {
  const found: RunFinding[] = [];
  const fixed_ = choices.fixedAmbient !== null && (choices.columnMap ?? log.columnMap).ambient === null;
  if (fixed_) {
    found.push(
      finding(
        'ambient-fixed',
        'caution',
        `Ambient was not logged; ${celsius(choices.fixedAmbient ?? 0)} was entered for the whole run. A room that moved moves ΔT by as much.`,
        null,
      ),
    );
  }
  const moved = air.highest - air.lowest;
  if (moved > AMBIENT_MOVED) {
    found.push(
      finding(
        'ambient-moved',
        'caution',
        `Ambient moved ${celsius(moved)} inside the steady window, from ${celsius(air.lowest)} to ${celsius(air.highest)}. A cooler follows its room late, so ΔT may be off by part of that.`,
        window.from,
      ),
    );
  }
  const lost = trace.ambientLost;
  if (lost && lost.readings > 1 && lost.to - lost.from > 60) {
    found.push(
      finding(
        'ambient-lost',
        'caution',
        `No ambient for ${count(lost.readings, 'reading')} between ${clock(lost.from)} and ${clock(lost.to)}; they have no ΔT and are skipped.`,
        lost.from,
      ),
    );
  } else if (lost) {
    found.push(
      finding(
        'ambient-lost',
        'note',
        `${count(lost.readings, 'reading')} at ${clock(lost.from)} without ambient skipped; the mean stands.`,
        lost.from,
      ),
    );
  }
  return found;
}

function load({
  watts: power,
  rise,
  window,
  choices,
  fanSpeed,
  log,
  to,
  from,
  trace,
}: RunFacts): RunFinding[] {
  const found: RunFinding[] = [];
  const nominal = choices.nominalWatts;
  if (power && nominal !== null) {
    const off = power.mean / nominal - 1;
    if (Math.abs(off) > WATTS_OFF) {
      const shift = power.mean > 0 ? rise * (nominal / power.mean - 1) : NaN;
      const consequence = Number.isFinite(shift)
        ? ` At the condition's watts the rise would be about ${celsius(Math.abs(shift))} ${shift > 0 ? 'higher' : 'lower'}.`
        : '';
      found.push(
        finding(
          'watts-off',
          'caution',
          `Heat load ${watts(power.mean)} is ${fixed(Math.abs(off) * 100, 1)} % ${off > 0 ? 'above' : 'below'} the condition's ${watts(nominal, 0)}.${consequence}`,
          window.from,
        ),
      );
    }
  }
  if (power && power.mean > 0 && power.highest - power.lowest > WATTS_RANGE * power.mean) {
    found.push(
      finding(
        'watts-unsteady',
        'caution',
        `Heat load ranges from ${watts(power.lowest)} to ${watts(power.highest)} inside the steady window; the rise follows it.`,
        window.from,
      ),
    );
  }
  if (fanSpeed && fanSpeed.lowest < FAN_STANDS) {
    const position = (choices.columnMap ?? log.columnMap).fanSpeed;
    const values = position === null ? undefined : log.kept.get(position);
    let at = window.from;
    for (let i = trace.at[from]; values && i <= trace.at[to]; i += 1) {
      if (values[i] < FAN_STANDS) {
        at = log.seconds[i];
        break;
      }
    }
    found.push(
      finding(
        'fan-off',
        'caution',
        `The fan reads ${rpm(fanSpeed.lowest)} at ${clock(at)}, inside the steady window. Unless the cooler is meant to run without, leave this run out.`,
        at,
      ),
    );
  }
  return found;
}

/** Values that say a column was mistaken for another. */
function plausibility({ rise, watts: power, window }: RunFacts): RunFinding[] {
  const found: RunFinding[] = [];
  if (rise <= 0) {
    found.push(
      finding(
        'rise-not-positive',
        'stop',
        `The heat source reads ${celsius(-rise)} below ambient. The two columns may be swapped, or the heater was off; choose the columns again.`,
        window.from,
      ),
    );
  }
  if (power && power.mean <= 0) {
    found.push(
      finding(
        'no-heat-load',
        'caution',
        `The heat load reads ${watts(power.mean)} in the steady window, so there is no resistance. Choose another column for it, or check the meter.`,
        window.from,
      ),
    );
  }
  return found;
}

/** Holes in the trace: the widest is told with its place, the others counted. */
function holes({ trace, window, hole }: RunFacts): RunFinding[] {
  let widest = { from: 0, length: 0 };
  let many = 0;
  let inWindow = 0;
  for (let i = 1; i < trace.seconds.length; i += 1) {
    const length = trace.seconds[i] - trace.seconds[i - 1];
    if (length <= hole) continue;
    many += 1;
    if (trace.seconds[i] > window.from && trace.seconds[i - 1] < window.to) inWindow += length;
    if (length > widest.length) widest = { from: trace.seconds[i - 1], length };
  }
  if (many === 0) return [];
  const what = `${stretch(widest.length)} without readings, from ${clock(widest.from)}${many > 1 ? `; ${count(many, 'such gap')} in all` : ''}.`;
  const length = window.to - window.from;
  return [
    inWindow === 0
      ? finding(
          'time-gap',
          'note',
          `${what} ${many === 1 ? 'The gap lies' : 'They lie'} outside the steady window, so the mean stands.`,
          widest.from,
        )
      : finding(
          'time-gap',
          inWindow > 0.1 * length ? 'caution' : 'note',
          `${what} The steady window is missing ${stretch(inWindow)} of its ${stretch(length)}; the mean is over what is there.`,
          widest.from,
        ),
  ];
}

/** Longest stretch of one and the same heat-source reading inside the window, s. */
function longestStandstill({ trace, from, to }: RunFacts, heat: Float64Array): { from: number; to: number } {
  let longest = { from: trace.seconds[from], to: trace.seconds[from] };
  let start = from;
  for (let i = from + 1; i <= to; i += 1) {
    if (heat[trace.at[i]] !== heat[trace.at[start]]) start = i;
    if (trace.seconds[i] - trace.seconds[start] > longest.to - longest.from) {
      longest = { from: trace.seconds[start], to: trace.seconds[i] };
    }
  }
  return longest;
}

function sensor(facts: RunFacts): RunFinding[] {
  const { heatSource, sensorStep, window, log, choices } = facts;
  const position = (choices.columnMap ?? log.columnMap).heatSource;
  const heat = position === null ? undefined : log.kept.get(position);
  if (!heat) return [];
  if (heatSource.lowest === heatSource.highest && (sensorStep === null || sensorStep >= COARSE_STEP)) {
    const steps = sensorStep === null ? ' and the log' : `; its steps are ${celsius(sensorStep)}`;
    return [
      finding(
        'sensor-coarse',
        'caution',
        `The heat source reads ${celsius(heatSource.mean)} all through the steady window${steps}. Differences smaller than a step cannot show.`,
        window.from,
      ),
    ];
  }
  if (sensorStep !== null && sensorStep >= COARSE_STEP) {
    return [
      finding(
        'sensor-coarse',
        'note',
        `The heat-source sensor reads in steps of ${celsius(sensorStep)}. The mean is finer than that only as far as noise moves it between steps.`,
        null,
      ),
    ];
  }
  const still = longestStandstill(facts, heat);
  if (sensorStep === null || still.to - still.from < Math.max(STANDSTILL, (window.to - window.from) / 2))
    return [];
  return [
    finding(
      'sensor-stuck',
      'caution',
      `The heat source reads one and the same value from ${clock(still.from)} to ${clock(still.to)}, though the sensor shows steps of ${celsius(sensorStep, sensorStep < 0.1 ? 2 : 1)}. It may be stuck.`,
      still.from,
    ),
  ];
}

function averaging({ weighing, window }: RunFacts): RunFinding[] {
  return weighing === 'plain'
    ? []
    : [
        finding(
          'time-weighted',
          'note',
          'Readings come at uneven steps, so each counts for the time it stands for. At even steps all would count alike.',
          window.from,
        ),
      ];
}

/** The checks of one run, each with time, values and plain consequence. */
export function runFindings(facts: RunFacts): RunFinding[] {
  return [plausibility, settling, ambient, load, holes, sensor, averaging].flatMap((check) => check(facts));
}
