import { countByte } from '../../../shared/reduction/count-bytes';
import { Random } from './random';

describe('counting a byte four at a time', () => {
  it('agrees with counting one by one, from any place to any place and beside any neighbours', () => {
    const r = new Random(12);
    // Bytes that differ from a comma in one bit only, and those that carries could upset.
    const likely = [44, 45, 46, 40, 36, 60, 12, 108, 172, 0, 255, 128, 43];
    for (let k = 0; k < 400; k += 1) {
      const bytes = Uint8Array.from({ length: 64 }, () => (r.chance(0.7) ? r.pick(likely) : r.whole(0, 255)));
      const words = new Int32Array(bytes.buffer);
      const from = r.whole(0, 63);
      const to = r.whole(from, 64);
      expect(countByte(bytes, words, 44, from, to)).toBe(
        bytes.subarray(from, to).filter((byte) => byte === 44).length,
      );
    }
  });
});
