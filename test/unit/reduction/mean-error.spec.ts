import { studentQuantile } from '../../../shared/numerics';
import { meanError } from '../../../shared/reduction/initial-positive-sequence';
import { reference } from '../../support/reference';
import { Random } from './random';

interface Beaver {
  readonly data: { readonly temp: number[] };
  readonly results: {
    readonly desc: { n: number; mean: number; var: number };
    readonly acf_lag0_20: number[];
  };
}

const average = (values: ArrayLike<number>): number =>
  Array.from(values).reduce((sum, v) => sum + v, 0) / values.length;

/** First-order noise of standard deviation 1 that forgets in `tau` readings. */
function remembering(r: Random, n: number, tau: number): Float64Array {
  const keep = Math.exp(-1 / tau);
  let value = r.normal();
  return Float64Array.from({ length: n }, () => {
    const now = value;
    value = keep * value + Math.sqrt(1 - keep * keep) * r.normal();
    return now;
  });
}

describe('the standard error of a window mean', () => {
  it('equals the initial positive sequence on the autocorrelations R gives for beaver1', () => {
    // R 4.2.2, acf(beaver1$temp, lag.max = 20): reference-data/beaver1.json. The sums of pairs turn negative at lag 10.
    const { data, results } = reference<Beaver>('beaver1');
    const { n, mean, var: variance } = results.desc;
    const c0 = (variance * (n - 1)) / n;
    const r = results.acf_lag0_20;
    let [sum, smallest] = [0, Infinity];
    for (let k = 0; r[k] + r[k + 1] > 0; k += 2) {
      smallest = Math.min(smallest, r[k] + r[k + 1]);
      sum += smallest;
    }
    const expected = Math.sqrt((c0 * (2 * sum - 1)) / n);
    const found = meanError(Float64Array.from(data.temp), mean);
    expect(Math.abs(found.standardError / expected - 1)).toBeLessThan(1e-10);
    expect(Math.abs(found.effectiveReadings / (c0 / expected ** 2) - 1)).toBeLessThan(1e-10);
    // Beside it, the same series by another rule of cutting the sum gives 15.06 effective readings.
    expect(found.effectiveReadings).toBeGreaterThan(10);
    expect(found.effectiveReadings).toBeLessThan(20);
  });

  it('of independent readings is near s over root n, and never claims more readings than there are', () => {
    const r = new Random(4);
    const x = Float64Array.from({ length: 900 }, () => r.normal());
    const { standardError, effectiveReadings } = meanError(x, average(x));
    expect(standardError).toBeGreaterThanOrEqual((1 / 30) * 0.9);
    expect(standardError).toBeLessThan((1 / 30) * 1.35);
    expect(effectiveReadings).toBeLessThanOrEqual(900);
    const alternating = Float64Array.from({ length: 100 }, (_, i) => (i % 2 === 0 ? 1 : -1));
    expect(meanError(alternating, 0).effectiveReadings).toBe(100);
  });

  it('of a constant is zero', () => {
    expect(meanError(new Float64Array(50).fill(3), 3)).toEqual({ standardError: 0, effectiveReadings: 50 });
  });

  it('of a very long window is the same as of its means over blocks', () => {
    const r = new Random(6);
    const long = remembering(r, 60_000, 300);
    const shown = meanError(long, average(long)).standardError;
    // Theory for a first-order process: variance of the mean = (1 + a) / (1 − a) / n.
    const a = Math.exp(-1 / 300);
    expect(shown / Math.sqrt((1 + a) / (1 - a) / 60_000)).toBeGreaterThan(0.8);
    expect(shown / Math.sqrt((1 + a) / (1 - a) / 60_000)).toBeLessThan(1.2);
  });

  it('holds its calibration: memory of 30 s, 600 readings', () => {
    // Bounds of the specification's calibration targets, there for 20,000 windows.
    const r = new Random(9);
    const windows = 1000;
    let [estimates, squares, covered, naive] = [0, 0, 0, 0];
    for (let k = 0; k < windows; k += 1) {
      const x = remembering(r, 600, 30);
      const mean = average(x);
      const { standardError, effectiveReadings } = meanError(x, mean);
      estimates += standardError / windows;
      squares += (mean * mean) / windows;
      if (Math.abs(mean) <= studentQuantile(0.975, Math.max(1, effectiveReadings - 1)) * standardError)
        covered += 1 / windows;
      const own = Math.sqrt(average(x.map((v) => (v - mean) ** 2)) / 599);
      if (Math.abs(mean) <= 1.96 * own) naive += 1 / windows;
    }
    expect(estimates / Math.sqrt(squares)).toBeGreaterThan(0.82);
    expect(estimates / Math.sqrt(squares)).toBeLessThan(0.98);
    expect(covered).toBeGreaterThanOrEqual(0.87);
    expect(naive).toBeLessThanOrEqual(0.25);
  });
});
