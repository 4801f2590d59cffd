/** 0x01 in each of the four bytes of a word. */
const ONES = 0x01010101;

/**
 * How often a byte below 128 occurs between two places. Four bytes are compared at a time: it is most of the work of
 * reading a wide log, whose cells are mostly counted and not read.
 * @param words the same memory as `bytes`, from its beginning, four bytes a word
 */
export function countByte(
  bytes: Uint8Array,
  words: Int32Array,
  value: number,
  from: number,
  to: number,
): number {
  let n = 0;
  let at = from;
  for (; at < to && (at & 3) !== 0; at += 1) if (bytes[at] === value) n += 1;
  const pattern = value * ONES;
  const lastWord = to >> 2;
  for (let w = at >> 2; w < lastWord; w += 1) {
    // A byte is zero here where it equals `value`; the sum carries into its top bit where the low seven are not all zero.
    const difference = words[w] ^ pattern;
    const zero = ~(((difference & 0x7f7f7f7f) + 0x7f7f7f7f) | difference) & 0x80808080;
    // The product gathers the four top bits, now lowest bits, in the highest byte.
    n += Math.imul(zero >>> 7, ONES) >>> 24;
  }
  for (at = Math.max(at, lastWord << 2); at < to; at += 1) if (bytes[at] === value) n += 1;
  return n;
}
