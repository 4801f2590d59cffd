import { usualStep } from './time-axis';
import { Weighing } from './window-mean';

/** How a log was sampled. */
export interface Sampling {
  /** Usual step, s. */
  readonly step: number;
  /** Readings further apart than this, s, leave a hole. */
  readonly hole: number;
}

/** A hole is five usual steps and at least 5 s wide (our choice: shorter ones move no mean that matters). */
export function samplingOf(seconds: Float64Array): Sampling {
  const step = usualStep(seconds);
  return { step, hole: Math.max(5 * step, 5) };
}

/**
 * Whether the readings of a window may be averaged alike. They may when all but one in twenty steps keep within a quarter
 * of the usual step, or within the second to which the clock is written; holes do not count.
 */
export function weighingOf(seconds: Float64Array): Weighing {
  const { step, hole } = samplingOf(seconds);
  const wholeSeconds = seconds.every((value) => Number.isInteger(value));
  const tolerance = Math.max(step / 4, wholeSeconds ? 1 : 0);
  let uneven = 0;
  let steps = 0;
  for (let i = 1; i < seconds.length; i += 1) {
    const dt = seconds[i] - seconds[i - 1];
    if (dt > hole) continue;
    steps += 1;
    if (Math.abs(dt - step) > tolerance * (1 + 1e-9)) uneven += 1;
  }
  return uneven > steps / 20 ? 'time-weighted' : 'plain';
}
