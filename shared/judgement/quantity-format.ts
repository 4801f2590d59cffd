/**
 * How numbers look on screen: true minus (U+2212), `+` on positive gaps, no-break space before a unit,
 * and never a rounding that contradicts the words beside it.
 */
export type Unit = '°C' | 'K/W';

export const MINUS = '\u2212';
export const NO_BREAK_SPACE = '\u00a0';
/** Stands where a table has no number to show. */
export const NO_VALUE = '–';

/** Decimals a table shows when nothing asks for more: 0.01 °C, 0.0001 K/W. */
const USUAL_DECIMALS: Record<Unit, number> = { '°C': 2, 'K/W': 4 };
/** Beyond this a further digit is noise of the arithmetic, not of the bench. */
const MOST_DECIMALS: Record<Unit, number> = { '°C': 5, 'K/W': 7 };

/**
 * Decimals that show one digit more than the uncertainty supports, at least the table's usual ones.
 * An uncertainty of 0.6 supports tenths, so hundredths are shown; 0.04 supports hundredths, so thousandths.
 * @param uncertainty in the unit; null or 0 when unknown
 */
export function decimalsFor(uncertainty: number | null, unit: Unit): number {
  const usual = USUAL_DECIMALS[unit];
  if (uncertainty === null || !(uncertainty > 0) || !Number.isFinite(uncertainty)) return usual;
  const supported = -Math.floor(Math.log10(uncertainty));
  return Math.min(MOST_DECIMALS[unit], Math.max(usual, supported + 1));
}

/**
 * Decimals for a gap and its margin together, raised until the shown figures tell the same as the unrounded
 * ones: a gap beyond the margin never shows equal to it, and no end of the interval rounds onto zero.
 */
export function decimalsForGap(gap: number | null, marginOfError: number | null, unit: Unit): number {
  const start = decimalsFor(marginOfError, unit);
  if (gap === null || marginOfError === null) return start;
  const size = Math.abs(gap);
  const ends = [gap - marginOfError, gap + marginOfError];
  for (let decimals = start; decimals < MOST_DECIMALS[unit]; decimals++) {
    const tied = size !== marginOfError && size.toFixed(decimals) === marginOfError.toFixed(decimals);
    const lostEnd = ends.some((end) => end !== 0 && Number(end.toFixed(decimals)) === 0);
    if (!tied && !lostEnd) return decimals;
  }
  return MOST_DECIMALS[unit];
}

/** A number with a true minus; a value that rounds to zero carries no sign. */
export function formatNumber(value: number, decimals: number): string {
  const digits = Math.abs(value).toFixed(decimals);
  return value < 0 && Number(digits) !== 0 ? MINUS + digits : digits;
}

/** A number with its sign: `+0.38`, `−0.63`, `0.00`. */
export function formatSigned(value: number, decimals: number): string {
  const shown = formatNumber(value, decimals);
  return value > 0 && Number(Math.abs(value).toFixed(decimals)) !== 0 ? '+' + shown : shown;
}

/** `−0.63 °C`, the space unbreakable. */
export function withUnit(shown: string, unit: string): string {
  return shown + NO_BREAK_SPACE + unit;
}

/** `±0.60`. */
export function formatPlusMinus(value: number, decimals: number): string {
  return '±' + Math.abs(value).toFixed(decimals);
}

/** `−1.23 to −0.02`, both ends signed when they are ends of a gap. */
export function formatInterval(ends: readonly [number, number], decimals: number, signed = true): string {
  const end = signed ? formatSigned : formatNumber;
  return `${end(ends[0], decimals)} to ${end(ends[1], decimals)}`;
}

/**
 * Gap ÷ margin of error to two decimals, never rounded across 1, the edge of the noise:
 * 0.998 shows as `0.99×`, 1.001 as `1.01×`; exactly 1 as `1.00×`.
 */
export function formatRatio(clearance: number): string {
  let hundredths = Math.round(clearance * 100);
  if (clearance < 1) hundredths = Math.min(hundredths, 99);
  if (clearance > 1) hundredths = Math.max(hundredths, 101);
  return (hundredths / 100).toFixed(2) + '×';
}

/** A probability set by a person, in percent as given: 0.95 → `95%`, 0.995 → `99.5%`. */
export function formatLevel(probability: number): string {
  const level = Number((probability * 100).toFixed(6));
  // A level that Holm's rule divides has no end of decimals; it is cut, never rounded up.
  return `${Number(level.toFixed(3)) === level ? level : Math.floor(level * 10) / 10}%`;
}

/** A p value for a sentence: `= 0.053`, never printed as zero: `< 0.0001`. */
export function formatP(p: number): string {
  if (Number.isNaN(p)) return 'unknown';
  if (p < 0.0001) return '< 0.0001';
  return `= ${p < 0.001 ? p.toFixed(4) : p.toFixed(3)}`;
}
