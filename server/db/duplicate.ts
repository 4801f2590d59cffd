import { QueryFailedError } from 'typeorm';

/** Whether a statement failed because a unique index already holds its key; with `index`, that very one. */
export function isDuplicate(error: unknown, index?: string): boolean {
  if (!(error instanceof QueryFailedError)) return false;
  const { code, constraint } = error.driverError as { code?: string; constraint?: string };
  return code === '23505' && (index === undefined || constraint === index);
}
