/**
 * Readings as whole numbers of a common step, so that sums of them and of their squares are exact.
 *
 * Readings of one sensor are decimals with few digits: scaled to integers they add up without any rounding. Other
 * doubles are integers times a power of two. One rounding is made, at the end, so no order of the readings changes a digit.
 */

/** value = whole / decimals · 2^exponent */
export interface Unit {
  /** Power of ten the wholes are to be divided by. */
  readonly decimals: number;
  readonly exponent: number;
}

/** Plain numbers while each is exact. */
export type Shifted = Float64Array | readonly bigint[];

export interface WholeReadings {
  readonly unit: Unit;
  /** The first reading. */
  readonly origin: bigint;
  /** Readings less the first, in the order given. */
  readonly shifted: Shifted;
}

const LARGEST_EXACT = 2 ** 53;
/** 10^11 squared is 10^22, the last power of ten that a double holds exactly. */
const MOST_DECIMALS = 11;

const bits = new DataView(new ArrayBuffer(8));

/** Finite readings, at least one, as wholes. */
export const toWholes = (values: readonly number[]): WholeReadings =>
  asDecimals(values) ?? asBinaries(values);

/** With the fewest decimals that write every reading as a double would be read back; null when 11 do not. */
function asDecimals(values: readonly number[]): WholeReadings | null {
  const wholes = new Float64Array(values.length);
  for (let decimals = 0; decimals <= MOST_DECIMALS; decimals++) {
    const scale = 10 ** decimals;
    if (fillWholes(wholes, values, scale)) return shiftByFirst(wholes, { decimals: scale, exponent: 0 });
  }
  return null;
}

function fillWholes(wholes: Float64Array, values: readonly number[], scale: number): boolean {
  for (let index = 0; index < values.length; index++) {
    const value = values[index];
    const whole = Math.round(value * scale);
    if (Math.abs(whole) >= LARGEST_EXACT || whole / scale !== value) return false;
    wholes[index] = whole;
  }
  return true;
}

function shiftByFirst(wholes: Float64Array, unit: Unit): WholeReadings {
  const first = wholes[0];
  const origin = BigInt(first);
  const shifted = wholes.map((whole) => whole - first);
  // A difference of two large wholes may have been rounded.
  return shifted.every((whole) => Math.abs(whole) <= LARGEST_EXACT)
    ? { unit, origin, shifted }
    : { unit, origin, shifted: Array.from(wholes, (whole) => BigInt(whole) - origin) };
}

function asBinaries(values: readonly number[]): WholeReadings {
  const parts = values.map(split);
  const lowest = parts.reduce(
    (least, { whole, exponent }) => (whole === 0n ? least : Math.min(least, exponent)),
    Infinity,
  );
  const exponent = lowest === Infinity ? 0 : lowest;
  const wholes = parts.map((part) =>
    part.whole === 0n ? 0n : part.whole << BigInt(part.exponent - exponent),
  );
  const origin = wholes[0];
  return { unit: { decimals: 1, exponent }, origin, shifted: wholes.map((whole) => whole - origin) };
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

export interface PowerSums {
  readonly count: bigint;
  readonly sum: bigint;
  readonly squares: bigint;
}

/** Sums of wholes and of their squares, exact; plain arithmetic where no partial sum can leave the exact range. */
export function powerSums(wholes: Shifted): PowerSums {
  const count = BigInt(wholes.length);
  if (wholes instanceof Float64Array) {
    let largest = 0;
    for (const whole of wholes) largest = Math.max(largest, Math.abs(whole));
    if (largest * Math.max(1, largest) * wholes.length < LARGEST_EXACT) {
      let sum = 0;
      let squares = 0;
      for (const whole of wholes) {
        sum += whole;
        squares += whole * whole;
      }
      return { count, sum: BigInt(sum), squares: BigInt(squares) };
    }
  }
  let sum = 0n;
  let squares = 0n;
  for (const each of wholes) {
    const whole = BigInt(each);
    sum += whole;
    squares += whole * whole;
  }
  return { count, sum, squares };
}

/** n Σk² − (Σk)², n times the sum of squared deviations; the same for shifted wholes. */
export const spreadOf = ({ count, sum, squares }: PowerSums): bigint => count * squares - sum * sum;
