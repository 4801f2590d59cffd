/**
 * Sums that no order of the readings can change.
 *
 * Readings of one sensor are decimals with few digits: scaled to integers they add up without any rounding. Other
 * doubles are integers times a power of two and are added exactly as such. Either way one rounding is made, at the
 * end, so shuffling the readings changes no digit.
 */

/** Readings as whole numbers of a common step: value = whole / decimalScale · 2^binaryExponent. */
interface WholeReadings {
  readonly wholes: readonly bigint[];
  /** Power of ten the wholes are to be divided by. */
  readonly decimalScale: number;
  readonly binaryExponent: number;
}

const LARGEST_EXACT = 2 ** 53;
/** 10^11 squared is 10^22, the last power of ten that a double holds exactly. */
const MOST_DECIMALS = 11;

const bits = new DataView(new ArrayBuffer(8));

function asDecimals(values: readonly number[]): WholeReadings | null {
  let scale = 1;
  let decimals = 0;
  for (const value of values) {
    for (;;) {
      const whole = Math.round(value * scale);
      if (Math.abs(whole) >= LARGEST_EXACT) return null;
      if (whole / scale === value) break;
      if (++decimals > MOST_DECIMALS) return null;
      scale = 10 ** decimals;
    }
  }
  const wholes: bigint[] = [];
  for (const value of values) {
    const whole = Math.round(value * scale);
    // A later reading may have asked for a finer step than an earlier one bears.
    if (Math.abs(whole) >= LARGEST_EXACT || whole / scale !== value) return null;
    wholes.push(BigInt(whole));
  }
  return { wholes, decimalScale: scale, binaryExponent: 0 };
}

/** Significand and exponent of a finite double: value = whole · 2^exponent. */
function split(value: number): { readonly whole: bigint; readonly exponent: number } {
  bits.setFloat64(0, value);
  const raw = bits.getBigUint64(0);
  const biased = Number((raw >> 52n) & 0x7ffn);
  const fraction = raw & 0xfffffffffffffn;
  const whole = biased === 0 ? fraction : fraction | 0x10000000000000n;
  return { whole: value < 0 ? -whole : whole, exponent: Math.max(biased, 1) - 1075 };
}

function asBinaries(values: readonly number[]): WholeReadings {
  const parts = values.map(split);
  const lowest = parts.reduce(
    (least, { whole, exponent }) => (whole === 0n ? least : Math.min(least, exponent)),
    Infinity,
  );
  if (lowest === Infinity) return { wholes: values.map(() => 0n), decimalScale: 1, binaryExponent: 0 };
  return {
    wholes: parts.map(({ whole, exponent }) => (whole === 0n ? 0n : whole << BigInt(exponent - lowest))),
    decimalScale: 1,
    binaryExponent: lowest,
  };
}

const inWholes = (values: readonly number[]): WholeReadings => asDecimals(values) ?? asBinaries(values);

/** numerator / denominator · 2^exponent with one rounding of the quotient to within an ulp. */
function quotient(numerator: bigint, denominator: bigint, exponent: number): number {
  const negative = numerator < 0n;
  let top = negative ? -numerator : numerator;
  if (top === 0n) return 0;
  // Scale so that the whole quotient has 64 bits or more: its conversion then rounds once.
  const lift = 64 - (top.toString(2).length - denominator.toString(2).length);
  let shifted = exponent;
  if (lift > 0) {
    top <<= BigInt(lift);
    shifted -= lift;
  }
  const whole = top / denominator;
  // A sticky bit keeps a quotient that lies just above a tie from being rounded as one.
  const sticky = whole * denominator === top ? whole << 1n : (whole << 1n) | 1n;
  const digits = sticky.toString(2).length;
  const drop = Math.max(0, digits - 66);
  const kept = Number(drop > 0 ? (sticky >> BigInt(drop)) | 1n : sticky);
  const size = scaleByPowerOfTwo(kept, shifted - 1 + drop);
  return negative ? -size : size;
}

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

const total = (wholes: readonly bigint[]): bigint => wholes.reduce((sum, whole) => sum + whole, 0n);
const allFinite = (values: readonly number[]): boolean => values.every((value) => Number.isFinite(value));

/** Sum of the readings, rounded once. NaN when any is not finite; 0 of none. */
export function exactSum(values: readonly number[]): number {
  if (!allFinite(values)) return NaN;
  const { wholes, decimalScale, binaryExponent } = inWholes(values);
  return quotient(total(wholes), BigInt(decimalScale), binaryExponent);
}

/** Arithmetic mean, rounded once; in the unit of the readings. NaN of none, or when any is not finite. */
export function mean(values: readonly number[]): number {
  if (values.length === 0 || !allFinite(values)) return NaN;
  const { wholes, decimalScale, binaryExponent } = inWholes(values);
  return quotient(total(wholes), BigInt(values.length) * BigInt(decimalScale), binaryExponent);
}

/**
 * Sum of squared deviations from the mean, (n Σx² − (Σx)²)/n in whole numbers, rounded once.
 * NaN of none, or when any reading is not finite.
 */
export function sumOfSquaredDeviations(values: readonly number[]): number {
  if (values.length === 0 || !allFinite(values)) return NaN;
  const { wholes, decimalScale, binaryExponent } = inWholes(values);
  const scale = BigInt(decimalScale);
  return quotient(deviations(wholes), BigInt(values.length) * scale * scale, 2 * binaryExponent);
}

/** Sample variance with divisor n − 1, rounded once. NaN of fewer than two readings. */
export function sampleVariance(values: readonly number[]): number {
  const n = BigInt(values.length);
  if (n < 2n || !allFinite(values)) return NaN;
  const { wholes, decimalScale, binaryExponent } = inWholes(values);
  const scale = BigInt(decimalScale);
  return quotient(deviations(wholes), n * (n - 1n) * scale * scale, 2 * binaryExponent);
}

/** Sample standard deviation with divisor n − 1, in the unit of the readings. NaN of fewer than two readings. */
export const sampleStandardDeviation = (values: readonly number[]): number =>
  Math.sqrt(sampleVariance(values));

/** n Σk² − (Σk)², exact. */
function deviations(wholes: readonly bigint[]): bigint {
  // Shifting by the first whole keeps the products short; the result is the same number.
  const first = wholes[0] ?? 0n;
  let sum = 0n;
  let squares = 0n;
  for (const whole of wholes) {
    const shifted = whole - first;
    sum += shifted;
    squares += shifted * shifted;
  }
  return BigInt(wholes.length) * squares - sum * sum;
}
