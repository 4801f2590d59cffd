import { ColumnMap, FoundColumn, LogProblem } from '../../../shared/contracts/run-summary';
import { ReadingOptions, startReading } from '../../../shared/reduction';

/** Reads a table whose cells are given by column. */
function read(
  columns: Record<string, (i: number) => string | number>,
  options: ReadingOptions = {},
  rows = 900,
) {
  const names = Object.keys(columns);
  const lines = [names.join(';')];
  for (let i = 0; i < rows; i += 1) lines.push(names.map((name) => columns[name](i)).join(';'));
  const reading = startReading('run.csv', options);
  reading.write(new TextEncoder().encode(lines.join('\n') + '\n'));
  const { log, problems } = reading.end();
  return { log: log!, problems };
}

const warming = (i: number) => (62 - 38 * Math.exp(-i / 200)).toFixed(1);
const room = (i: number) => (22 + (i % 3) / 10).toFixed(1);
const watts = () => '180.0';
const time = (i: number) => i;
const named = (columns: readonly FoundColumn[], map: ColumnMap) => ({
  heatSource: map.heatSource === null ? null : columns[map.heatSource].header,
  ambient: map.ambient === null ? null : columns[map.ambient].header,
  watts: map.watts === null ? null : columns[map.watts].header,
  fanSpeed: map.fanSpeed === null ? null : columns[map.fanSpeed].header,
});
const codes = (problems: readonly LogProblem[]) => problems.map(({ code }) => code);

describe('columns are recognised', () => {
  it.each([
    ['time_s', 'plate_c', 'ambient_c', 'watts', 'fan_rpm'],
    ['Elapsed [s]', 'CPU Package [°C]', 'Ambient [°C]', 'CPU Package Power [W]', 'CPU fan [RPM]'],
    ['t (s)', 'T_heater (C)', 'T_amb (C)', 'P (W)', 'n (1/min)'],
    ['Zeit in s', 'Heizer in °C', 'Umgebung in °C', 'Leistung in W', 'Lüfterdrehzahl in U/min'],
    ['seconds', 'Cold plate temp °C', 'Room temp °C', 'Heat load, W', 'Fan speed, rpm'],
    ['Time/s', 'Heat source/°C', 'Inlet air/°C', 'Heater power/W', 'Fan/rpm'],
    ['Time (sec)', 'HeatSource(degC)', 'AmbientTemp(degC)', 'Power(Watts)', 'Tach(rpm)'],
    ['Temps (s)', 'Source chaude (°C)', 'Ambiante (°C)', 'Puissance (W)', 'Ventilateur (tr/min)'],
  ])('by headers: %s; %s; %s; %s; %s', (...headers) => {
    const cells = [time, warming, room, watts, () => '1200'];
    const { log, problems } = read(Object.fromEntries(headers.map((header, k) => [header, cells[k]])));
    expect(problems).toEqual([]);
    expect(log.columnMap).toEqual({ time: 0, heatSource: 1, ambient: 2, watts: 3, fanSpeed: 4 });
    expect(log.columns.map(({ role }) => role)).toEqual([
      'time',
      'heat source',
      'ambient',
      'watts',
      'fan speed',
    ]);
    log.columns.forEach(({ reason }) => expect(reason).toMatch(/^Header “.+” names|^Header “.+”; unit/));
  });

  it('and not taken for what they only resemble', () => {
    const { log, problems } = read({
      time_s: time,
      'CPU setpoint (°C)': () => '70',
      'Heat source (°C)': warming,
      'Heat source limit (°C)': () => '95',
      'Heat source max (°C)': () => '62.3',
      'Exhaust air (°C)': (i) => (30 + i / 900).toFixed(1),
      'Ambient (°C)': room,
      'Ambient humidity (%)': () => '41',
      'CPU load (%)': () => '100',
      'Heat load (W)': watts,
      'Fan duty (%)': () => '55',
      'Pump (rpm)': () => '2800',
      'Fan (rpm)': () => '1200',
    });
    expect(problems).toEqual([]);
    expect(named(log.columns, log.columnMap)).toEqual({
      heatSource: 'Heat source (°C)',
      ambient: 'Ambient (°C)',
      watts: 'Heat load (W)',
      fanSpeed: 'Fan (rpm)',
    });
  });

  it('by behaviour where headers are silent and the readings tell, with the reason in words', () => {
    const { log, problems } = read({ time_s: time, 'T1 (°C)': room, 'T2 (°C)': warming });
    expect(problems).toEqual([]);
    expect(log.columnMap).toMatchObject({ heatSource: 2, ambient: 1 });
    expect(log.columns[2].reason.replaceAll('\u00a0', ' ')).toMatch(
      /^Warmest temperature at the end, 61\.\d °C, 39\.\d °C above “T1 \(°C\)”/,
    );
    expect(log.columns[1].reason.replaceAll('\u00a0', ' ')).toMatch(
      /^Stays near 22\.1 °C while the heat source goes to 61\.\d °C/,
    );
  });

  it('not by guessing: two temperatures that end alike are asked about', () => {
    const { log, problems } = read({
      time_s: time,
      'T1 (°C)': warming,
      'T2 (°C)': warming,
      'Ambient (°C)': room,
    });
    expect(log.columnMap).toMatchObject({ heatSource: null, ambient: 3 });
    expect(codes(problems)).toEqual(['heat-source-unclear']);
  });

  it('by the one fan header that turns, and asks between two that do', () => {
    const columns = {
      time_s: time,
      plate_c: warming,
      ambient_c: room,
      'Fan 1 (rpm)': () => '0',
      'Fan 2 (rpm)': () => '1200',
    };
    const one = read(columns);
    expect(one.problems).toEqual([]);
    expect(one.log.columnMap.fanSpeed).toBe(4);
    const two = read({ ...columns, 'Fan 1 (rpm)': () => '900' });
    expect(codes(two.problems)).toEqual(['fan-speed-unclear']);
  });

  it('in °F and kW as well, converted', () => {
    const { log } = read({
      time_min: (i) => (i / 60).toFixed(4),
      'plate (°F)': () => '143.6',
      'ambient (°F)': () => '71.6',
      'power (kW)': () => '0.18',
    });
    expect(log.seconds[600]).toBeCloseTo(600, 1);
    expect(log.kept.get(1)![0]).toBeCloseTo(62, 12);
    expect(log.kept.get(2)![0]).toBeCloseTo(22, 12);
    expect(log.kept.get(3)![0]).toBeCloseTo(180, 12);
  });
});

describe('columns chosen by hand', () => {
  const columns = {
    time_s: time,
    'core 0 (°C)': warming,
    'core 1 (°C)': warming,
    'inlet (°C)': room,
    'room (°C)': room,
  };

  it('are taken as chosen, and nothing is added to them', () => {
    const columnMap = { time: 0, heatSource: 2, ambient: 4, watts: null, fanSpeed: null };
    const { log, problems } = read(columns, { columnMap });
    expect(problems).toEqual([]);
    expect(log.columnMap).toEqual(columnMap);
    expect(log.columns[2]).toMatchObject({ role: 'heat source', reason: 'Chosen; unit °C.' });
    expect([...log.kept.keys()].sort()).toEqual([2, 4]);
  });
});

describe('decimal marks', () => {
  it.each([
    ['45,3', 45.3],
    ['45,125', 45.125],
    ['1.045,5', null],
    ['45.3', 45.3],
    ['+45.30', 45.3],
    ['4.53e1', 45.3],
    ['45.3 °C', 45.3],
    ['−5,5', -5.5],
  ])('of a temperature written %s', (cell, value) => {
    const { log, problems } = read({
      time_s: time,
      plate_c: () => cell,
      ambient_c: () => cell.replace(/\d+/, '22'),
    });
    if (value === null) expect(codes(problems)).toContain('heat-source-unreadable');
    else expect(log.kept.get(1)![0]).toBe(value);
  });

  it('1,200 is twelve hundred beside decimal points, and left unread where nothing tells', () => {
    const beside = read({ time_s: time, plate_c: warming, ambient_c: room, 'power (W)': () => '1,200' });
    expect(beside.log.kept.get(3)![0]).toBe(1200);
    const alone = read({
      time_s: time,
      plate_c: () => '62',
      ambient_c: () => '22',
      'power (W)': () => '1,200',
    });
    expect(codes(alone.problems)).toEqual(['watts-unreadable']);
    expect(alone.problems[0].text).toMatch(/“1,200”/);
  });
});
