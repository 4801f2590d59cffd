import { Unit } from '../quantity/quantity-format';

/** How much a small, mid or long tick is worth: one tenth, one half, one whole of `whole`. */
export interface GapScale {
  /** Half-width of the symmetric domain, in the unit. */
  readonly reach: number;
  /** What a long tick is worth: 1 °C; for resistance the power of ten that suits the gap. */
  readonly whole: number;
  /** Pixel of a value. */
  x(value: number): number;
  /** Pixels of one tick of a tenth. */
  readonly pixelsPerTenth: number;
}

/** Inner padding left and right of the big rule, px. */
export const PADDING = 14;
/** Below this width the layout is the narrow one, px. */
export const WIDE_FROM = 720;

interface Extent {
  readonly gap: number | null;
  readonly marginOfError: number | null;
  readonly gapThatMatters: number;
}

/**
 * The value of a long tick. Temperatures always count in 1 °C. Resistances run over decades, so the power of
 * ten is taken that leaves the largest mark between 0.3 and 3 long ticks from zero.
 */
export function wholeFor(largest: number, unit: Unit): number {
  if (unit === '°C' || !(largest > 0)) return unit === '°C' ? 1 : 0.01;
  return 10 ** Math.ceil(Math.log10(largest / 3));
}

/** The largest distance from zero that the rule must show: the far end of the interval, the band, the notch. */
export function largestMark({ gap, marginOfError, gapThatMatters }: Extent): number {
  const margin = marginOfError ?? 0;
  return Math.max(Math.abs(gap ?? 0) + margin, margin, gapThatMatters);
}

/** Rounds up to the half that leaves room for a label beyond the largest mark. */
export function reachFor(largest: number, whole: number, atLeast: number): number {
  return Math.max(Math.ceil(2 * (largest / whole + 0.2) - 1e-9) / 2, atLeast) * whole;
}

/** Room for the value at an end of the bracket, of which the padding and the page margin hold a part, px. */
const END_VALUE = { room: 52, outside: PADDING + 12 };

/** The scale of a big rule drawn `width` px wide. */
export function gapScale(extent: Extent, unit: Unit, width: number): GapScale {
  const largest = largestMark(extent);
  const whole = wholeFor(largest, unit);
  const farthestEnd = extent.gap === null ? 0 : Math.abs(extent.gap) + (extent.marginOfError ?? 0);
  let reach = reachFor(largest, whole, width < WIDE_FROM ? 1.5 : 2);
  let scale = scaleOver(reach, whole, width, PADDING);
  // A far gap leaves little room beyond it, and its value would run off the page.
  while (
    scale.x(reach) - scale.x(farthestEnd) + END_VALUE.outside < END_VALUE.room &&
    width > 4 * END_VALUE.room
  ) {
    reach += whole / 2;
    scale = scaleOver(reach, whole, width, PADDING);
  }
  return scale;
}

/** A scale of −reach to +reach over `width` px less the padding on both sides. */
export function scaleOver(reach: number, whole: number, width: number, padding: number): GapScale {
  const span = Math.max(width - 2 * padding, 1);
  const x = (value: number): number => padding + ((value + reach) / (2 * reach)) * span;
  return { reach, whole, x, pixelsPerTenth: ((whole / 10) * span) / (2 * reach) };
}

/** The widest a list's shared domain grows, in long ticks; beyond it a needle stands at the end. */
const WIDEST_LIST = 6;

/**
 * One domain for all rows of a list, so that the column of small rules is itself a chart: ±2 long ticks,
 * widened for the largest gap up to ±6.
 */
export function sharedDomain(pairs: readonly Pick<Extent, 'gap' | 'gapThatMatters'>[], unit: Unit): number {
  const largest = Math.max(
    0,
    ...pairs.map(({ gap, gapThatMatters }) => Math.max(Math.abs(gap ?? 0), gapThatMatters)),
  );
  const whole = wholeFor(largest, unit);
  return Math.min(reachFor(largest, whole, 2), WIDEST_LIST * whole);
}
