import { exactSum, mean, sampleStandardDeviation, sampleVariance } from '../../shared/numerics';
import { reference, relativeError } from '../support/reference';

/** NIST Statistical Reference Datasets, univariate: https://www.itl.nist.gov/div898/strd (source and tolerance in each file). */
interface StrdFile {
  readonly certified: { readonly mean: number; readonly sd: number };
  readonly exact_from_ieee_doubles: { readonly mean: string; readonly sd: string };
  readonly tolerance: { readonly rel_mean: number; readonly rel_sd_vs_exact_from_doubles: number };
  readonly data?: readonly number[];
}

const alternating = (first: number, low: number, high: number): number[] => [
  first,
  ...Array.from({ length: 1000 }, (_, index) => (index % 2 === 0 ? low : high)),
];
/** Sets given by their generating rule. */
const RULES: Record<string, readonly number[]> = {
  strd_numacc1: [10000001, 10000003, 10000002],
  strd_numacc4: alternating(10000000.2, 10000000.1, 10000000.3),
};

describe.each(['strd_lew', 'strd_mavro', 'strd_michelso', 'strd_numacc1', 'strd_numacc4', 'strd_pidigits'])(
  '%s',
  (name) => {
    const file = reference<StrdFile>(name);
    const data = file.data ?? RULES[name];
    it('mean and standard deviation to all certified digits, the readings being decimals', () => {
      expect(mean(data)).toBe(file.certified.mean);
      expect(sampleStandardDeviation(data)).toBeCloseTo(file.certified.sd, 12);
      expect(relativeError(sampleStandardDeviation(data), file.certified.sd)).toBeLessThan(1e-14);
    });
    it('exact figures of the doubles, when they are no decimals', () => {
      // A power of two changes no digit of a double, but so small a one leaves no short decimal.
      const small = data.map((value) => value * 2 ** -60);
      const exact = file.exact_from_ieee_doubles;
      expect(relativeError(mean(small) * 2 ** 60, Number(exact.mean))).toBeLessThan(1e-15);
      expect(relativeError(sampleStandardDeviation(small) * 2 ** 60, Number(exact.sd))).toBeLessThan(1e-15);
    });
    it('the same digits in any order', () => {
      const shuffled = [...data].sort((a, b) => Math.sin(a * 12.9898) - Math.sin(b * 12.9898));
      expect(mean(shuffled)).toBe(mean(data));
      expect(sampleVariance(shuffled)).toBe(sampleVariance(data));
    });
  },
);

describe('sums of doubles that are no short decimals', () => {
  it('round once: 1 + 2^-53 + 2^-53 is 1 + 2^-52', () => {
    expect(exactSum([1, 2 ** -53, 2 ** -53])).toBe(1 + 2 ** -52);
  });
  it('keep what plain addition loses', () => {
    expect(exactSum([1e100, 1, -1e100])).toBe(1);
    expect(mean([1e308, 1e308, 1e308])).toBe(1e308);
  });
  it('take the smallest and the largest doubles', () => {
    expect(exactSum([5e-324, 5e-324])).toBe(1e-323);
    expect(mean([Number.MAX_VALUE, -Number.MAX_VALUE])).toBe(0);
  });
  it('give the variance of thirds to the last digit', () => {
    // Exact: the doubles 1/3 and 2/3 differ by the double 1/3, so the variance is (1/3)²/2.
    expect(relativeError(sampleVariance([1 / 3, 2 / 3]), (1 / 3) ** 2 / 2)).toBeLessThan(2.3e-16);
  });
});

describe('sums off their domain', () => {
  it('are NaN for none, one or not finite', () => {
    expect(mean([])).toBeNaN();
    expect(sampleVariance([1])).toBeNaN();
    expect(mean([1, NaN])).toBeNaN();
    expect(exactSum([1, Infinity])).toBeNaN();
    expect(exactSum([])).toBe(0);
  });
});
