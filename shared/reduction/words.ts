/** Numbers and times in the sentences people read: true minus, no-break space before the unit, times as m:ss. */
const NBSP = '\u00a0';

/** A number to fixed decimals with a true minus; never "−0". */
export function fixed(value: number, decimals: number): string {
  const text = Math.abs(value).toFixed(decimals);
  return value < 0 && Number(text) !== 0 ? `\u2212${text}` : text;
}

export const celsius = (value: number, decimals = 1): string => `${fixed(value, decimals)}${NBSP}°C`;
export const watts = (value: number, decimals = 1): string => `${fixed(value, decimals)}${NBSP}W`;
export const rpm = (value: number): string => `${fixed(value, 0)}${NBSP}rpm`;

/** `11:40` or `1:02:03` for a moment in a run. */
export function clock(seconds: number): string {
  const whole = Math.floor(seconds + 1e-9);
  const two = (n: number) => String(n).padStart(2, '0');
  const minutes = Math.floor(whole / 60);
  return minutes >= 60
    ? `${Math.floor(minutes / 60)}:${two(minutes % 60)}:${two(whole % 60)}`
    : `${minutes}:${two(whole % 60)}`;
}

/** A stretch of time: `47 s`, `12 min`, `30 min 20 s`, `2 h 5 min`. */
export function stretch(seconds: number): string {
  if (seconds < 10) return `${fixed(seconds, Number.isInteger(seconds) ? 0 : 1)}${NBSP}s`;
  const whole = Math.round(seconds);
  if (whole < 120) return `${whole}${NBSP}s`;
  const minutes = Math.floor(whole / 60);
  if (minutes < 120) {
    return whole % 60 === 0 ? `${minutes}${NBSP}min` : `${minutes}${NBSP}min ${whole % 60}${NBSP}s`;
  }
  return `${Math.floor(minutes / 60)}${NBSP}h ${minutes % 60}${NBSP}min`;
}

/** A count with its noun: `1 reading`, `1,800 readings`. */
export function count(n: number, noun: string, plural = `${noun}s`): string {
  const digits = String(n).replace(/\B(?=(\d{3})+$)/g, ',');
  return `${digits} ${n === 1 ? noun : plural}`;
}

/** Text out of a file, shortened and quoted, fit for a sentence. */
export function quoted(text: string): string {
  // eslint-disable-next-line no-control-regex -- control characters of a broken file must not reach the screen
  const clean = text.replace(/[\u0000-\u001f\u007f]/g, ' ').trim();
  return `“${clean.length > 40 ? `${clean.slice(0, 37)}…` : clean}”`;
}
