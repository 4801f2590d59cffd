import { Tails } from './incomplete-beta';

/**
 * x > 0 where the lower tail is p, for a distribution on the positive axis.
 * Newton's method in ln x on the logarithm of the smaller tail, kept inside a bracket.
 * @param tails both tails at x
 * @param densityTimesX density times x, that is the slope of the lower tail in ln x
 */
export function positiveQuantile(
  p: number,
  tails: (x: number) => Tails,
  densityTimesX: (x: number) => number,
  start: number,
): number {
  if (!(p >= 0 && p <= 1)) return NaN;
  if (p === 0) return 0;
  if (p === 1) return Infinity;
  const useLower = p <= 0.5;
  const target = useLower ? p : 1 - p;
  let x = start > 0 && Number.isFinite(start) ? start : 1;
  let low = 0;
  let high = Infinity;
  for (let step = 0; step < 200; step++) {
    const both = tails(x);
    const here = useLower ? both.lower : both.upper;
    const tooLow = useLower ? here < target : here > target;
    if (tooLow) low = x;
    else high = x;
    if (here === target) return x;
    const slope = densityTimesX(x);
    const relative = (here - target) / target;
    const distance = Math.abs(relative) < 1e-3 ? here - target : here * Math.log(here / target);
    const move = (useLower ? -distance : distance) / slope;
    let next = Number.isFinite(move) && Math.abs(move) < 50 ? x * Math.exp(move) : NaN;
    if (!(next > low && next < high)) {
      next = high === Infinity ? x * 8 : low === 0 ? x / 8 : Math.sqrt(low) * Math.sqrt(high);
    }
    const moved = Math.abs(next - x);
    x = next;
    if (moved <= 1e-9 * x && Math.abs(relative) < 1e-7) {
      // One more step from here is exact to rounding.
      const last = tails(x);
      const off = (useLower ? last.lower : last.upper) - target;
      return x * (1 + (useLower ? -off : off) / densityTimesX(x));
    }
  }
  return x;
}
