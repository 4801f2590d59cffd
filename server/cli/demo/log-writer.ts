import type { Readings } from './bench-model';

/** How a logger writes its files. The demo's bench changed loggers twice, as benches do. */
export type Writing = 'plain' | 'lab recorder' | 'data logger' | 'spreadsheet';

export interface Moment {
  /** Days since 1970-01-01, and seconds of the day. */
  readonly day: number;
  readonly second: number;
}

const two = (value: number): string => String(value).padStart(2, '0');
const clockOf = (second: number): string =>
  `${two(Math.floor(second / 3600))}:${two(Math.floor(second / 60) % 60)}:${two(second % 60)}`;

/** Year, month and day of a day number, by way of a UTC date. */
function dateOf(day: number): { year: number; month: number; date: number } {
  const utc = new Date(day * 86400000);
  return { year: utc.getUTCFullYear(), month: utc.getUTCMonth() + 1, date: utc.getUTCDate() };
}

/** `2026-03-09T17:00:00`: a moment as the bench's own clock shows it. */
export function isoOf({ day, second }: Moment): string {
  const { year, month, date } = dateOf(day);
  return `${year}-${two(month)}-${two(date)}T${clockOf(second)}`;
}

const later = (start: Moment, seconds: number): Moment => {
  const total = start.second + seconds;
  return { day: start.day + Math.floor(total / 86400), second: total % 86400 };
};

const mean = (values: readonly number[]): number =>
  values.reduce((sum, value) => sum + value, 0) / values.length;

type Writer = (readings: Readings, start: Moment, decimals: number) => string;

const WRITERS: Record<Writing, Writer> = {
  /** Comma, seconds since a start that the first line tells. */
  plain: (r, start, decimals) =>
    [`# started ${isoOf(start)}`, 'time_s,plate_c,ambient_c,watts,fan_rpm']
      .concat(
        r.seconds.map((s, i) =>
          [
            s,
            r.plate[i].toFixed(decimals),
            r.ambient[i].toFixed(decimals),
            r.watts[i].toFixed(1),
            r.fan[i].toFixed(0),
          ].join(','),
        ),
      )
      .join('\n') + '\n',

  /** Semicolon and decimal comma, title lines, date and clock apart, units in a row of their own. */
  'lab recorder': (r, start, decimals) => {
    const comma = (value: number, digits: number) => value.toFixed(digits).replace('.', ',');
    const rows = r.seconds.map((s, i) => {
      const now = later(start, s);
      const { year, month, date } = dateOf(now.day);
      return [
        `${two(date)}.${two(month)}.${year}`,
        clockOf(now.second),
        comma(r.plate[i], decimals),
        comma(r.ambient[i], decimals),
        comma(r.watts[i], 1),
        r.fan[i].toFixed(0),
      ].join(';');
    });
    return (
      [
        'Lab recorder;bench 2',
        'Channels;4',
        '',
        'Date;Time;Plate;Ambient;Heat load;Fan',
        ';;°C;°C;W;rpm',
        ...rows,
      ].join('\r\n') + '\r\n'
    );
  },

  /** Tab, one time stamp a row, units in the header, a block of means at the end. */
  'data logger': (r, start, decimals) => {
    const rows = r.seconds.map((s, i) =>
      [
        isoOf(later(start, s)).replace('T', ' '),
        r.plate[i].toFixed(decimals),
        r.ambient[i].toFixed(decimals),
        r.watts[i].toFixed(1),
        r.fan[i].toFixed(0),
      ].join('\t'),
    );
    const means = [
      'Average',
      mean(r.plate).toFixed(2),
      mean(r.ambient).toFixed(2),
      mean(r.watts).toFixed(2),
      mean(r.fan).toFixed(0),
    ].join('\t');
    return (
      ['Timestamp\tHeat source [°C]\tAmbient [°C]\tPower [W]\tFan [rpm]', ...rows, '', means].join('\n') +
      '\n'
    );
  },

  /** Quoted cells, month first, the clock in halves of a day. */
  spreadsheet: (r, start, decimals) => {
    const rows = r.seconds.map((s, i) => {
      const now = later(start, s);
      const { year, month, date } = dateOf(now.day);
      const hours = Math.floor(now.second / 3600);
      const clock = `${hours % 12 === 0 ? 12 : hours % 12}:${clockOf(now.second).slice(3)} ${hours < 12 ? 'AM' : 'PM'}`;
      return `"${month}/${date}/${year}","${clock}",${r.plate[i].toFixed(decimals)},${r.ambient[i].toFixed(decimals)},${r.watts[i].toFixed(1)},${r.fan[i].toFixed(0)}`;
    });
    return (
      [
        '"Date","Time","Plate temperature (°C)","Room temperature (°C)","Power (W)","Fan speed (rpm)"',
        ...rows,
      ].join('\r\n') + '\r\n'
    );
  },
};

/** Bytes of Windows-1252 for text whose only letter beyond ASCII is the degree sign. */
const asWindows1252 = (text: string): Uint8Array =>
  Uint8Array.from(text, (letter) => (letter === '°' ? 0xb0 : letter.charCodeAt(0)));

/** Bytes of UTF-16, low byte first, with its mark. */
function asUtf16(text: string): Uint8Array {
  const bytes = new Uint8Array(2 + 2 * text.length);
  bytes.set([0xff, 0xfe]);
  for (let i = 0; i < text.length; i += 1) {
    bytes[2 + 2 * i] = text.charCodeAt(i) & 0xff;
    bytes[3 + 2 * i] = text.charCodeAt(i) >> 8;
  }
  return bytes;
}

/** Writes readings as one logger would. @param decimals of the temperatures */
export function writeLog(writing: Writing, readings: Readings, start: Moment, decimals: number): Uint8Array {
  const text = WRITERS[writing](readings, start, decimals);
  if (writing === 'lab recorder') return asWindows1252(text);
  return writing === 'data logger' ? asUtf16(text) : new TextEncoder().encode(text);
}
