/** Numerical kernels of the engine. Inner functions are total: off their domain they give NaN. */
// Sums of readings
export {
  exactSum,
  mean,
  sampleStandardDeviation,
  sampleVariance,
  sumOfSquaredDeviations,
} from './exact-sums';
export { nestedAnalysis, oneWayAnalysis } from './analysis-of-variance';
export type { NestedAnalysis, NestedReadings, OneWayAnalysis, VarianceSource } from './analysis-of-variance';
export { nestedComponents, oneWayComponents } from './variance-components';
export type { NestedComponents, OneWayComponents } from './variance-components';
// Distributions; tails are always computed on their own side
export { normalCdf, normalDensity, normalQuantile, normalTail } from './normal';
export { studentCdf, studentDensity, studentQuantile, studentTail, studentTwoSided } from './student-t';
export { betaCdf, betaDensity, betaQuantile } from './beta';
export { betaTails } from './incomplete-beta';
export type { Tails } from './incomplete-beta';
export { gammaTails } from './incomplete-gamma';
export { chiSquareCdf, chiSquareQuantile, chiSquareTail } from './chi-square';
export { fCdf, fQuantile, fTail } from './fisher-f';
export { noncentralTTails } from './noncentral-t';
export { studentizedRangeQuantile, studentizedRangeTail } from './studentized-range';
// Tools
export { gaussLegendre } from './gauss-legendre';
export { findRoot } from './find-root';
export { seededRandom } from './seeded-random';
export type { SeededRandom } from './seeded-random';
