/** Words loggers write when there is no value (common practice, no source). Compared in lower case, trimmed. */
const NO_VALUE = new Set([
  '',
  '-',
  '--',
  '---',
  '----',
  '–',
  '—',
  '?',
  '*',
  '.',
  'n/a',
  '#n/a',
  'na',
  'n.a.',
  'nan',
  '#nan',
  '-nan',
  'null',
  'nil',
  'none',
  'no value',
  'no data',
  'nodata',
  'no reading',
  'missing',
  'unknown',
  'invalid',
  'undefined',
  'not available',
  'error',
  'err',
  '#err',
  '#error',
  'fault',
  'fail',
  'ol',
  'open',
  'overload',
  'overflow',
  'over',
  'under',
  'overrange',
  '#value!',
  '#div/0!',
  '#ref!',
  '#num!',
  'inf',
  '+inf',
  '-inf',
  'infinity',
  '-infinity',
  'disconnected',
  'offline',
  'leer',
  'fehlt',
]);

/** Whether a cell says that there is no value. */
export const isNoValue = (cell: string): boolean => NO_VALUE.has(cell.trim().toLowerCase());

export type DecimalMark = '.' | ',' | 'either';

const PLAIN = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,3})?$/;
const COMMA = /^[+-]?(?:\d+,?\d*|,\d+)(?:[eE][+-]?\d{1,3})?$/;
const COMMA_GROUPS = /^[+-]?\d{1,3}(?:,\d{3})+(?:\.\d*)?$/;
const DOT_GROUPS = /^[+-]?\d{1,3}(?:\.\d{3})+(?:,\d*)?$/;
const SPACE_GROUPS = /^[+-]?\d{1,3}(?:[ \u00a0\u202f'’]\d{3})+(?:[.,]\d*)?$/;
/** A unit written behind each number. */
const TRAILING_UNIT = /\s*(?:°\s?[CFK]|º\s?[CF]|℃|℉|deg\s?[CF]?|mW|kW|[WwCFKs]|rpm|RPM|ms|sec|min|°)$/;

/**
 * Reads one cell as a number; NaN when it is not one.
 * @param decimal the column's decimal mark; the other mark is then accepted only as a thousands mark.
 *   With `either`, whichever mark the cell has is its decimal mark, but `1,200` is refused as unclear.
 */
export function parseNumber(cell: string, decimal: DecimalMark): number {
  let text = cell.trim();
  if (text === '') return NaN;
  if (text.charCodeAt(0) === 0x2212) text = '-' + text.slice(1);
  if (decimal !== ',' && PLAIN.test(text)) return Number(text);
  if (decimal !== '.' && COMMA.test(text) && !(decimal === 'either' && COMMA_GROUPS.test(text))) {
    return Number(text.replace(',', '.'));
  }
  if (decimal === '.' && COMMA_GROUPS.test(text)) return Number(text.replaceAll(',', ''));
  if (decimal === ',' && DOT_GROUPS.test(text)) return Number(text.replaceAll('.', '').replace(',', '.'));
  if (SPACE_GROUPS.test(text)) return Number(text.replace(/[ \u00a0\u202f'’]/g, '').replace(',', '.'));
  const bare = text.replace(TRAILING_UNIT, '');
  return bare.length < text.length ? parseNumber(bare, decimal) : NaN;
}

/** Powers of ten that a double holds exactly. */
const TENS = Array.from({ length: 23 }, (_, i) => Number(`1e${i}`));

/**
 * Reads a plain decimal straight out of a file's bytes, without making a string of it; NaN when the cell is anything else.
 * Whole part and fraction are read as one integer and divided by a power of ten. Both are exact, so the one rounding of
 * the division gives the double nearest to the decimal: the same bits as `Number` gives (Clinger 1990).
 * @param mark code of the decimal mark
 */
export function readDecimal(bytes: Uint8Array, from: number, to: number, mark: number): number {
  let at = from;
  while (at < to && bytes[at] === 32) at += 1;
  const negative = bytes[at] === 45;
  if (negative) at += 1;
  let digits = 0;
  let integer = 0;
  let decimals = -1;
  for (; at < to; at += 1) {
    const code = bytes[at];
    if (code >= 48 && code <= 57) {
      integer = integer * 10 + (code - 48);
      digits += 1;
      if (decimals >= 0) decimals += 1;
    } else if (code === mark && decimals < 0) decimals = 0;
    else break;
  }
  while (at < to && bytes[at] === 32) at += 1;
  if (at < to || digits === 0 || digits > 15) return NaN;
  const value = decimals > 0 ? integer / TENS[decimals] : integer;
  return negative ? -value : value;
}

/**
 * Decides a column's decimal mark from its cells. `unclear`: every comma stands where a thousands comma would.
 */
export function decimalOf(cells: readonly string[]): DecimalMark | 'unclear' {
  let dots = 0;
  let commas = 0;
  let grouped = 0;
  for (const cell of cells) {
    const text = cell.trim().replace(TRAILING_UNIT, '');
    if (!text.includes(',')) {
      if (PLAIN.test(text) && text.includes('.')) dots += 1;
    } else if (text.includes('.')) {
      if (COMMA_GROUPS.test(text)) dots += 1;
      else if (DOT_GROUPS.test(text)) commas += 1;
    } else if (COMMA_GROUPS.test(text) && !/^[+-]?0/.test(text)) grouped += 1;
    else if (COMMA.test(text)) commas += 1;
  }
  if (commas > dots) return ',';
  if (dots > 0) return '.';
  return grouped > 0 ? 'unclear' : 'either';
}
