/** ΔT over ambient, sample by sample, at the moments the heat source was read. */
export interface Rise {
  /** s, since the log's start. */
  readonly seconds: Float64Array;
  /** °C */
  readonly rise: Float64Array;
  /** Ambient at the same moments, °C. */
  readonly ambient: Float64Array;
  /** Index of each sample among the log's readings. */
  readonly at: Uint32Array;
  /** Longest stretch without ambient between heat-source readings, s, and where it begins; null when there is none. */
  readonly ambientLost: { readonly from: number; readonly to: number; readonly readings: number } | null;
}

/** Most decimals a sensor is logged with. */
const MOST_DECIMALS = 6;

/** Power of ten that makes whole numbers of all readings, or 0 when they have more decimals than sensors give. */
function decimalScale(...columns: readonly Float64Array[]): number {
  let scale = 1;
  for (const column of columns) {
    for (const value of column) {
      while (!Number.isNaN(value) && Math.round(value * scale) / scale !== value) {
        scale *= 10;
        if (scale > 10 ** MOST_DECIMALS) return 0;
      }
    }
  }
  return scale;
}

/** Ambient readings further apart than this are not joined, s; slower ambient loggers are allowed five of their own steps. */
const LONGEST_JOIN = 60;

/**
 * Forms heat source minus simultaneous ambient. Ambient is taken from the same row where it is there, else on the
 * straight line between its neighbours in time; never beyond its first or last reading, nor across a long silence.
 * @param ambient °C with NaN where missing, or one number for a fixed ambient
 */
export function formRise(seconds: Float64Array, heat: Float64Array, ambient: Float64Array | number): Rise {
  const n = seconds.length;
  const at = new Uint32Array(n);
  const rise = new Float64Array(n);
  const same = new Float64Array(n);
  let used = 0;
  let lostReadings = 0;
  let lostFrom = NaN;
  let lostTo = NaN;
  const line = typeof ambient === 'number' ? null : new AmbientLine(seconds, ambient);
  const scale = typeof ambient === 'number' ? 0 : decimalScale(heat, ambient);
  for (let i = 0; i < n; i += 1) {
    if (Number.isNaN(heat[i])) continue;
    const air = line ? line.at(i) : (ambient as number);
    if (Number.isNaN(air)) {
      lostReadings += 1;
      if (Number.isNaN(lostFrom)) lostFrom = seconds[i];
      lostTo = seconds[i];
      continue;
    }
    at[used] = i;
    same[used] = air;
    // 45.3 − 22.1 is 23.2 and not 23.199999999999996: the difference of two decimals is a decimal.
    const sameRow = line !== null && !Number.isNaN((ambient as Float64Array)[i]);
    rise[used] = scale > 0 && sameRow ? Math.round((heat[i] - air) * scale) / scale : heat[i] - air;
    used += 1;
  }
  const indices = at.subarray(0, used);
  return {
    seconds: Float64Array.from(indices, (i) => seconds[i]),
    rise: rise.subarray(0, used),
    ambient: same.subarray(0, used),
    at: indices,
    ambientLost: lostReadings === 0 ? null : { from: lostFrom, to: lostTo, readings: lostReadings },
  };
}

/** Ambient at any row, by its own row or its neighbours; asked for in rising order of rows. */
class AmbientLine {
  private before = -1;
  private after = -1;
  private readonly join: number;

  constructor(
    private readonly seconds: Float64Array,
    private readonly ambient: Float64Array,
  ) {
    const steps: number[] = [];
    let last = NaN;
    for (let i = 0; i < seconds.length && steps.length < 10000; i += 1) {
      if (Number.isNaN(ambient[i])) continue;
      if (!Number.isNaN(last)) steps.push(seconds[i] - last);
      last = seconds[i];
    }
    steps.sort((a, b) => a - b);
    this.join = Math.max(LONGEST_JOIN, 5 * (steps[Math.floor(steps.length / 2)] ?? 0));
  }

  at(i: number): number {
    if (!Number.isNaN(this.ambient[i])) {
      this.before = i;
      return this.ambient[i];
    }
    if (this.after < i) {
      this.after = i + 1;
      while (this.after < this.ambient.length && Number.isNaN(this.ambient[this.after])) this.after += 1;
    }
    // A row whose heat source is missing may still hold the ambient nearest before.
    for (let b = i - 1; b > this.before; b -= 1) {
      if (!Number.isNaN(this.ambient[b])) {
        this.before = b;
        break;
      }
    }
    if (this.before < 0 || this.after >= this.ambient.length) return NaN;
    const span = this.seconds[this.after] - this.seconds[this.before];
    if (span > this.join) return NaN;
    if (span === 0) return this.ambient[this.before];
    const share = (this.seconds[i] - this.seconds[this.before]) / span;
    return this.ambient[this.before] + share * (this.ambient[this.after] - this.ambient[this.before]);
  }
}
