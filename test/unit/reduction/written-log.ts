import {
  AMBIENTS,
  FANS,
  HEATS,
  NO_VALUES,
  OTHERS,
  OTHER_UNITS,
  POWERS,
  TITLES,
  encodeAs,
  hms,
} from './log-vocabulary';
import { Random } from './random';

/** A log written at random, with what its reader must find in it. */
export interface WrittenLog {
  readonly bytes: Uint8Array;
  /** What was varied, for a failure's message. */
  readonly variation: Readonly<Record<string, unknown>>;
  readonly seconds: readonly number[];
  /** NaN where the cell holds no value. */
  readonly heat: readonly number[];
  readonly ambient: readonly number[];
  readonly watts: readonly number[] | null;
  readonly fan: readonly number[] | null;
  /** Physical row of each reading. */
  readonly rows: readonly number[];
  readonly positions: {
    time: number;
    heatSource: number;
    ambient: number;
    watts: number | null;
    fanSpeed: number | null;
  };
  readonly startedAt: string | null;
  /** Codes of the problems a reader must raise. */
  readonly problems: readonly string[];
}

type TimeForm =
  | 'seconds'
  | 'milliseconds'
  | 'minutes'
  | 'stopwatch'
  | 'clock'
  | 'stamp iso'
  | 'stamp T'
  | 'stamp day first'
  | 'stamp month first'
  | 'apart';

interface Column {
  readonly role: 'time' | 'date' | 'heat' | 'ambient' | 'watts' | 'fan' | 'other';
  readonly header: string;
  readonly unit: string;
  readonly cell: (i: number) => string;
}

/** Writes a log by chance: every choice of dialect that a reader must bear, combined as the seed says. */
export function writtenLog(seed: number): WrittenLog {
  const r = new Random(seed);
  const delimiter = r.pick([',', ';', '\t', ',', ';', '|']);
  const comma = delimiter === ',' ? r.chance(0.15) : r.chance(0.4);
  const newline = r.pick(['\n', '\r\n', '\n', '\r']);
  const encoding = r.pick([
    'utf-8',
    'utf-8',
    'utf-8 mark',
    'utf-16le mark',
    'utf-16be mark',
    'utf-16le',
    'windows-1252',
  ]);
  // Comma decimals among comma delimiters have to be quoted to be told apart.
  const quoting = comma && delimiter === ',' ? 'all' : r.pick(['none', 'none', 'texts', 'all']);
  const decimals = r.pick([1, 1, 2, 3, 4]);
  const padding = r.chance(0.15) && delimiter !== '\t' ? ' ' : '';
  const form = r.pick<TimeForm>([
    'seconds',
    'seconds',
    'milliseconds',
    'minutes',
    'stopwatch',
    'clock',
    'stamp iso',
    'stamp T',
    'stamp day first',
    'stamp month first',
    'apart',
  ]);
  const extra = r.pick([0, 0, 0, 1, 1, 3, 3, 10, 10, 40, 120, 395]);
  // The widest tables are kept short: it is their width that is to be tried.
  const n = extra > 100 ? r.whole(60, 90) : r.whole(120, 300);
  const whole = !['seconds', 'milliseconds', 'minutes'].includes(form);
  const step = r.pick([1, 1, 2, 5]);
  const irregular = r.chance(0.3);
  const seconds: number[] = [0];
  for (let i = 1; i < n; i += 1) {
    let dt = irregular ? step * r.pick([1, 1, 2, 3]) : step;
    if (!whole && irregular) dt += r.whole(0, 9) / 10;
    if (r.chance(0.005)) dt += r.whole(30, 90);
    seconds.push(Math.round((seconds[i - 1] + dt) * 1000) / 1000);
  }
  const startClock = r.chance(0.3) ? 86400 - r.whole(20, 140) : r.whole(0, 80000);
  const day = r.pick([20521, 20527, 20609, 20454, 20512]);
  const unitPlace = r.pick(['brackets', 'parentheses', 'comma', 'row', 'suffix', 'row']);
  const fahrenheit = r.chance(0.08);

  const dayOf = (i: number): number => day + Math.floor((startClock + seconds[i]) / 86400);
  const clockOf = (i: number): string => hms((startClock + seconds[i]) % 86400);
  const dateOf = (i: number, order: 'iso' | 'dots' | 'slashes'): string => {
    const [y, m, d] = new Date(dayOf(i) * 86400000).toISOString().slice(0, 10).split('-');
    return order === 'iso'
      ? `${y}-${m}-${d}`
      : order === 'dots'
        ? `${d}.${m}.${y}`
        : `${Number(m)}/${Number(d)}/${y}`;
  };
  const halfDay = (i: number): string => {
    const s = (startClock + seconds[i]) % 86400;
    const h = Math.floor(s / 3600);
    return `${h % 12 === 0 ? 12 : h % 12}:${hms(s).slice(3)} ${h < 12 ? 'AM' : 'PM'}`;
  };
  const number = (value: number, places: number): string => {
    const text = value.toFixed(places);
    return comma ? text.replace('.', ',') : text;
  };
  const parsed = (text: string): number => Number(text.replace(',', '.'));

  const course = (from: number, to: number, tau: number, noise: number) =>
    seconds.map((t) => to + (from - to) * Math.exp(-t / tau) + noise * r.normal());
  const blanks = r.chance(0.4) ? r.pick([0.01, 0.05]) : 0;
  const toCells = (values: number[], places: number): string[] =>
    values.map((value) => (blanks > 0 && r.chance(blanks) ? r.pick(NO_VALUES) : number(value, places)));
  const fromCell = (cell: string): number => (/\d/.test(cell) ? parsed(cell) : NaN);
  const asRead = (cells: string[]): number[] => cells.map(fromCell);
  const degrees = (values: number[]) => (fahrenheit ? values.map((value) => value * 1.8 + 32) : values);
  const celsius = (values: number[]) =>
    fahrenheit ? values.map((value) => value * (5 / 9) + -160 / 9) : values;

  const heatCells = toCells(degrees(course(24, 62, 120, 0.2)), decimals);
  const every = r.chance(0.15) ? r.whole(2, 5) : 1;
  const ambientCells = toCells(degrees(course(22, 22.4, 500, 0.05)), decimals).map((cell, i) =>
    i % every === 0 ? cell : '',
  );
  const powerCells = toCells(course(180, 180, 1, 0.3), 1);
  const fanCells = toCells(course(1200, 1200, 1, 5), 0);
  const kelvin = fahrenheit ? 'F' : 'C';
  const degree = encoding === 'windows-1252' || r.chance(0.7) ? `°${kelvin}` : `deg${kelvin}`;

  const timeColumns = (): Column[] => {
    const column = (
      role: 'time' | 'date',
      header: string,
      unit: string,
      cell: (i: number) => string,
    ): Column => ({ role, header, unit, cell });
    switch (form) {
      case 'seconds':
        return [
          column('time', r.pick(['Time', 'Elapsed', 't', 'Zeit']), 's', (i) =>
            number(seconds[i], irregular ? 1 : 0),
          ),
        ];
      case 'milliseconds':
        return [column('time', 'Time', 'ms', (i) => String(Math.round(seconds[i] * 1000)))];
      case 'minutes':
        return [column('time', 'Elapsed time', 'min', (i) => number(seconds[i] / 60, 5))];
      case 'stopwatch':
        return [column('time', 'Elapsed', '', (i) => hms(seconds[i]).replace(/^0/, ''))];
      case 'clock':
        return [column('time', r.pick(['Time', 'Uhrzeit', 'Clock']), '', clockOf)];
      case 'stamp iso':
        return [column('time', 'Timestamp', '', (i) => `${dateOf(i, 'iso')} ${clockOf(i)}`)];
      case 'stamp T':
        return [column('time', 'Date time', '', (i) => `${dateOf(i, 'iso')}T${clockOf(i)}+01:00`)];
      case 'stamp day first':
        return [column('time', 'Datum', '', (i) => `${dateOf(i, 'dots')} ${clockOf(i)}`)];
      case 'stamp month first':
        return [column('time', 'Time', '', (i) => `${dateOf(i, 'slashes')} ${halfDay(i)}`)];
      default:
        return [column('date', 'Date', '', (i) => dateOf(i, 'dots')), column('time', 'Time', '', clockOf)];
    }
  };
  const withPower = r.chance(0.85);
  const withFan = r.chance(0.7);
  const columns: Column[] = [
    { role: 'heat', header: r.pick(HEATS), unit: degree, cell: (i) => heatCells[i] },
    { role: 'ambient', header: r.pick(AMBIENTS), unit: degree, cell: (i) => ambientCells[i] },
  ];
  if (withPower)
    columns.push({ role: 'watts', header: r.pick(POWERS), unit: 'W', cell: (i) => powerCells[i] });
  if (withFan)
    columns.push({
      role: 'fan',
      header: r.pick(FANS.slice(0, encoding.startsWith('utf') || encoding === 'windows-1252' ? 4 : 3)),
      unit: 'rpm',
      cell: (i) => fanCells[i],
    });
  for (let e = 0; e < extra; e += 1) {
    const k = r.whole(0, OTHERS.length - 1);
    const kind = OTHERS[k] === 'Note' ? 'text' : r.pick(['number', 'number', 'number', 'blank']);
    columns.push({
      role: 'other',
      header: r.chance(0.5) ? OTHERS[k] : `${OTHERS[k]} ${e + 1}`,
      unit: OTHER_UNITS[k],
      cell: (i) =>
        kind === 'text'
          ? r.pick(['ok', 'steady', ''])
          : kind === 'blank'
            ? ''
            : number(10 + ((i * 7 + e) % 50) / 3, 2),
    });
  }
  const table = [...timeColumns(), ...r.shuffled(columns)];

  const headerOf = ({ header, unit }: Column): string => {
    if (unit === '' || unitPlace === 'row') return header;
    if (unitPlace === 'brackets') return `${header} [${unit}]`;
    if (unitPlace === 'comma' && delimiter !== ',') return `${header}, ${unit}`;
    if (unitPlace === 'suffix')
      return `${header.replace(/ /g, '_')}_${unit.replace('°', 'deg').toLowerCase()}`;
    return `${header} (${unit})`;
  };
  const cellText = (cell: string, isText: boolean): string => {
    if (quoting === 'all' || (quoting === 'texts' && isText)) return `"${cell}"`;
    return padding !== '' && !isText ? padding + cell : cell;
  };
  const trailing = r.chance(0.2) ? delimiter : '';
  const lineOf = (cells: string[], texts: boolean): string =>
    cells.map((cell) => cellText(cell, texts)).join(delimiter) + trailing;
  const lines: string[] = [];
  const titles = r.pick([0, 0, 1, 2, 4]);
  for (let t = 0; t < titles; t += 1) {
    const title = r.pick(TITLES);
    lines.push(r.chance(0.2) ? '' : title.includes(delimiter) ? `"${title}"` : title);
  }
  const header = lineOf(table.map(headerOf), true);
  lines.push(header);
  if (unitPlace === 'row')
    lines.push(
      lineOf(
        table.map((column) => column.unit),
        true,
      ),
    );
  if (r.chance(0.1)) lines.push('');

  const rows: number[] = [];
  const again = r.chance(0.15) ? r.whole(20, n - 20) : -1;
  const between = r.chance(0.1) ? r.whole(5, n - 5) : -1;
  for (let i = 0; i < n; i += 1) {
    if (i === again) lines.push(header);
    if (i === between) lines.push('');
    lines.push(
      lineOf(
        table.map((column) => column.cell(i)),
        false,
      ),
    );
    rows.push(lines.length);
  }
  const ending = r.pick(['none', 'none', 'header', 'totals', 'cut', 'blank']);
  if (ending === 'header') lines.push(header);
  if (ending === 'totals') {
    for (const word of ['Minimum', 'Maximum', 'Average']) {
      lines.push(
        lineOf(
          table.map((column, c) =>
            c === 0 ? word : column.role === 'date' || column.role === 'time' ? '' : number(40, 2),
          ),
          false,
        ),
      );
    }
  }
  if (ending === 'blank') lines.push('', '');
  let text = lines.join(newline) + (r.chance(0.8) || ending === 'cut' ? newline : '');
  // Cut inside the first cell, so that what is left of the row can hold no reading.
  if (ending === 'cut') text += '"1'.slice(quoting === 'all' ? 0 : 1).slice(quoting === 'all' ? 1 : 0);

  const positionOf = (role: Column['role']): number | null => {
    const at = table.findIndex((column) => column.role === role);
    return at === -1 ? null : at;
  };
  const dated = form.startsWith('stamp') || form === 'apart';
  // 3/9/2026 alone may be March or September; followed by 3/10/2026 it is March.
  const twoWays =
    form === 'stamp month first' &&
    dayOf(0) === dayOf(n - 1) &&
    new Date(day * 86400000).getUTCDate() <= 12 &&
    new Date(day * 86400000).getUTCDate() !== new Date(day * 86400000).getUTCMonth() + 1;
  return {
    bytes: encodeAs(text, encoding),
    variation: {
      seed,
      delimiter,
      comma,
      newline,
      encoding,
      quoting,
      decimals,
      padding,
      form,
      n,
      step,
      irregular,
      unitPlace,
      fahrenheit,
      extra,
      titles,
      again,
      between,
      ending,
      trailing,
      every,
      blanks,
    },
    seconds,
    heat: celsius(asRead(heatCells)),
    ambient: celsius(asRead(ambientCells)),
    watts: withPower ? asRead(powerCells) : null,
    fan: withFan ? asRead(fanCells) : null,
    rows,
    positions: {
      time: positionOf('time')!,
      heatSource: positionOf('heat')!,
      ambient: positionOf('ambient')!,
      watts: positionOf('watts'),
      fanSpeed: positionOf('fan'),
    },
    problems: twoWays ? ['date-order-unclear'] : [],
    startedAt:
      dated && !twoWays ? `${new Date(day * 86400000).toISOString().slice(0, 10)}T${hms(startClock)}` : null,
  };
}
