const two = (value: number): string => String(value).padStart(2, '0');

/** Seconds as minutes and seconds: `17:33`. */
export const clockWords = (seconds: number): string => {
  const whole = Math.round(seconds);
  return `${Math.floor(whole / 60)}:${two(whole % 60)}`;
};

/** For a screen reader: `17 min 33 s`. */
export const spokenClock = (seconds: number): string => {
  const whole = Math.round(seconds);
  return `${Math.floor(whole / 60)} min ${whole % 60} s`;
};

/** `17:33`, `1053` or `1053 s` to seconds; null when it is neither. */
export function parseClock(text: string): number | null {
  const clock = /^\s*(\d+):([0-5]?\d(?:\.\d+)?)\s*$/.exec(text);
  if (clock) return Number(clock[1]) * 60 + Number(clock[2]);
  const seconds = /^\s*(\d+(?:\.\d+)?)\s*s?\s*$/.exec(text);
  return seconds ? Number(seconds[1]) : null;
}
