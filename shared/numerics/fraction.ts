/** An exact quotient; `bottom` > 0. */
export interface Fraction {
  readonly top: bigint;
  readonly bottom: bigint;
}

export const ZERO: Fraction = { top: 0n, bottom: 1n };

export const plus = (a: Fraction, b: Fraction): Fraction =>
  a.bottom === b.bottom
    ? { top: a.top + b.top, bottom: a.bottom }
    : { top: a.top * b.bottom + b.top * a.bottom, bottom: a.bottom * b.bottom };

export const minus = (a: Fraction, b: Fraction): Fraction => plus(a, { top: -b.top, bottom: b.bottom });

/** top / bottom · 2^exponent, rounded once; `bottom` > 0. */
export function toNumber({ top: numerator, bottom }: Fraction, exponent = 0): number {
  if (numerator === 0n) return 0;
  const negative = numerator < 0n;
  let top = negative ? -numerator : numerator;
  let shifted = exponent;
  // Scale so that the whole quotient has 64 bits or more: its conversion then rounds once.
  const lift = 64 - (bitLength(top) - bitLength(bottom));
  if (lift > 0) {
    top <<= BigInt(lift);
    shifted -= lift;
  }
  const whole = top / bottom;
  // A sticky bit keeps a quotient that lies just above a tie from being rounded as one.
  const sticky = whole * bottom === top ? whole << 1n : (whole << 1n) | 1n;
  const drop = Math.max(0, bitLength(sticky) - 66);
  const kept = Number(drop > 0 ? (sticky >> BigInt(drop)) | 1n : sticky);
  const size = scaleByPowerOfTwo(kept, shifted - 1 + drop);
  return negative ? -size : size;
}

const bitLength = (value: bigint): number => {
  const hex = value.toString(16);
  return 4 * hex.length - (Math.clz32(parseInt(hex[0], 16)) - 28);
};

function scaleByPowerOfTwo(value: number, exponent: number): number {
  let scaled = value;
  let left = exponent;
  while (left > 1000) {
    scaled *= 2 ** 1000;
    left -= 1000;
  }
  while (left < -1000) {
    scaled *= 2 ** -1000;
    left += 1000;
  }
  return scaled * 2 ** left;
}
