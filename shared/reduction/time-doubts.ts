import { FoundTime } from './find-time';
import { stretch } from './words';

/** A run lasts from two minutes to a week; a time that reads otherwise has been read in the wrong unit. s */
const SHORTEST_RUN = 120;
const LONGEST_RUN = 7 * 86400;
/** A stopwatch in minutes and seconds, read as hours and minutes, lasts a night or longer. s */
const LONGEST_BY_MINUTES = 8 * 3600;

/**
 * Times of a clock in two parts, read as hours and minutes, once the whole log is known: past 24:00 they can only be
 * minutes and seconds, a sixtieth of what was read.
 */
export function asStopwatch(time: FoundTime, seconds: Float64Array): Float64Array {
  if (!time.unsure || time.source.kind !== 'clock' || !seconds.some((value) => value >= 86400))
    return seconds;
  return seconds.map((value) => value / 60);
}

/** What is doubtful about a time whose unit was not named, once the whole log is read; null when nothing is. */
export function doubtOf(time: FoundTime, seconds: Float64Array): string | null {
  if (!time.unsure) return null;
  const duration = seconds[seconds.length - 1];
  if (time.source.kind === 'clock') {
    if (duration <= LONGEST_BY_MINUTES) return null;
    return `Read as hours and minutes the log would last ${stretch(duration)}, read as minutes and seconds ${stretch(duration / 60)}. Name the unit “mm:ss” or “hh:mm” in the header, or choose the column to have it read as minutes and seconds.`;
  }
  if (duration >= SHORTEST_RUN && duration <= LONGEST_RUN) return null;
  return `No unit is named; read as seconds the log would last ${stretch(duration)}. Name the unit in the header, such as “time_min” or “time_ms”, or choose the column to have it read as seconds.`;
}
