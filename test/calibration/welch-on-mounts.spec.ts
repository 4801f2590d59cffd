import { seededRandom } from '../../shared/numerics';
import { degreesOfFreedomCap, mountEvidence, runEvidence, side } from '../../shared/judgement/evidence';
import { isOutside, welch } from '../../shared/judgement/welch';
import { JudgedCooler } from '../../shared/contracts/judgement';
import { remountedCooler } from '../support/judgement-input';

/**
 * How often a gap is called where there is none, at a nominal 5 %, by seeded simulation: the short form of the calibration.
 * Standard error of a 5 % rate at this many trials: 0.0015.
 */
const TRIALS = 20_000;
jest.setTimeout(120_000);

/** A cooler without any true difference: `mounts` of `runs` each, SD between mounts and between runs in °C. */
function cooler(
  chance: ReturnType<typeof seededRandom>,
  mounts: number,
  runs: number,
  between: number,
): JudgedCooler {
  return remountedCooler(
    'cooler',
    Array.from({ length: mounts }, () => {
      const fitting = between * chance.normal();
      return Array.from({ length: runs }, () => 40 + fitting + chance.normal());
    }),
  );
}

function rate(mounts: number, runs: number, between: number, unit: 'mount' | 'run'): number {
  const chance = seededRandom(20261201);
  const evidenceOf = unit === 'mount' ? mountEvidence : runEvidence;
  const options = { confidence: 0.95, degreesOfFreedomCap: degreesOfFreedomCap(unit, mounts) };
  let called = 0;
  for (let trial = 0; trial < TRIALS; trial++) {
    const [a, b] = [cooler(chance, mounts, runs, between), cooler(chance, mounts, runs, between)];
    const result = welch(side(evidenceOf(a)), side(evidenceOf(b)), options);
    if (result && isOutside(result)) called++;
  }
  return called / TRIALS;
}

it('three mounts of four runs, as much spread between mounts as between runs: at most 5.3 % are called', () => {
  const byMounts = rate(3, 4, 1, 'mount');
  expect(byMounts).toBeLessThanOrEqual(0.053);
  expect(byMounts).toBeGreaterThanOrEqual(0.02);
});

it('the same runs counted as independent: about 24 %, which is why mounts are the evidence', () => {
  expect(Math.abs(rate(3, 4, 1, 'run') - 0.24)).toBeLessThan(0.01);
});

it('ten single runs each, remounted every time: 4 to 5.5 %', () => {
  const byRuns = rate(10, 1, 1, 'mount');
  expect(byRuns).toBeGreaterThanOrEqual(0.04);
  expect(byRuns).toBeLessThanOrEqual(0.055);
});
