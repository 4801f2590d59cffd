/** A window found by the rule, by index into the samples; `to` is the last sample. */
export interface FoundWindow {
  readonly from: number;
  readonly to: number;
  /** Least-squares slope of the rise times 300 s, °C. */
  readonly slopePer5Minutes: number;
  readonly settled: 'settled' | 'nearly settled' | 'not settled';
}

/** Shortest window, s; grid of its start, s; slopes per 5 minutes, °C: `methods.md` section 6, "Rule". */
export const SHORTEST_WINDOW = 600;
const GRID = 30;
const SLOPE_TIME = 300;
export const SETTLED_SLOPE = 0.05;
export const NOT_SETTLED_SLOPE = 0.2;

/** Sums over the samples from an index to the last, about a common centre. */
interface TailSums {
  n: number;
  t: number;
  y: number;
  tt: number;
  ty: number;
}

const slopeOf = (s: TailSums): number => {
  const spread = s.tt - (s.t * s.t) / s.n;
  return spread > 0 ? (s.ty - (s.t * s.y) / s.n) / spread : 0;
};

/** How settled a slope per 5 minutes is. */
export function settledBy(slopePer5Minutes: number): FoundWindow['settled'] {
  const steepness = Math.abs(slopePer5Minutes);
  if (steepness < SETTLED_SLOPE) return 'settled';
  return steepness < NOT_SETTLED_SLOPE ? 'nearly settled' : 'not settled';
}

/** Slope of a given window times 300 s, °C; both ends included. */
export function slopePer5Minutes(
  seconds: Float64Array,
  rise: Float64Array,
  from: number,
  to: number,
): number {
  const [t0, y0] = [seconds[to], rise[to]];
  const sums: TailSums = { n: 0, t: 0, y: 0, tt: 0, ty: 0 };
  for (let i = to; i >= from; i -= 1) addTo(sums, seconds[i] - t0, rise[i] - y0);
  return slopeOf(sums) * SLOPE_TIME;
}

function addTo(sums: TailSums, t: number, y: number): void {
  sums.n += 1;
  sums.t += t;
  sums.y += y;
  sums.tt += t * t;
  sums.ty += t * y;
}

/**
 * The longest window that ends at the log's end, lasts at least 600 s, starts on a 30 s grid from the log's start and
 * whose slope times 300 s is under 0.05 °C. None: the last 600 s, marked nearly settled (under 0.2 °C) or not settled.
 * A log under 600 s is taken whole and is never settled: the rule needs 600 s to say so.
 * One pass from the end, running sums about the last reading: each start costs nothing more.
 * @param seconds s, never falling; @param rise °C, finite, as long as `seconds`, at least one sample
 */
export function findSteadyWindow(seconds: Float64Array, rise: Float64Array): FoundWindow {
  const last = seconds.length - 1;
  const end = seconds[last];
  const [t0, y0] = [end, rise[last]];
  const sums: TailSums = { n: 0, t: 0, y: 0, tt: 0, ty: 0 };
  let longest: { from: number; slope: number } | null = null;
  let lastTenMinutes = { from: 0, slope: 0 };
  let haveTenMinutes = false;
  for (let i = last; i >= 0; i -= 1) {
    addTo(sums, seconds[i] - t0, rise[i] - y0);
    // Sample i opens the window of every grid start after sample i − 1 and up to sample i.
    const before = i === 0 ? -Infinity : seconds[i - 1];
    if (seconds[i] === before) continue;
    const gridStart = Math.floor(seconds[i] / GRID) * GRID;
    const opensGrid = gridStart > before && gridStart >= 0;
    if (!haveTenMinutes && end - before > SHORTEST_WINDOW) {
      // The widest window that is not longer than 600 s: its first sample is i.
      haveTenMinutes = true;
      lastTenMinutes = { from: i, slope: slopeOf(sums) };
    }
    if (opensGrid && end - seconds[i] >= SHORTEST_WINDOW) {
      const slope = slopeOf(sums);
      if (Math.abs(slope) * SLOPE_TIME < SETTLED_SLOPE) longest = { from: i, slope };
    }
  }
  const chosen = longest ?? lastTenMinutes;
  const per5 = chosen.slope * SLOPE_TIME;
  const settled = longest ? 'settled' : settledBy(per5);
  return {
    from: chosen.from,
    to: last,
    slopePer5Minutes: per5,
    settled: !longest && settled === 'settled' ? 'nearly settled' : settled,
  };
}
