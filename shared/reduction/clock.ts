import { WrittenDate, parseDate } from './calendar';

/** A clock reading or a stretch of time written with colons. */
export interface ClockReading {
  /** Seconds, with `12:30` read as hours and minutes. */
  readonly seconds: number;
  /** How many numbers stood between the colons: 2 or 3. */
  readonly parts: 2 | 3;
  /** Offset from UTC in seconds where one was written, else 0. */
  readonly offset: number;
}

const CLOCK =
  /^(\d{1,3}):(\d{1,2})(?::(\d{1,2})(?:[.,:](\d{1,9}))?)?(?:[.,](\d{1,9}))?\s*([ap])?\.?m?\.?\s*(z|utc|gmt|[+-]\d{2}:?\d{2})?$/i;

/** Reads `9:41:00`, `09:41:00.250`, `9:41:00 PM`, `29:59`, `09:41:00+01:00`; null when it is none of them. */
export function parseClock(text: string): ClockReading | null {
  const m = CLOCK.exec(text);
  if (!m) return null;
  const threeParts = m[3] !== undefined;
  let hours = Number(m[1]);
  const minutes = Number(m[2]);
  if (minutes > 59 || (threeParts && Number(m[3]) > 59)) return null;
  if (m[6]) {
    if (hours < 1 || hours > 12) return null;
    hours = (hours % 12) + (m[6].toLowerCase() === 'p' ? 12 : 0);
  }
  const fraction = m[4] ?? (threeParts ? m[5] : undefined);
  // In `12:30.5` the fraction belongs to the second part, whatever that is.
  const tail = !threeParts && m[5] !== undefined ? Number(`0.${m[5]}`) * 60 : 0;
  const seconds =
    hours * 3600 +
    minutes * 60 +
    (threeParts ? Number(m[3]) : 0) +
    (fraction ? Number(`0.${fraction}`) : 0) +
    tail;
  const zone = m[7] && /\d/.test(m[7]) ? m[7].replace(':', '') : null;
  const offset = zone
    ? (zone[0] === '-' ? -1 : 1) * (Number(zone.slice(1, 3)) * 3600 + Number(zone.slice(3, 5)) * 60)
    : 0;
  return { seconds, parts: threeParts ? 3 : 2, offset };
}

/** Where the clock begins in a cell that holds a date and a clock, or -1. */
export function clockStart(text: string): number {
  const colon = text.indexOf(':');
  if (colon < 0) return -1;
  let at = colon;
  while (at > 0 && text.charCodeAt(at - 1) >= 48 && text.charCodeAt(at - 1) <= 57) at -= 1;
  return at;
}

/** The date part of a cell that holds a date and a clock, its separator stripped; null when there is none. */
export function datePart(text: string): string | null {
  const at = clockStart(text);
  if (at <= 0) return null;
  const date = text.slice(0, at).replace(/[T,\s_-]+$/i, '');
  return date === '' ? null : date;
}

/** Reads a cell that holds a date and a clock. */
export function parseStamp(
  text: string,
): { readonly date: WrittenDate; readonly clock: ClockReading } | null {
  const dateText = datePart(text);
  if (dateText === null) return null;
  const date = parseDate(dateText);
  const clock = parseClock(text.slice(clockStart(text)));
  return date && clock ? { date, clock } : null;
}
