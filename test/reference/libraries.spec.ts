import { jStat } from 'jstat';
import { mean as plainMean, sampleVariance as plainVariance } from 'simple-statistics';
import * as n from '../../shared/numerics';
import { relativeError } from '../support/reference';

/**
 * A second opinion from two general libraries, at the accuracy they are known to reach: 1e-6 in the middle of the
 * distributions, 1e-12 for moments. It would show a slip of argument order or of tails that tables of one source share.
 */
interface Distribution {
  cdf(...values: number[]): number;
}
const jstat = jStat as Record<
  'studentt' | 'normal' | 'chisquare' | 'centralF' | 'beta' | 'noncentralt',
  Distribution
>;

const DEGREES = [3, 7.5, 17.776, 60, 200];

it('Student t, chi-square and F in the middle', () => {
  for (const df of DEGREES) {
    for (const x of [-2.5, -0.7, 0.4, 1.8]) {
      expect(relativeError(n.studentCdf(x, df), jstat.studentt.cdf(x, df))).toBeLessThan(1e-6);
    }
    expect(relativeError(n.chiSquareCdf(df, df), jstat.chisquare.cdf(df, df))).toBeLessThan(1e-6);
    expect(relativeError(n.fCdf(1.3, 4, df), jstat.centralF.cdf(1.3, 4, df))).toBeLessThan(1e-6);
    expect(relativeError(n.noncentralTTails(2, df, 1).lower, jstat.noncentralt.cdf(2, df, 1))).toBeLessThan(
      1e-6,
    );
  }
});

it('normal and beta', () => {
  expect(relativeError(n.normalCdf(-1.3), jstat.normal.cdf(-1.3, 0, 1))).toBeLessThan(1e-6);
  expect(relativeError(n.betaCdf(0.3, 2, 5), jstat.beta.cdf(0.3, 2, 5))).toBeLessThan(1e-6);
  expect(n.betaCdf(n.betaQuantile(0.3, 2, 5), 2, 5)).toBeCloseTo(0.3, 13);
  expect(n.gammaTails(3, 2).upper).toBeCloseTo(n.chiSquareTail(4, 6), 15);
});

it('mean and variance', () => {
  const readings = [41.32, 41.05, 41.61, 41.18, 41.44, 40.97, 41.27, 41.52, 41.11, 41.36];
  expect(relativeError(n.mean(readings), plainMean(readings))).toBeLessThan(1e-12);
  expect(relativeError(n.sampleVariance(readings), plainVariance(readings))).toBeLessThan(1e-12);
});

describe('seeded random numbers', () => {
  it('repeat for a seed and differ between seeds', () => {
    const draw = (seed: number) => Array.from({ length: 5 }, n.seededRandom(seed).uniform);
    expect(draw(7)).toEqual(draw(7));
    expect(draw(7)).not.toEqual(draw(8));
  });
  it('have the moments of the normal distribution', () => {
    const chance = n.seededRandom(1);
    const values = Array.from({ length: 20_000 }, () => chance.normal());
    // Four standard errors: 1/√20000 for the mean, √(2/20000) for the variance.
    expect(Math.abs(plainMean(values))).toBeLessThan(4 / Math.sqrt(20_000));
    expect(Math.abs(plainVariance(values) - 1)).toBeLessThan(4 * Math.sqrt(2 / 20_000));
  });
});
