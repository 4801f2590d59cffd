import { ReadingOptions, reduceRun, startReading } from '../../../shared/reduction';

/** A log whose time cells are given. */
function read(times: readonly string[], header = 'time', options: ReadingOptions = {}) {
  const reading = startReading('run.csv', options);
  const rows = times.map((time, i) => `${time};${(62 + (i % 3) / 10).toFixed(1)};22.0`);
  reading.write(new TextEncoder().encode([`${header};plate_c;ambient_c`, ...rows].join('\n') + '\n'));
  const { log, problems } = reading.end();
  return { log: log!, problems, codes: problems.map(({ code }) => code) };
}

const two = (n: number) => String(n).padStart(2, '0');
const clock = (s: number) =>
  `${two(Math.floor(s / 3600) % 24)}:${two(Math.floor(s / 60) % 60)}:${two(s % 60)}`;
const every = (n: number, text: (i: number) => string) => Array.from({ length: n }, (_, i) => text(i));

describe('times', () => {
  it('of a clock run through midnight', () => {
    const { log, problems } = read(every(1800, (i) => clock(86400 - 600 + i)));
    expect(problems).toEqual([]);
    expect([...log.seconds.subarray(598, 603)]).toEqual([598, 599, 600, 601, 602]);
    expect(log.startedAt).toBeNull();
    expect(log.findings).toEqual([]);
  });

  it('of a twelve-hour clock without AM or PM run through one o’clock', () => {
    const half = (s: number) =>
      `${Math.floor(s / 3600) % 12 === 0 ? 12 : Math.floor(s / 3600) % 12}${clock(s).slice(2)}`;
    const { log } = read(every(1200, (i) => half(12 * 3600 + 3600 - 300 + i)));
    expect(log.seconds[1199]).toBe(1199);
  });

  it('of a stopwatch past its first day', () => {
    const { log } = read(
      every(1200, (i) => `23:${two(50 + Math.floor(i / 60))}:${two(i % 60)}`)
        .slice(0, 600)
        .concat(every(600, (i) => `24:${two(Math.floor(i / 60))}:${two(i % 60)}`)),
    );
    expect(log.seconds[1199]).toBe(1199);
  });

  it('of minutes and seconds past an hour need no unit', () => {
    const { log, problems } = read(every(4000, (i) => `${Math.floor(i / 60)}:${two(i % 60)}`));
    expect(problems).toEqual([]);
    expect(log.seconds[3999]).toBe(3999);
  });

  it('of minutes and seconds under an hour are asked about, and read once chosen', () => {
    const times = every(1380, (i) => `${two(Math.floor(i / 60))}:${two(i % 60)}`);
    expect(read(times).codes).toEqual(['time-unit-unclear']);
    const chosen = read(times, 'time', {
      columnMap: { time: 0, heatSource: 1, ambient: 2, watts: null, fanSpeed: null },
    });
    expect(chosen.problems).toEqual([]);
    expect(chosen.log.seconds[1379]).toBe(1379);
    expect(read(times, 'time (mm:ss)').log.seconds[1379]).toBe(1379);
  });

  it('of day and month that could be either are left open, and settled by a later date or by answer', () => {
    const onOneDay = every(900, (i) => `03/04/2026 ${clock(36000 + i)}`);
    const open = read(onOneDay);
    expect(open.codes).toEqual(['date-order-unclear']);
    expect(open.problems[0]).toMatchObject({ row: 2, column: 'time' });
    expect(open.log.startedAt).toBeNull();
    expect(open.log.seconds[899]).toBe(899);
    expect(read(onOneDay, 'time', { dateOrder: 'day first' }).log.startedAt).toBe('2026-04-03T10:00:00');
    expect(read(onOneDay, 'time', { dateOrder: 'month first' }).log.startedAt).toBe('2026-03-04T10:00:00');
    const dayFirst = every(900, (i) => `${i < 300 ? '03/04/2026' : '04/04/2026'} ${clock(86100 + i)}`);
    expect(read(dayFirst).log.startedAt).toBe('2026-04-03T23:55:00');
    const monthFirst = every(900, (i) => `${i < 300 ? '03/04/2026' : '03/05/2026'} ${clock(86100 + i)}`);
    expect(read(monthFirst).log.startedAt).toBe('2026-03-04T23:55:00');
    expect(read(monthFirst).log.seconds[899]).toBe(899);
  });

  it.each([
    ['2026-02-28T23:59:50', '2026-03-01T00:00:05', 15],
    ['2028-02-28T23:59:50', '2028-02-29T00:00:05', 15],
    ['31.12.2026 23:59:50', '01.01.2027 00:00:05', 15],
    ['12-Mar-2026 09:00:00', '12-Mar-2026 09:20:00', 1200],
    ['Mar 12, 2026 09:00:00', 'Mar 12, 2026 09:20:00', 1200],
    ['2026-03-29T01:59:50+01:00', '2026-03-29T03:00:05+02:00', 15],
    ['2026-03-12 09:00:00.250', '2026-03-12 09:00:10.750', 10.5],
    ['12/03/26 9:00:00 PM', '12/03/26 9:20:00 PM', 1200],
  ])('from %s to %s is %d s', (first, last, length) => {
    const { log } = read([first, last]);
    expect(log.seconds[1]).toBeCloseTo(length, 6);
  });

  it.each([
    ['1772442000', 1, '2026-03-02T09:00:00'],
    ['1772442000000', 1000, '2026-03-02T09:00:00'],
  ])('counted from 1970 as %s', (start, perSecond, startedAt) => {
    const { log } = read(
      every(900, (i) => String(Number(start) + i * perSecond)),
      'timestamp',
    );
    expect(log.seconds[899]).toBe(899);
    expect(log.startedAt).toBe(startedAt);
  });

  it('counted in days by a spreadsheet', () => {
    const { log } = read(
      every(900, (i) => (46083.375 + i / 86400).toFixed(8)),
      'time',
    );
    expect(log.seconds[899]).toBeCloseTo(899, 2);
    expect(log.startedAt).toBe('2026-03-02T09:00:00');
  });

  it('summer time ending on a wall clock is told, and the run goes on', () => {
    const { log } = read(
      every(1200, (i) => `2026-10-25 ${clock(3 * 3600 - 600 + i - (i >= 600 ? 3600 : 0))}`),
    );
    expect(log.seconds[1199]).toBe(1199);
    expect(log.findings.map(({ code }) => code)).toEqual(['clock-set-back']);
  });

  it.each([
    ['# started 2026-05-18T09:30:00', '2026-05-18T09:30:00'],
    ['Start: 18.05.2026; 9:30', '2026-05-18T09:30:00'],
    ['Date 05/18/2026 9:30:00 PM', '2026-05-18T21:30:00'],
    ['Start: 03/04/2026 09:30', null],
    ['Exported 2026-05-19 08:00, start of the week', null],
    ['Calibrated 2025-01-01 12:00:00', null],
    ['Bench 2, north room', null],
  ])('of mere seconds start when a title says so: %s', (title, startedAt) => {
    const reading = startReading('run.csv');
    const rows = every(700, (i) => `${i};62.${i % 3};22.0`);
    reading.write(new TextEncoder().encode([title, 'time_s;plate_c;ambient_c', ...rows].join('\n')));
    const { log, problems } = reading.end();
    expect(problems).toEqual([]);
    expect(log!.startedAt).toBe(startedAt);
  });

  it('of a clock to the minute are spread inside each minute', () => {
    const { log } = read(every(1800, (i) => clock(33000 + i + 23).slice(0, 5)));
    expect(log.findings.map(({ code }) => code)).toEqual(['coarse-clock']);
    const off = log.seconds.map((s, i) => Math.abs(s - i));
    expect(Math.max(...off)).toBeLessThan(2);
    expect(
      reduceRun(log, { columnMap: null, fixedAmbient: null, window: null, nominalWatts: null }).summary!
        .window.settled,
    ).toBe('settled');
  });
});
