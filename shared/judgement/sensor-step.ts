import { JudgedCooler } from '../contracts/judgement';
import { mean, sampleVariance } from '../numerics';
import { runsOf } from './evidence';

/** Beyond this many steps of spread the step no longer shows in a mean. */
const SPREAD_THAT_HIDES_A_STEP = 0.4;

/**
 * RMS over phase of the bias of the mean of readings in steps of `step`, scattered by `spread` (same unit):
 * √(½ Σ (q/πk)² exp(−4π²k²s²/q²)); q/√12 without scatter.
 * Source: Fourier series of the rounding error of normal readings (Widrow and Kollár 2008, Quantization Noise).
 */
export function stepUncertainty(step: number, spread: number): number {
  let sum = 0;
  for (let k = 1; k <= 400; k++) {
    const amplitude = step / (Math.PI * k);
    const term =
      amplitude * amplitude * Math.exp((-4 * Math.PI ** 2 * k * k * spread * spread) / (step * step));
    sum += term;
    if (term < 1e-18 * sum) break;
  }
  return Math.sqrt(sum / 2);
}

export interface StepEffect {
  readonly step: number;
  /** Spread of readings that the step is to be seen against: inside a window and from run to run. */
  readonly spread: number;
  /** Standard uncertainty common to all runs of the cooler; 0 where the spread hides the step. */
  readonly uncertainty: number;
  readonly shows: boolean;
}

/** What the heat-source sensor's step does to a cooler's mean rise, °C; null when the step is not known. */
export function stepEffect(cooler: JudgedCooler): StepEffect | null {
  const runs = runsOf(cooler);
  const steps = runs.map(({ sensorStep }) => sensorStep).filter((step) => step !== null);
  if (steps.length === 0) return null;
  const step = Math.max(...steps);
  const inside = runs
    .map(({ withinStandardDeviation }) => withinStandardDeviation)
    .filter((spread) => spread !== null)
    // The recorded spread holds the step's own scatter; what is left is the true one.
    .map((spread) => Math.max(0, spread * spread - (step * step) / 12));
  const between = runs.length > 1 ? sampleVariance(runs.map(({ value }) => value)) : 0;
  const spread = Math.sqrt((inside.length > 0 ? mean(inside) : 0) + between);
  const shows = spread < SPREAD_THAT_HIDES_A_STEP * step;
  return { step, spread, shows, uncertainty: shows ? stepUncertainty(step, spread) : 0 };
}
