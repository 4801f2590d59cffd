import { welchPower } from '../../shared/judgement';
import type { BenchNoise, ThresholdValues } from '../../shared/contracts';

/** Mounts per cooler that the bench page looks ahead to. */
const MOUNTS = [2, 3, 4, 5, 6, 8, 10];

/**
 * The smallest gap a bench can see, by mounts of each of two coolers, if both mount as the bench's past coolers did.
 * @param spread standard deviation of mount means, °C
 * @param runsPerMount runs of one mount for which that spread holds
 * @returns gaps in °C at the thresholds' confidence and power, for Welch's test on mount means
 */
export function smallestVisibleGaps(
  spread: number,
  runsPerMount: number,
  { confidence, power }: ThresholdValues,
): BenchNoise['visible'] {
  return MOUNTS.flatMap((mounts) => {
    const side = { variance: spread * spread, units: mounts };
    const gap = welchPower(side, side, confidence)?.gapAt(power) ?? NaN;
    return Number.isFinite(gap) ? [{ mounts, runs: mounts * runsPerMount, gap }] : [];
  });
}
