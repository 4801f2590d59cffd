import { fitPlateau } from '../../../shared/reduction/plateau-fit';
import { findSteadyWindow, slopePer5Minutes } from '../../../shared/reduction/steady-window';
import { Random } from './random';

const seconds = (n: number, step = 1): Float64Array => Float64Array.from({ length: n }, (_, i) => i * step);

/** Rise that climbs by so much per 5 minutes until `until`, then stays. */
const climbing = (t: Float64Array, per5: number, until: number): Float64Array =>
  t.map((s) => 40 + (per5 / 300) * (Math.min(s, until) - until));

/** Slope by the normal equations, the slow way, as a second derivation. */
function slowSlope(t: ArrayLike<number>, y: ArrayLike<number>, from: number, to: number): number {
  const n = to - from + 1;
  let [mt, my] = [0, 0];
  for (let i = from; i <= to; i += 1) [mt, my] = [mt + t[i] / n, my + y[i] / n];
  let [sxy, sxx] = [0, 0];
  for (let i = from; i <= to; i += 1) [sxy, sxx] = [sxy + (t[i] - mt) * (y[i] - my), sxx + (t[i] - mt) ** 2];
  return (sxy / sxx) * 300;
}

/** The rule by its words: every start on the grid from the earliest on, each slope on its own. */
function slowRule(t: Float64Array, y: Float64Array): number | null {
  const last = t.length - 1;
  for (let start = 0; t[last] - start >= 600; start += 30) {
    const from = t.findIndex((s) => s >= start);
    if (t[last] - t[from] >= 600 && Math.abs(slowSlope(t, y, from, last)) < 0.05) return from;
  }
  return null;
}

describe('the steady window', () => {
  it('is the longest one that ends at the end and whose slope is small', () => {
    const t = seconds(1801);
    const found = findSteadyWindow(t, climbing(t, 1, 900));
    expect(found.settled).toBe('settled');
    expect(found.to).toBe(1800);
    expect(t[found.from] % 30).toBe(0);
    expect(Math.abs(slopePer5Minutes(t, climbing(t, 1, 900), found.from, 1800))).toBeLessThan(0.05);
    expect(Math.abs(slopePer5Minutes(t, climbing(t, 1, 900), found.from - 30, 1800))).toBeGreaterThanOrEqual(
      0.05,
    );
  });

  it('agrees with the rule done slowly, over noisy logs of even and uneven steps', () => {
    const r = new Random(11);
    for (let k = 0; k < 40; k += 1) {
      const uneven = k % 2 === 1;
      let now = 0;
      const t = Float64Array.from({ length: 700 }, () => (now += uneven ? r.whole(1, 5) : 2) - 1);
      const y = t.map((s) => 40 - 8 * Math.exp(-s / (60 + 5 * k)) + 0.3 * r.normal());
      const found = findSteadyWindow(t, y);
      expect(found.settled === 'settled' ? found.from : null).toBe(slowRule(t, y));
    }
  });

  it.each([
    [0.04, 'settled', 0],
    [-0.04, 'settled', 0],
    [0.06, 'nearly settled', 1200],
    [0.19, 'nearly settled', 1200],
    [0.21, 'not settled', 1200],
    [-0.3, 'not settled', 1200],
  ])('with %d °C per five minutes to the end is %s', (per5, settled, from) => {
    const t = seconds(1801);
    const found = findSteadyWindow(t, climbing(t, per5, 1800));
    expect(found).toMatchObject({ settled, from });
    expect(found.slopePer5Minutes).toBeCloseTo(per5, 10);
  });

  it('of a log under ten minutes is the whole log, and never settled', () => {
    const t = seconds(599);
    expect(
      findSteadyWindow(
        t,
        t.map(() => 40),
      ),
    ).toMatchObject({ from: 0, to: 598, settled: 'nearly settled' });
  });

  it('does not count a hole as ten minutes of readings', () => {
    // Readings to 900 s, then none until 1,500 s: a start on the grid inside the hole has only 300 s behind it.
    const t = Float64Array.from([...seconds(901), ...seconds(301).map((s) => s + 1500)]);
    const y = t.map((s) => (s < 901 ? 20 : 40));
    expect(findSteadyWindow(t, y).settled).toBe('nearly settled');
  });

  it('keeps its slope to ten digits with times of a year and rises of a thousand', () => {
    const t = seconds(1801).map((s) => s + 3.2e7);
    const y = t.map((s) => 1000 + 1e-4 * (s - 3.2e7));
    expect(slopePer5Minutes(t, y, 0, 1800)).toBeCloseTo(0.03, 10);
  });
});

describe('the second opinion', () => {
  it('finds the plateau of an exponential from the last two thirds', () => {
    const t = seconds(1801);
    const fit = fitPlateau(
      t,
      t.map((s) => 41.3 - 30 * Math.exp(-s / 240)),
    )!;
    expect(fit.plateau).toBeCloseTo(41.3, 2);
    expect(fit.timeConstant).toBeGreaterThan(220);
    expect(fit.timeConstant).toBeLessThan(260);
  });

  it('is silent where the approach is slower than a third of the log, or the readings scatter too much', () => {
    const t = seconds(1801);
    const r = new Random(2);
    expect(
      fitPlateau(
        t,
        t.map((s) => 41.3 - 30 * Math.exp(-s / 1500)),
      ),
    ).toBeNull();
    expect(
      fitPlateau(
        t,
        t.map(() => 41 + 4 * r.normal()),
      ),
    ).toBeNull();
  });
});

/** First-order noise with a memory of `tau` s and standard deviation `sd`, read once a second. */
function remembering(r: Random, n: number, tau: number, sd: number): Float64Array {
  const keep = Math.exp(-1 / tau);
  let value = sd * r.normal();
  return Float64Array.from({ length: n }, () => {
    const now = value;
    value = keep * value + sd * Math.sqrt(1 - keep * keep) * r.normal();
    return now;
  });
}

describe('calibration of the rule, by simulation of its published conditions', () => {
  // Plateau approached from −50 to +5 °C with one lag of 60 to 300 s; noise of 0.3 °C remembered for 30 s, 0.2 °C without
  // memory, 0.1 °C of slow wander; one reading a second. The bounds are the specification's for 20,000 logs.
  function simulate(minutes: number, logs: number, seed: number) {
    const r = new Random(seed);
    const errors: number[] = [];
    for (let k = 0; k < logs; k += 1) {
      const t = seconds(minutes * 60);
      const [tau, start] = [60 + 240 * r.next(), -50 + 55 * r.next()];
      const [noise, wander] = [remembering(r, t.length, 30, 0.3), remembering(r, t.length, 600, 0.1)];
      const y = t.map((s, i) => 40 + start * Math.exp(-s / tau) + noise[i] + wander[i] + 0.2 * r.normal());
      const { settled, from, to } = findSteadyWindow(t, y);
      if (settled === 'settled')
        errors.push(y.subarray(from, to + 1).reduce((sum, v) => sum + v, 0) / (to - from + 1) - 40);
    }
    const mean = (values: number[]) => values.reduce((sum, v) => sum + v, 0) / values.length;
    return {
      accepted: errors.length / logs,
      bias: mean(errors),
      rootMeanSquare: Math.sqrt(mean(errors.map((e) => e * e))),
      far: errors.filter((e) => Math.abs(e) > 0.5).length / errors.length,
    };
  }

  it('accepts most logs of 30 minutes and is then right to a tenth or two', () => {
    const { accepted, bias, rootMeanSquare, far } = simulate(30, 600, 5);
    expect(accepted).toBeGreaterThanOrEqual(0.7);
    expect(Math.abs(bias)).toBeLessThanOrEqual(0.06);
    expect(rootMeanSquare).toBeLessThanOrEqual(0.15);
    expect(far).toBeLessThanOrEqual(0.005);
  });

  it('accepts few logs of 15 minutes', () => {
    expect(simulate(15, 400, 6).accepted).toBeLessThanOrEqual(0.15);
  });
});
