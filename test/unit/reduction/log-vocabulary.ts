/** Words that loggers write, and how text becomes bytes. Names as in the trade; common practice, no source. */

export const HEATS = [
  'Heat source',
  'plate',
  'CPU Package',
  'Heater plate',
  'T_case',
  'Cold plate temp',
  'HeatSource',
  'Die',
];
export const AMBIENTS = [
  'Ambient',
  'T_amb',
  'Room temperature',
  'ambient temp',
  'Inlet air',
  'Umgebung',
  'Air in',
];
export const POWERS = ['Power', 'Heat load', 'Watts', 'heater power', 'CPU Package Power', 'Leistung'];
export const FANS = ['Fan', 'Fan speed', 'CPU fan', 'Lüfter'];
export const OTHERS = [
  'Voltage',
  'Setpoint',
  'Humidity',
  'Pump speed',
  'Note',
  'CPU usage',
  'Memory',
  'Core clock',
  'Outlet air',
  'Drive',
];
export const OTHER_UNITS = ['V', '°C', '%', '%', '', '%', 'MB', 'MHz', '°C', 'MB/s'];
export const NO_VALUES = ['', '', 'n/a', 'NaN', '-', '---', 'null', '#N/A', 'err'];
export const TITLES = [
  'Bench 2, north room',
  'Cooler: Tall fins',
  'Logger 3 serial 4471',
  'Recorded by the bench',
  '# comment',
  'Rate 1 Hz',
];

export const two = (n: number): string => String(n).padStart(2, '0');
export const hms = (s: number): string =>
  `${two(Math.floor(s / 3600))}:${two(Math.floor(s / 60) % 60)}:${two(s % 60)}`;

/** Text as the bytes of an encoding. */
export function encodeAs(text: string, encoding: string): Uint8Array {
  if (encoding === 'utf-8') return new TextEncoder().encode(text);
  if (encoding === 'utf-8 mark') return new TextEncoder().encode(`\ufeff${text}`);
  if (encoding === 'windows-1252') return Uint8Array.from(text, (c) => c.charCodeAt(0));
  const marked = encoding.endsWith('mark') ? `\ufeff${text}` : text;
  const bytes = Buffer.from(marked, 'utf16le');
  return new Uint8Array(encoding.startsWith('utf-16be') ? bytes.swap16() : bytes);
}
