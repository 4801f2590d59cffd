import { seededRandom } from '../../../shared/numerics';

/** A stream of chance that is the same for the same seed on every machine. */
export interface Chance {
  /** Uniform in [0, 1). */
  uniform(): number;
  /**
   * Near to normal, mean 0 and standard deviation 1: twelve uniforms summed. Unlike a logarithm, sums are the same to the
   * last bit on every machine, so the demonstration's logs are too.
   */
  normal(): number;
}

export function chanceFrom(seed: number): Chance {
  const random = seededRandom(seed);
  const uniform = (): number => random.uniform();
  return {
    uniform,
    normal: () => {
      let sum = -6;
      for (let i = 0; i < 12; i += 1) sum += uniform();
      return sum;
    },
  };
}
