import { JudgedCooler, JudgedRun } from '../../contracts/judgement';
import { mean } from '../../numerics';
import { runsOf } from '../evidence';
import { stepEffect } from '../sensor-step';
import { degrees, finding, listed, PairCheck, quantity, watts } from './finding';

/** Ambient that moves more than this inside a window no longer counts as steady, °C (common practice, no source). */
const AMBIENT_MOVED = 1;
/** Ambient means of two coolers further apart than this are worth a word, °C (common practice, no source). */
const AMBIENT_APART = 1;
/** Share by which power or fan speed may be off before it is worth a word (common practice, no source). */
const SHARE_OFF = 0.02;
/** A difference in power matters when it is worth more than this share of the gap that matters. */
const SHARE_OF_GAP = 0.1;

type Known = 'ambient' | 'watts' | 'fanSpeed';

/** Values that the runs of a cooler have of a quantity. */
const known = (cooler: JudgedCooler, what: Known): number[] =>
  runsOf(cooler)
    .map((run) => run[what])
    .filter((value) => value !== null);

/** "mount 2 run 1 of Bare fins" for runs of both coolers that `test` picks. */
function namesOf(coolers: readonly JudgedCooler[], test: (run: JudgedRun) => boolean): string[] {
  return coolers.flatMap((cooler) =>
    cooler.mounts.flatMap((mount) =>
      mount.runs
        .filter(test)
        .map(
          ({ name }) => `${cooler.name} ${cooler.mountsRecorded ? `mount ${mount.name} ` : ''}run ${name}`,
        ),
    ),
  );
}

export const ambient: PairCheck = ({ a, b }) => {
  const moved = namesOf([a, b], ({ ambientRange }) => ambientRange !== null && ambientRange > AMBIENT_MOVED);
  const [inA, inB] = [known(a, 'ambient'), known(b, 'ambient')];
  const found = [];
  if (moved.length > 0)
    found.push(
      finding(
        'ambient-moved',
        'caution',
        'Ambient',
        `Ambient moved by more than ${degrees(AMBIENT_MOVED)} inside the steady window of ${listed(moved)}. A rise lags behind a moving room.`,
        { runs: moved.length },
      ),
    );
  if (inA.length > 0 && inB.length > 0) {
    const apart = mean(inA) - mean(inB);
    const numbers = { ambientA: mean(inA), ambientB: mean(inB) };
    if (Math.abs(apart) > AMBIENT_APART)
      found.push(
        finding(
          'ambient-differs',
          'caution',
          'Ambient',
          `Ambient stood ${degrees(Math.abs(apart))} ${apart > 0 ? 'higher' : 'lower'} for ${a.name} than for ${b.name}. Rise changes a little with ambient, so part of the gap may be the room’s.`,
          numbers,
        ),
      );
    else if (moved.length === 0) {
      const all = [...inA, ...inB];
      found.push(
        finding(
          'ambient',
          'note',
          'Ambient',
          `Ambient stood between ${degrees(Math.min(...all))} and ${degrees(Math.max(...all))}, alike for both coolers.`,
          numbers,
        ),
      );
    }
  }
  return found;
};

export const heatLoad: PairCheck = (checked) => {
  const { a, b, input, rules, unit, resultA, resultB } = checked;
  const [inA, inB] = [known(a, 'watts'), known(b, 'watts')];
  if (inA.length === 0 || inB.length === 0) {
    return input.nominalWatts === null && inA.length + inB.length === 0
      ? []
      : [
          finding(
            'watts-unknown',
            'caution',
            'Heat load',
            'Power was not logged for every cooler, so a difference in load can’t be told from a gap.',
          ),
        ];
  }
  const [meanA, meanB] = [mean(inA), mean(inB)];
  const apart = meanA - meanB;
  const numbers: Record<string, number | null> = { wattsA: meanA, wattsB: meanB };
  const found = [];
  const off =
    input.nominalWatts === null
      ? 0
      : Math.max(...[meanA, meanB].map((value) => Math.abs(value / (input.nominalWatts ?? value) - 1)));
  if (off > SHARE_OFF)
    found.push(
      finding(
        'watts-off',
        'caution',
        'Heat load',
        `Power was ${watts(meanA)} for ${a.name} and ${watts(meanB)} for ${b.name}, not the nominal ${watts(input.nominalWatts ?? 0, 0)}. The verdict is about the power measured.`,
        numbers,
      ),
    );
  if (unit === 'K/W') {
    if (off <= SHARE_OFF)
      found.push(
        finding(
          'heat-load',
          'note',
          'Heat load',
          `Power was ${watts(meanA)} for ${a.name} and ${watts(meanB)} for ${b.name}; resistance allows for the difference.`,
          numbers,
        ),
      );
    return found;
  }
  // A rise is nearly proportional to power: a watt is worth rise ÷ power.
  const worth = (((resultA.mean ?? 0) + (resultB.mean ?? 0)) / (meanA + meanB)) * apart;
  numbers['worthOfDifference'] = worth;
  if (Math.abs(worth) > SHARE_OF_GAP * rules.gapThatMatters)
    found.push(
      finding(
        'watts-differ',
        'caution',
        'Heat load',
        `${a.name} was given ${watts(Math.abs(apart), 2)} ${apart > 0 ? 'more' : 'less'} than ${b.name}, worth about ${quantity(Math.abs(worth), checked)}. Judge the resistance, which allows for it.`,
        numbers,
      ),
    );
  else if (found.length === 0)
    found.push(
      finding(
        'heat-load',
        'note',
        'Heat load',
        `Power was ${watts(meanA)} and ${watts(meanB)}; the difference is worth ${quantity(Math.abs(worth), checked)}.`,
        numbers,
      ),
    );
  return found;
};

export const fan: PairCheck = ({ a, b }) => {
  const [inA, inB] = [known(a, 'fanSpeed'), known(b, 'fanSpeed')];
  if (inA.length === 0 || inB.length === 0) return [];
  const [meanA, meanB] = [mean(inA), mean(inB)];
  if (Math.abs(meanA - meanB) <= SHARE_OFF * Math.max(meanA, meanB)) return [];
  return [
    finding(
      'fan-differs',
      'caution',
      'Fan',
      `The fan turned at ${Math.round(meanA)} rpm for ${a.name} and ${Math.round(meanB)} rpm for ${b.name}: part of the gap may be the fan’s.`,
      { fanA: meanA, fanB: meanB },
    ),
  ];
};

export const settling: PairCheck = ({ a, b }) => {
  const [not, nearly] = (['not settled', 'nearly settled'] as const).map((state) =>
    namesOf([a, b], ({ settled }) => settled === state),
  );
  const found = [];
  if (not.length > 0)
    found.push(
      finding(
        'not-settled',
        'stop',
        'Settling',
        `The temperature still climbed or fell at the end of ${listed(not)}. Leave ${not.length === 1 ? 'it' : 'them'} out, or run longer.`,
        { runs: not.length },
      ),
    );
  if (nearly.length > 0)
    found.push(
      finding(
        'nearly-settled',
        'caution',
        'Settling',
        `The temperature had nearly but not quite settled in ${listed(nearly)}, so ${nearly.length === 1 ? 'its mean is' : 'their means are'} a little low.`,
        { runs: nearly.length },
      ),
    );
  const byHand = namesOf([a, b], ({ windowSetByHand }) => windowSetByHand);
  if (byHand.length > 0)
    found.push(
      finding(
        'window-by-hand',
        'caution',
        'Steady window',
        `A person set the steady window of ${listed(byHand)}; the reason stands with the run.`,
        { runs: byHand.length },
      ),
    );
  return found;
};

export const sensor: PairCheck = ({ a, b }) =>
  [a, b].flatMap((cooler) => {
    const effect = stepEffect(cooler);
    if (!effect?.shows) return [];
    return [
      finding(
        'sensor-coarse',
        'caution',
        'Sensor steps',
        `The heat-source sensor moves in steps of ${degrees(effect.step)}, coarse against the ${degrees(effect.spread, 2)} that readings of ${cooler.name} scatter. Up to ${degrees(effect.uncertainty, 2)} of bias common to its runs is added to the noise.`,
        { step: effect.step, uncertainty: effect.uncertainty },
      ),
    ];
  });
