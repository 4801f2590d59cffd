import { RunFinding } from '../contracts/run-summary';
import { spreadStamps } from './coarse-clock';
import { count, stretch } from './words';

/** The readings of a run in order of time: which of the rows they are, and when. */
export interface TimeAxis {
  /** Seconds since the first reading used, never falling. */
  readonly seconds: Float64Array;
  /** Positions of the readings used among the rows taken: `from` to `to`, read backwards when `reversed`. */
  readonly from: number;
  readonly to: number;
  readonly reversed: boolean;
  /** Time of the first reading used, before it became zero. */
  readonly start: number;
  readonly findings: RunFinding[];
}

export interface TimeFault {
  readonly fault: 'out of order' | 'standing still';
  readonly falls: number;
  readonly at: number;
}

const DAY = 86400;
const HALF_DAY = 43200;
/** A log may be begun anew or have its clock set back a few times; beyond that its rows are in no order. */
const MOST_FALLS = 8;
/** Rows at the end whose time falls back are a block of totals, not readings. */
const TOTALS = 8;

/** Median of the steps above zero; 1 when there are none. */
export function usualStep(seconds: ArrayLike<number>): number {
  // Ten thousand steps from all over a long log tell its rate as well as all do.
  const stride = Math.max(1, Math.floor(seconds.length / 10000));
  const steps = new Float64Array(Math.ceil(seconds.length / stride));
  let n = 0;
  for (let i = 1; i < seconds.length; i += stride) {
    const step = seconds[i] - seconds[i - 1];
    if (step > 0) steps[n++] = step;
  }
  return n === 0 ? 1 : steps.subarray(0, n).sort()[Math.floor(n / 2)];
}

/**
 * Puts the times of a log in order: midnight, a clock set back, a log begun anew, a block of totals at the end.
 * @param raw seconds as read, put right in place; `rows` the physical row of each
 * @param kind how the log writes its time; only a clock can pass midnight
 */
export function settleAxis(
  raw: Float64Array,
  rows: ArrayLike<number>,
  kind: 'number' | 'clock' | 'stamp',
): TimeAxis | TimeFault {
  const findings: RunFinding[] = [];
  const seconds = raw;
  const fallsAt = (): number[] => {
    const falls: number[] = [];
    for (let i = 1; i < seconds.length; i += 1) if (seconds[i] < seconds[i - 1]) falls.push(i);
    return falls;
  };
  let falls = fallsAt();
  let reversed = false;
  if (falls.length > 0.5 * (seconds.length - 1)) {
    reversed = true;
    seconds.reverse();
    falls = fallsAt();
    findings.push({
      code: 'newest-first',
      level: 'note',
      text: 'The log lists the newest reading first; it was read from its end to its beginning.',
      atSeconds: null,
    });
  }
  if (falls.length > MOST_FALLS) return { fault: 'out of order', falls: falls.length, at: falls[0] };
  const step = usualStep(seconds);
  let from = 0;
  let to = seconds.length;
  let added = 0;
  const rowOf = (i: number): number => rows[reversed ? seconds.length - 1 - i : i];
  // As read: `seconds` is put right on the way.
  let before = seconds[0];
  let first = seconds[0];
  let next = 0;
  for (let i = 1; i < seconds.length; i += 1) {
    const now = seconds[i];
    if (next < falls.length && falls[next] === i) {
      next += 1;
      const fall = before - now;
      if (kind !== 'stamp' && i >= seconds.length - TOTALS && i > TOTALS && fall <= HALF_DAY) {
        to = i;
        findings.push({
          code: 'end-block',
          level: 'note',
          text: `From row ${rowOf(i)} on the time falls back, as in a block of totals at the end; ${count(seconds.length - i, 'row')} left out.`,
          atSeconds: null,
        });
        break;
      }
      const length = before - first;
      if (kind === 'clock' && fall > HALF_DAY) added += DAY;
      else if (kind === 'clock' && Math.abs(fall + step - HALF_DAY) <= 5 * step + 1 && before < 13 * 3600)
        added += HALF_DAY;
      else if (kind !== 'stamp' && fall > 60 && now <= first + Math.max(10 * step, 0.02 * length)) {
        findings.push({
          code: 'restart',
          level: 'caution',
          text: `The time starts again at row ${rowOf(i)}, after ${stretch(length)}. Only the ${count(seconds.length - i, 'reading')} from there on are used; the ${count(i - from, 'reading')} before are not.`,
          atSeconds: 0,
        });
        from = i;
        first = now;
        added = 0;
      } else {
        added += fall + step;
        findings.push({
          code: 'clock-set-back',
          level: 'caution',
          text: `The clock goes back by ${stretch(fall)} at row ${rowOf(i)}. The readings after it are taken to follow on at the usual ${stretch(step)}.`,
          atSeconds: length,
        });
      }
    }
    seconds[i] = now + added;
    before = now;
  }
  const stamped = seconds.subarray(from, to);
  const spread = spreadStamps(stamped);
  if (spread) {
    findings.push({
      code: 'coarse-clock',
      level: 'note',
      text: `Many readings share one time, for the clock is written only every ${stretch(usualStep(stamped))}. Inside each such time the readings are taken to be evenly spaced.`,
      atSeconds: null,
    });
  }
  const used = spread ?? stamped;
  const start = used[0];
  for (let i = 0; i < used.length; i += 1) used[i] -= start;
  if (used.length > 0 && used[used.length - 1] === 0) return { fault: 'standing still', falls: 0, at: 0 };
  return {
    seconds: used,
    from: reversed ? seconds.length - to : from,
    to: reversed ? seconds.length - from : to,
    reversed,
    start,
    findings,
  };
}
