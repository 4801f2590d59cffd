/** A stream of chance that is the same for the same seed on every machine: only whole-number arithmetic and sums. */
export interface Chance {
  /** Uniform in [0, 1). */
  uniform(): number;
  /** Near to normal, mean 0 and standard deviation 1: twelve uniforms summed, exact on every machine. */
  normal(): number;
}

/** The sfc32 generator (Doty-Humphrey, PractRand; from memory), seeded by one number. */
export function chanceFrom(seed: number): Chance {
  let [a, b, c, count] = [seed | 0, 0x9e3779b9 | 0, 0x243f6a88 | 0, 1];
  const next = (): number => {
    const sum = (((a + b) | 0) + count) | 0;
    count = (count + 1) | 0;
    a = b ^ (b >>> 9);
    b = (c + (c << 3)) | 0;
    c = (((c << 21) | (c >>> 11)) + sum) | 0;
    return sum >>> 0;
  };
  // The first numbers still resemble the seed.
  for (let i = 0; i < 16; i += 1) next();
  const uniform = (): number => next() / 4294967296;
  return {
    uniform,
    normal: () => {
      let sum = -6;
      for (let i = 0; i < 12; i += 1) sum += uniform();
      return sum;
    },
  };
}
