import { MINUS } from '../quantity/quantity-format';
import { GapScale } from './gap-scale';

export interface Numeral {
  readonly x: number;
  readonly text: string;
  /** Whether it names a half, which is set smaller and quieter. */
  readonly half: boolean;
}

/** Ticks as one path a length, and their numerals. */
export interface Ticks {
  readonly short: string;
  readonly mid: string;
  readonly long: string;
  readonly numerals: readonly Numeral[];
  /** What one tick is worth, in the unit. */
  readonly worth: number;
}

export interface TickLengths {
  readonly short: number;
  readonly mid: number;
  readonly long: number;
  /** Stroke widths, px: they decide where a line is crisp. */
  readonly thin: number;
  readonly thick: number;
}

export const BIG_TICKS: TickLengths = { short: 7, mid: 13, long: 22, thin: 1, thick: 1.5 };
export const SMALL_TICKS: TickLengths = { short: 2.5, mid: 4, long: 6, thin: 1, thick: 1 };

/** Closer than this, ticks run together, px. */
const CLOSEST_TICKS = 4;
/** A half is named only where a tenth is this wide, px. */
const HALVES_NAMED_FROM = 7;
/** Width of a figure at 12 to 13 px, generous, px. */
const FIGURE = 7.2;

/** Moves a vertical line of `strokeWidth` to where device pixels draw it equally black. */
export function snap(x: number, strokeWidth: number, pixelRatio: number): number {
  const odd = Math.max(1, Math.floor(strokeWidth * pixelRatio)) % 2 === 1;
  const device = x * pixelRatio;
  return (odd ? Math.floor(device) + 0.5 : Math.round(device)) / pixelRatio;
}

/**
 * Tenths of a long tick that one drawn tick is worth: 1, or by the same grammar 5, 10, 50, …
 * where that is too fine for the width.
 */
function tenthsPerTick(pixelsPerTenth: number): number {
  let tenths = 1;
  for (
    let factor = 5;
    tenths * pixelsPerTenth < CLOSEST_TICKS && tenths < 1e6;
    factor = factor === 5 ? 2 : 5
  ) {
    tenths *= factor;
  }
  return tenths;
}

/** Ticks hanging from the edge at `y`. */
export function ticks(scale: GapScale, y: number, lengths: TickLengths, pixelRatio: number): Ticks {
  const tenths = tenthsPerTick(scale.pixelsPerTenth);
  const startsWithFive = String(tenths).startsWith('5');
  const perMid = startsWithFive ? 1 : 5;
  const perLong = startsWithFive ? 2 : 10;
  const worth = (tenths * scale.whole) / 10;
  const count = Math.floor(scale.reach / worth + 1e-9);
  const text = numeralText(worth * perLong, worth * perMid);
  const pixelsPerTick = tenths * scale.pixelsPerTenth;
  const longEvery = numeralEvery(pixelsPerTick * perLong, text.whole(count * worth).length * FIGURE + 8);
  const room = (text.half(-worth * perMid).length + text.whole(-worth * perLong).length) * (FIGURE / 2) + 4;
  const namesHalves = !startsWithFive && pixelsPerTick >= HALVES_NAMED_FROM && pixelsPerTick * perMid >= room;

  const paths = { short: '', mid: '', long: '' };
  const numerals: Numeral[] = [];
  for (let i = -count; i <= count; i++) {
    const value = i * worth;
    const level = i % perLong === 0 ? 'long' : i % perMid === 0 ? 'mid' : 'short';
    const x = round(snap(scale.x(value), level === 'long' ? lengths.thick : lengths.thin, pixelRatio));
    paths[level] += `M${x} ${y}v${lengths[level]}`;
    if (level === 'long' && (i / perLong) % longEvery === 0) {
      numerals.push({ x, text: text.whole(value), half: false });
    } else if (level === 'mid' && namesHalves && Math.abs(i) !== count) {
      numerals.push({ x, text: text.half(value), half: true });
    }
  }
  return { ...paths, numerals, worth };
}

/** Every how many long ticks a numeral fits: 1, 2, 5, 10, … */
function numeralEvery(pixels: number, room: number): number {
  let every = 1;
  for (let step = 0; every * pixels < room && step < 12; step++) every *= step % 3 === 1 ? 2.5 : 2;
  return every;
}

function numeralText(whole: number, half: number): { whole(v: number): string; half(v: number): string } {
  const write =
    (step: number) =>
    (value: number): string => {
      const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
      const digits = Math.abs(value).toFixed(decimals);
      if (Number(digits) === 0) return '0';
      return (value < 0 ? MINUS : '+') + digits;
    };
  return { whole: write(whole), half: write(half) };
}

/** Two decimals of a pixel are enough for any path. */
export function round(pixels: number): number {
  return Math.round(pixels * 100) / 100;
}
