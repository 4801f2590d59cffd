/** Range and ticks of a chart's axis by the grammar of the gap rule: short tenths, labels at fives or tens. */
export interface AxisScale {
  readonly range: readonly [number, number];
  /** Between labels. */
  readonly labelEvery: number;
  readonly minorEvery: number;
  readonly decimals: number;
  /** d3 format of the labels. */
  readonly format: string;
}

const CLOSEST_TICKS = 6;
const CLOSEST_LABELS = 52;

/**
 * @param values what the axis must hold, in one unit
 * @param pixels length of the axis, px
 * @param smallestTick no tick is worth less: finer ones would promise more than the readings hold
 */
export function axisScale(values: readonly number[], pixels: number, smallestTick: number): AxisScale {
  const low = Math.min(...values);
  const high = Math.max(...values);
  const span = Math.max(high - low, 2 * smallestTick);
  const minor = Math.max(smallestTick, 10 ** Math.ceil(Math.log10((span * CLOSEST_TICKS) / pixels)));
  const roundTo = 5 * minor;
  const from = Math.floor(low / roundTo - 0.15) * roundTo;
  const to = Math.ceil(high / roundTo + 0.15) * roundTo;
  const pixelsPerFive = (pixels * roundTo) / (to - from);
  const multiple = [5, 10, 20, 50].find((tenths) => (pixelsPerFive * tenths) / 5 >= CLOSEST_LABELS) ?? 100;
  const labelEvery = multiple * minor;
  const decimals = Math.max(0, -Math.floor(Math.log10(labelEvery) + 1e-9));
  return { range: [from, to], labelEvery, minorEvery: minor, decimals, format: `.${decimals}f` };
}
