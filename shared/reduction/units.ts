/** What a unit measures, as far as a log reader cares. */
export type Quantity = 'temperature' | 'power' | 'rotation' | 'time' | 'other';

export interface Unit {
  /** As shown to people. */
  readonly name: string;
  readonly quantity: Quantity;
  /** To °C, W, rpm or s: value · scale + shift. */
  readonly scale: number;
  readonly shift: number;
}

const unit = (name: string, quantity: Quantity, scale = 1, shift = 0): Unit => ({
  name,
  quantity,
  scale,
  shift,
});

const CELSIUS = unit('°C', 'temperature');
const FAHRENHEIT = unit('°F', 'temperature', 5 / 9, -160 / 9);
const KELVIN = unit('K', 'temperature', 1, -273.15);
const WATT = unit('W', 'power');
const RPM = unit('rpm', 'rotation');
const SECOND = unit('s', 'time');
const MINUTE = unit('min', 'time', 60);
const HOUR = unit('h', 'time', 3600);
const MILLISECOND = unit('ms', 'time', 0.001);

const other = (...names: string[]): [string, Unit][] =>
  names.map((name) => [name.toLowerCase(), unit(name, 'other')]);

/** Ways units are written, in lower case (common practice, no source). */
const WRITTEN = new Map<string, Unit>([
  ...['°c', 'ºc', '℃', 'degc', 'deg c', 'deg. c', 'c', 'celsius', 'â°c', '� c', '�c', 'grad c', '° c'].map(
    (text): [string, Unit] => [text, CELSIUS],
  ),
  ...['°f', 'ºf', '℉', 'degf', 'deg f', 'f', 'fahrenheit', 'â°f', '�f'].map((text): [string, Unit] => [
    text,
    FAHRENHEIT,
  ]),
  ...['k', 'kelvin'].map((text): [string, Unit] => [text, KELVIN]),
  ...['w', 'watt', 'watts'].map((text): [string, Unit] => [text, WATT]),
  ['mw', unit('mW', 'power', 0.001)],
  ['kw', unit('kW', 'power', 1000)],
  ...['rpm', 'r/min', '1/min', 'min-1', 'min^-1', 'min⁻¹', 'u/min', 'tr/min'].map((text): [string, Unit] => [
    text,
    RPM,
  ]),
  ...['s', 'sec', 'secs', 'second', 'seconds', 'sek', 'sekunden', 'secondes'].map((text): [string, Unit] => [
    text,
    SECOND,
  ]),
  ...['min', 'mins', 'minute', 'minutes', 'minuten'].map((text): [string, Unit] => [text, MINUTE]),
  ...['h', 'hr', 'hrs', 'hour', 'hours'].map((text): [string, Unit] => [text, HOUR]),
  ...['ms', 'msec', 'millis', 'milliseconds'].map((text): [string, Unit] => [text, MILLISECOND]),
  ...other(
    '%',
    'V',
    'mV',
    'A',
    'mA',
    'MHz',
    'GHz',
    'Hz',
    'MB',
    'GB',
    'kB',
    'MB/s',
    'kB/s',
    'J',
    'Wh',
    'kWh',
    'dB',
    'dBA',
    'Pa',
    'hPa',
  ),
  ...other(
    'm/s',
    'l/h',
    'l/min',
    'x',
    'FPS',
    'Yes/No',
    'mm',
    '%RH',
    'K/W',
    '°C/W',
    'Ω',
    'ohm',
    '-',
    '–',
    'count',
    'T',
    'V DC',
  ),
  ...other(
    'hh:mm:ss',
    'h:mm:ss',
    'mm:ss',
    'hh:mm',
    'yyyy-mm-dd',
    'dd.mm.yyyy',
    'dd/mm/yyyy',
    'mm/dd/yyyy',
    'date',
    'time',
    'text',
  ),
]);

/** The unit a piece of text names, or null. Case does not matter but for M and m, which no unit here mixes up. */
export function unitOf(text: string): Unit | null {
  const bare = text
    .trim()
    .replace(/^[[({<]\s*|\s*[\])}>]$/g, '')
    .trim()
    .toLowerCase();
  return bare === '' ? null : (WRITTEN.get(bare) ?? null);
}

/** A header taken apart: `CPU (°C)`, `plate_c`, `Power, W`, `Fan [rpm]`, `t/s`. */
export interface HeaderParts {
  readonly words: string;
  readonly unit: Unit | null;
}

/** The last brackets of a header, and what follows them. */
const BRACKETED = /^(.*)[[({]\s*([^[\](){}]+?)\s*[\])}]([^[\](){}]*)$/;
/** The last word of a header and what parts it from the others: first units with a stroke of their own, such as 1/min. */
const TAILS = [
  /^(.*?)(\s*[,;:|]\s*|\s+in\s+|[\s_]+)([^\s_,;:|()[\]]*\/[^\s_,;:|()[\]]+|deg\.? [cf])$/i,
  /^(.*)(\s*[,;/:|]\s*|[\s_]+)([^\s_,;:|/()[\]]+)$/i,
];

/** Splits a header into its words and its unit, where it names one. */
export function splitHeader(header: string): HeaderParts {
  const text = header.trim();
  const bracketed = BRACKETED.exec(text);
  if (bracketed) {
    const found = unitOf(bracketed[2]);
    if (found) return { words: `${bracketed[1]} ${bracketed[3]}`.trim(), unit: found };
    // `CPU (Tctl) °C`: the brackets hold something else.
  }
  for (const pattern of TAILS) {
    const tail = pattern.exec(text);
    const found = tail ? unitOf(tail[3]) : null;
    if (!tail || !found) continue;
    // `Probe A` and `Probe K` name a probe: behind a mere space only the commonest letters are units.
    const letterOfName = /^\s+$/.test(tail[2]) && /^[abd-rt-vx-z]$/i.test(tail[3]) && !/\sin$/i.test(tail[1]);
    // `Fan time` or `Start date` end in a word that is a name, not a unit.
    if (!letterOfName && !['time', 'date', 'text', 'count'].includes(found.name)) {
      return { words: tail[1].replace(/\s+in$/i, '').trim(), unit: found };
    }
  }
  const whole = unitOf(text);
  // A header that is nothing but a unit still names its quantity: `°C`, `rpm`, `Watts`, `seconds`.
  if (whole && whole.quantity !== 'other') return { words: text, unit: whole };
  const joined = /^(.*[a-z])(RPM|Watts?|°C|℃)$/.exec(text);
  return joined ? { words: joined[1], unit: unitOf(joined[2]) } : { words: text, unit: null };
}
