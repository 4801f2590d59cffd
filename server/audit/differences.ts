import type { z } from 'zod';
import type { differenceSchema } from '../../shared/contracts';

export type Difference = z.infer<typeof differenceSchema>;

/** A value in full: the shortest digits that give exactly this number back, or nothing where there is none. */
const written = (value: unknown): string => (value === undefined ? 'nothing' : JSON.stringify(value));

const isBranch = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null;

/**
 * Compares two values field by field, numbers bit for bit.
 * @param path where in the whole these values stand, e.g. `judgement.pairs[0].gap`
 * @returns how many single values were compared, and those that differ
 */
export function differences(
  stored: unknown,
  reRun: unknown,
  path: string,
): { fieldsCompared: number; differences: Difference[] } {
  const sameKind = isBranch(stored) && isBranch(reRun) && Array.isArray(stored) === Array.isArray(reRun);
  if (!sameKind || (Object.keys(stored).length === 0 && Object.keys(reRun).length === 0)) {
    const equal = sameKind || Object.is(stored, reRun);
    return {
      fieldsCompared: 1,
      differences: equal ? [] : [{ path, stored: written(stored), reRun: written(reRun) }],
    };
  }
  const names = [...new Set([...Object.keys(stored), ...Object.keys(reRun)])];
  const parts = names.map((name) =>
    differences(stored[name], reRun[name], Array.isArray(stored) ? `${path}[${name}]` : `${path}.${name}`),
  );
  return {
    fieldsCompared: parts.reduce((sum, part) => sum + part.fieldsCompared, 0),
    differences: parts.flatMap((part) => part.differences),
  };
}
