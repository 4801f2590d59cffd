import { Log, RunChoices, reduceRun, startReading } from '../../../shared/reduction';
import { runSummarySchema, traceSketchSchema } from '../../../shared/contracts/run-summary';
import { Random } from './random';

const AS_READ: RunChoices = { columnMap: null, fixedAmbient: null, window: null, nominalWatts: null };

function read(header: string, rows: readonly (readonly (string | number)[])[]): Log {
  const reading = startReading('run.csv');
  reading.write(new TextEncoder().encode([header, ...rows.map((row) => row.join(','))].join('\n') + '\n'));
  const { log, problems } = reading.end();
  expect(problems).toEqual([]);
  return log!;
}

const summaryOf = (log: Log, choices: Partial<RunChoices> = {}) => {
  const { summary, problems } = reduceRun(log, { ...AS_READ, ...choices });
  expect(problems).toEqual([]);
  return runSummarySchema.parse(summary);
};
const steps = (n: number) => Array.from({ length: n }, (_, i) => i);
const codes = (summary: { findings: { code: string }[] }) => summary.findings.map(({ code }) => code);

describe('the rise', () => {
  it('is heat source minus ambient of the same row, exact in decimals', () => {
    const log = read(
      'time_s,plate_c,ambient_c',
      steps(700).map((i) => [i, i % 2 ? '45.3' : '45.4', i % 2 ? '22.1' : '22.2']),
    );
    const summary = summaryOf(log);
    expect(summary.rise).toBe(23.2);
    expect(summary.within.standardDeviation).toBe(0);
  });

  it('takes a slow ambient on the straight line between its readings, and none beyond them', () => {
    // Ambient climbs 0.1 °C a reading, read every tenth second; the plate climbs with it, so the rise is 40 throughout.
    const log = read(
      'time_s,plate_c,ambient_c',
      steps(706).map((i) => [i, (60 + i / 100).toFixed(2), i % 10 === 0 ? (20 + i / 100).toFixed(2) : '']),
    );
    const summary = summaryOf(log);
    expect(summary.rise).toBeCloseTo(40, 12);
    expect(summary.within.standardDeviation).toBeLessThan(1e-12);
    // 701 to 705 s come after the last ambient reading.
    expect(summary.window.to).toBe(700);
    expect(summary.findings.find(({ code }) => code === 'ambient-lost')!.text).toMatch(
      /^5 readings at 11:41/,
    );
  });

  it('is over a fixed ambient where the log has none, and says so', () => {
    const log = read(
      'time_s,plate_c',
      steps(700).map((i) => [i, '62.5']),
    );
    const summary = summaryOf(log, { fixedAmbient: 22.5 });
    expect(summary.rise).toBe(40);
    expect(summary.findings.find(({ code }) => code === 'ambient-fixed')!.text).toMatch(
      /22\.5\u00a0°C was entered/,
    );
  });
});

describe('means over the window', () => {
  it('count readings alike at even steps, and by their time at uneven ones', () => {
    // One second at 41 °C for every three at 40 °C, but read three times as often.
    const rows: [number, string, string][] = [];
    for (let t = 0; t < 1200; t += 4) {
      rows.push(
        [t, '62.0', '22.0'],
        [t + 3, '63.0', '22.0'],
        [t + 3.25, '63.0', '22.0'],
        [t + 3.5, '63.0', '22.0'],
        [t + 3.75, '63.0', '22.0'],
      );
    }
    const uneven = summaryOf(read('time_s,plate_c,ambient_c', rows));
    expect(codes(uneven)).toContain('time-weighted');
    // Trapezoids: 40 °C stands for 1.625 of each 4 s, 41 °C for the rest.
    expect(uneven.rise).toBeCloseTo(40 + 2.375 / 4, 2);
    const even = summaryOf(
      read(
        'time_s,plate_c,ambient_c',
        rows.map(([, plate, air], i) => [i, plate, air]),
      ),
    );
    expect(codes(even)).not.toContain('time-weighted');
    expect(even.rise).toBeCloseTo(40.8, 3);
  });

  it('divide the rise by the watts of the same window', () => {
    const log = read(
      'time_s,plate_c,ambient_c,watts',
      steps(1400).map((i) => [
        i,
        i < 700 ? '80.0' : '62.0',
        '22.0',
        i < 700 ? '250' : i % 2 ? '180.2' : '179.8',
      ]),
    );
    const summary = summaryOf(log, { window: { from: 700, to: 1399, reason: 'load was changed' } });
    expect(summary.watts!.mean).toBeCloseTo(180, 12);
    expect(summary.resistance).toBe(40 / summary.watts!.mean);
  });

  it('leave out readings without a value instead of counting them as zero', () => {
    const log = read(
      'time_s,plate_c,ambient_c,watts',
      steps(700).map((i) => [i, i % 7 ? (i % 2 ? '62.1' : '61.9') : '', '22.0', i % 5 ? '180' : 'n/a']),
    );
    const summary = summaryOf(log);
    expect(summary.rise).toBeCloseTo(40, 10);
    expect(summary.watts).toMatchObject({ mean: 180, lowest: 180 });
    expect(codes(summary)).toEqual(['blank-cells', 'blank-cells']);
  });
});

describe('a window set by hand', () => {
  const log = read(
    'time_s,plate_c,ambient_c',
    steps(1801).map((i) => [i, (62 - 30 * Math.exp(-i / 200)).toFixed(2), '22.0']),
  );

  it('holds what lies between its ends, and carries its reason', () => {
    const { window, findings } = summaryOf(log, {
      window: { from: 900, to: 1500, reason: 'fan was serviced later' },
    });
    expect(window).toMatchObject({
      from: 900,
      to: 1500,
      readings: 601,
      setBy: 'hand',
      reason: 'fan was serviced later',
    });
    expect(findings.find(({ code }) => code === 'window-by-hand')!.text).toMatch(
      /15:00 to 25:00: fan was serviced later/,
    );
  });

  it('outside the log is refused with the log’s length', () => {
    const { summary, problems } = reduceRun(log, {
      ...AS_READ,
      window: { from: 2000, to: 2600, reason: 'mistyped' },
    });
    expect(summary).toBeNull();
    expect(problems[0].text).toMatch(/33:20 to 43:20.*the log runs to 30:00/);
  });
});

describe('findings', () => {
  it('tell watts off nominal with what that does to the rise', () => {
    const log = read(
      'time_s,plate_c,ambient_c,watts',
      steps(700).map((i) => [i, '62.0', '22.0', '176.0']),
    );
    const [finding] = summaryOf(log, { nominalWatts: 180 }).findings;
    expect(finding.text.replaceAll('\u00a0', ' ')).toBe(
      "Heat load 176.0 W is 2.2 % below the condition's 180 W. At the condition's watts the rise would be about 0.9 °C higher.",
    );
  });

  it('tell a run that still climbs by how much a minute', () => {
    const log = read(
      'time_s,plate_c,ambient_c',
      steps(1201).map((i) => [i, (40 + (i * 0.11) / 60).toFixed(3), '22.0']),
    );
    const summary = summaryOf(log);
    expect(summary.window.settled).toBe('not settled');
    expect(summary.findings.find(({ code }) => code === 'not-settled')!.text).toMatch(
      /still climbs 0\.11\u00a0°C a minute/,
    );
  });

  it('tell a plateau that an exponential puts elsewhere, and mark a run whose slope alone would pass', () => {
    // A climb that stops short at 1,190 s: no exponential does, so the curve heads on to 40.4 °C.
    const rise = (i: number) => 40 - (Math.max(0, 1190 - i) / 500) * 3;
    const log = read(
      'time_s,plate_c,ambient_c',
      steps(1801).map((i) => [i, (22 + rise(i)).toFixed(4), '22.0']),
    );
    const { window, findings } = summaryOf(log);
    expect(Math.abs(window.slopePer5Minutes)).toBeLessThan(0.05);
    expect(window).toMatchObject({ settled: 'nearly settled', from: 1140 });
    expect(findings.find(({ code }) => code === 'plateau-differs')!.text.replaceAll('\u00a0', ' ')).toMatch(
      /heads for 40\.36 °C, 0\.38 °C from the window's mean of 39\.99 °C/,
    );
  });
});

describe('the sketch', () => {
  it('keeps the extremes and the holes within 400 points', () => {
    const r = new Random(8);
    const rows = steps(30_000)
      .filter((i) => i < 9000 || i > 9100)
      .map((i) => [i, i === 20_000 ? '99.0' : (62 + r.next()).toFixed(2), '22.0']);
    const { sketch } = reduceRun(read('time_s,plate_c,ambient_c', rows), AS_READ);
    traceSketchSchema.parse(sketch);
    expect(sketch.seconds.length).toBeLessThanOrEqual(400);
    expect(Math.max(...sketch.rise.map((value) => value ?? 0))).toBe(77);
    const hole = sketch.rise.indexOf(null);
    expect(sketch.seconds[hole]).toBeGreaterThan(9000);
    expect(sketch.seconds[hole]).toBeLessThan(9101);
    expect(sketch.seconds).toEqual([...sketch.seconds].sort((a, b) => a - b));
  });
});
