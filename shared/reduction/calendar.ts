/** A date as written, before it is known which of two numbers is the day. */
export interface WrittenDate {
  readonly year: number;
  readonly first: number;
  readonly second: number;
  /** `year first` dates are unambiguous: month, then day. */
  readonly order: 'year first' | 'unclear' | 'day first' | 'month first';
}

export type DateOrder = 'day first' | 'month first';

const MONTHS = ['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec'];
const YEAR_FIRST = /^(\d{4})([-/.])(\d{1,2})\2(\d{1,2})$/;
const COMPACT = /^(\d{4})(\d{2})(\d{2})$/;
const YEAR_LAST = /^(\d{1,2})([-/.])(\d{1,2})\2(\d{4}|\d{2})$/;
const NAMED = /^(?:[a-z]{3},?\s+)?(\d{1,2})[-/. ]\s?([a-z]{3})[a-z]*\.?[-/., ]\s?(\d{4}|\d{2})$/i;
const NAMED_US = /^([a-z]{3})[a-z]*\.?[- ](\d{1,2}),?[- ](\d{4})$/i;

const fullYear = (text: string): number => (text.length === 2 ? 2000 + Number(text) : Number(text));

const daysInMonth = (year: number, month: number): number =>
  month === 2
    ? (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0
      ? 29
      : 28
    : [4, 6, 9, 11].includes(month)
      ? 30
      : 31;

const valid = (year: number, month: number, day: number): boolean =>
  year >= 1970 && year < 2200 && month >= 1 && month <= 12 && day >= 1 && day <= daysInMonth(year, month);

/** Reads a date alone, or null. Two-digit years are of this century. */
export function parseDate(text: string): WrittenDate | null {
  let m = YEAR_FIRST.exec(text);
  if (m) {
    const date = { year: Number(m[1]), first: Number(m[3]), second: Number(m[4]) };
    return valid(date.year, date.first, date.second) ? { ...date, order: 'year first' } : null;
  }
  m = COMPACT.exec(text);
  if (m) {
    const date = { year: Number(m[1]), first: Number(m[2]), second: Number(m[3]) };
    return valid(date.year, date.first, date.second) ? { ...date, order: 'year first' } : null;
  }
  m = YEAR_LAST.exec(text);
  if (m) {
    const [year, first, second] = [fullYear(m[4]), Number(m[1]), Number(m[3])];
    const dayFirst = valid(year, second, first);
    const monthFirst = valid(year, first, second);
    if (!dayFirst && !monthFirst) return null;
    // Dots are written by people who write the day first, everywhere (common practice, no source).
    if (dayFirst && (m[2] === '.' || !monthFirst)) return { year, first, second, order: 'day first' };
    if (!dayFirst) return { year, first, second, order: 'month first' };
    return { year, first, second, order: 'unclear' };
  }
  m = NAMED.exec(text);
  const us = m ? null : NAMED_US.exec(text);
  const monthName = (m ? m[2] : (us?.[1] ?? '')).toLowerCase();
  const month = MONTHS.indexOf(monthName) + 1;
  if (month === 0) return null;
  const day = Number(m ? m[1] : us?.[2]);
  const year = m ? fullYear(m[3]) : Number(us?.[3]);
  return valid(year, month, day) ? { year, first: month, second: day, order: 'year first' } : null;
}

/** Days since 1970-01-01 in the Gregorian calendar, by counting days of the era (no clock, no time zone). */
export function dayNumber(date: WrittenDate, order: DateOrder): number {
  const own = date.order === 'unclear' ? order : date.order;
  const month = own === 'day first' ? date.second : date.first;
  const day = own === 'day first' ? date.first : date.second;
  // March is month 0 of the counting year, so that the leap day comes last.
  const y = month <= 2 ? date.year - 1 : date.year;
  const era = Math.floor(y / 400);
  const yearOfEra = y - era * 400;
  const dayOfYear = Math.floor((153 * ((month + 9) % 12) + 2) / 5) + day - 1;
  return (
    era * 146097 +
    yearOfEra * 365 +
    Math.floor(yearOfEra / 4) -
    Math.floor(yearOfEra / 100) +
    dayOfYear -
    719468
  );
}

/** `2026-03-12T09:41:00` for seconds since 1970-01-01T00:00:00, fractions of a second cut off. */
export function isoFromSeconds(seconds: number): string {
  const days = Math.floor(seconds / 86400);
  const clock = Math.floor(seconds - days * 86400);
  const z = days + 719468;
  const era = Math.floor(z / 146097);
  const dayOfEra = z - era * 146097;
  const yearOfEra = Math.floor(
    (dayOfEra - Math.floor(dayOfEra / 1460) + Math.floor(dayOfEra / 36524) - Math.floor(dayOfEra / 146096)) /
      365,
  );
  const dayOfYear = dayOfEra - (365 * yearOfEra + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100));
  const shifted = Math.floor((5 * dayOfYear + 2) / 153);
  const day = dayOfYear - Math.floor((153 * shifted + 2) / 5) + 1;
  const month = shifted < 10 ? shifted + 3 : shifted - 9;
  const year = yearOfEra + era * 400 + (month <= 2 ? 1 : 0);
  const two = (n: number) => String(n).padStart(2, '0');
  return `${year}-${two(month)}-${two(day)}T${two(Math.floor(clock / 3600))}:${two(Math.floor(clock / 60) % 60)}:${two(clock % 60)}`;
}
