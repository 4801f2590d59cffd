import { readFileSync } from 'node:fs';
import { resolve } from 'node:path';

/** A file of `reference-data/`, as parsed JSON. */
export const reference = <T>(name: string): T =>
  JSON.parse(readFileSync(resolve(__dirname, '../../reference-data', `${name}.json`), 'utf8')) as T;

/** |got − expected| / |expected|; 0 when both are equal, zero included. */
export const relativeError = (got: number, expected: number): number =>
  got === expected ? 0 : Math.abs(got - expected) / Math.abs(expected);

export interface Worst {
  readonly error: number;
  readonly where: string;
}

/** The row with the largest relative error; a NaN counts as worst of all. */
export function worstOf(rows: Iterable<readonly [where: string, got: number, expected: number]>): Worst {
  let worst: Worst = { error: 0, where: 'none' };
  for (const [where, got, expected] of rows) {
    const error = Number.isNaN(got) ? Infinity : relativeError(got, expected);
    if (error > worst.error) worst = { error, where: `${where}: got ${got}, expected ${expected}` };
  }
  return worst;
}

/** Fails, saying both values, unless `got` is within `relative` of `expected`. */
export function expectClose(
  got: number | null | undefined,
  expected: number | undefined,
  relative: number,
): void {
  const error = relativeError(got ?? NaN, expected ?? NaN);
  expect(error <= relative ? 'close' : `${got} is not ${expected}: relative error ${error}`).toBe('close');
}
