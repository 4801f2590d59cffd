import { RunSummary } from '../../../shared/contracts/run-summary';

/** Whether two reductions of a log have the same numbers, to the last digit. Words are not compared. */
export function sameNumbers(seen: RunSummary, stored: RunSummary): boolean {
  return alike({ ...seen, findings: [] }, { ...stored, findings: [] });
}

function alike(one: unknown, other: unknown): boolean {
  if (isRecord(one) && isRecord(other))
    return Object.keys({ ...one, ...other }).every((key) => alike(one[key], other[key]));
  // 0 and −0 are one number on the way through JSON.
  return typeof one === 'number' || typeof other === 'number'
    ? one === other
    : (one === null) === (other === null);
}

const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null;
