import { createHash, randomBytes } from 'node:crypto';
import { compare, hash, truncates } from 'bcryptjs';
import { invalidFields } from '../http/problem';

/**
 * bcrypt reads 72 bytes; a password with letters beyond ASCII can be longer than that and would be cut unseen.
 * @throws HttpProblem naming `field`
 */
export async function hashPassword(password: string, cost: number, field: string): Promise<string> {
  if (truncates(password))
    throw invalidFields([
      { path: field, message: 'Keep it under 72 bytes: accents and symbols count for more.' },
    ]);
  return hash(password, cost);
}

/** Costs the same whether or not there is such an account, so that the time taken tells nothing. */
export async function passwordMatches(
  password: string,
  stored: string | null,
  cost: number,
): Promise<boolean> {
  if (stored !== null) return compare(password, stored);
  await hash(password, cost);
  return false;
}

/** A token nobody can guess, for cookies and links: 256 random bits. */
export const newToken = (): string => randomBytes(32).toString('base64url');

/** What is stored of a token. Nobody who reads the database can use it. */
export const tokenDigest = (token: string): string =>
  createHash('sha256').update(token, 'utf8').digest('hex');
