/** Chance that can be repeated: the same seed gives the same numbers on every machine. */
export interface SeededRandom {
  /** Uniform on [0, 1), 32 bits. */
  uniform(): number;
  /** Standard normal, by the polar method (Marsaglia and Bray 1964, SIAM Review 6, 260–264). */
  normal(): number;
  /** A whole number from 0 to `below` − 1, every one equally likely. */
  whole(below: number): number;
}

/**
 * The generator sfc32 (C. Doty-Humphrey, "small fast counting", passes PractRand; algorithm from memory), seeded by
 * mixing one whole number through splitmix32.
 */
export function seededRandom(seed: number): SeededRandom {
  let mixed = seed | 0;
  const splitMix = (): number => {
    mixed = (mixed + 0x9e3779b9) | 0;
    let z = mixed ^ (mixed >>> 16);
    z = Math.imul(z, 0x21f0aaad);
    z ^= z >>> 15;
    z = Math.imul(z, 0x735a2d97);
    return z ^ (z >>> 15);
  };
  let a = splitMix();
  let b = splitMix();
  let c = splitMix();
  let counter = 1;
  const next = (): number => {
    const sum = (((a + b) | 0) + counter) | 0;
    counter = (counter + 1) | 0;
    a = b ^ (b >>> 9);
    b = (c + (c << 3)) | 0;
    c = (c << 21) | (c >>> 11);
    c = (c + sum) | 0;
    return sum >>> 0;
  };
  for (let warm = 0; warm < 12; warm++) next();

  const uniform = (): number => next() / 4294967296;
  let spare: number | null = null;
  return {
    uniform,
    normal(): number {
      if (spare !== null) {
        const kept = spare;
        spare = null;
        return kept;
      }
      for (;;) {
        const u = 2 * uniform() - 1;
        const v = 2 * uniform() - 1;
        const square = u * u + v * v;
        if (square > 0 && square < 1) {
          const factor = Math.sqrt((-2 * Math.log(square)) / square);
          spare = v * factor;
          return u * factor;
        }
      }
    },
    whole(below: number): number {
      // Numbers above the last whole multiple would favour the low ones.
      const limit = 4294967296 - (4294967296 % below);
      for (;;) {
        const drawn = next();
        if (drawn < limit) return drawn % below;
      }
    },
  };
}
