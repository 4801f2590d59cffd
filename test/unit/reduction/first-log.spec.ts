import { reduceRun, startReading } from '../../../shared/reduction';

const encode = (text: string) => new TextEncoder().encode(text);
const AS_READ = { columnMap: null, fixedAmbient: null, window: null, nominalWatts: null };

/** Thirty minutes at a constant 40 °C over ambient. */
const plain = (rows = 1801) =>
  [
    'time_s,plate_c,ambient_c,watts',
    ...Array.from({ length: rows }, (_, i) => `${i},${i % 2 === 0 ? '62.1' : '62.3'},22.2,180.0`),
  ].join('\n') + '\n';

describe('a plain log', () => {
  it('gives its mean rise and resistance over the longest steady window', () => {
    const reading = startReading('B1-run1.csv');
    reading.write(encode(plain()));
    const { log, problems } = reading.end();
    expect(problems).toEqual([]);
    const { summary } = reduceRun(log!, AS_READ);
    expect(summary!.rise).toBeCloseTo(40, 3);
    expect(summary!.resistance).toBeCloseTo(40 / 180, 5);
    expect(summary!.window).toMatchObject({ from: 0, to: 1800, settled: 'settled', setBy: 'rule' });
    expect(summary!.sensorStep).toBe(0.2);
    expect(summary!.findings).toEqual([]);
  });

  it('reads the same whatever the size of the chunks', () => {
    const bytes = encode(plain());
    const whole = startReading('a.csv');
    whole.write(bytes);
    const expected = whole.end();
    for (const size of [1, 7, 4096]) {
      const reading = startReading('a.csv');
      for (let at = 0; at < bytes.length; at += size) reading.write(bytes.subarray(at, at + size));
      expect(reading.end()).toEqual(expected);
    }
  });

  it('names the columns it found when there is no ambient', () => {
    const reading = startReading('C2-run1.csv');
    reading.write(
      encode(
        'time_s,plate_c,watts\n' + Array.from({ length: 700 }, (_, i) => `${i},60.${i % 10},180\n`).join(''),
      ),
    );
    const { summary, problems } = reduceRun(reading.end().log!, AS_READ);
    expect(summary).toBeNull();
    expect(problems).toEqual([
      {
        code: 'no-ambient',
        file: 'C2-run1.csv',
        row: 1,
        column: null,
        text: 'No ambient column. Columns found: time_s, plate_c, watts. Choose a column, or enter a fixed ambient. Without it there is no ΔT.',
      },
    ]);
  });
});
