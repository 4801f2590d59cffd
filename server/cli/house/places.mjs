/** Where things lie. Everything made while working goes to the git-ignored `.run/` and `dist/`. */
import { createHash } from 'node:crypto';
import { accessSync, constants, mkdirSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { Trouble } from './trouble.mjs';

/** The clone's folder, by this file's own place: the caller's working directory plays no part. */
export const root = join(dirname(fileURLToPath(import.meta.url)), '../../..');

/** A path inside the clone. */
export const inClone = (...parts) => join(root, ...parts);

/** A folder under `.run/`, made when it is not there yet. */
export function runFolder(...parts) {
  const folder = inClone('.run', ...parts);
  try {
    mkdirSync(folder, { recursive: true });
    accessSync(folder, constants.W_OK);
  } catch {
    throw new Trouble(
      `This account may not write to ${folder}.`,
      'Start as the account that owns this clone, or make a clone of your own.',
    );
  }
  return folder;
}

/** Short name for one clone and one account: two clones on one machine never share a lock or a cluster. */
export function cloneKey(text = '') {
  const account = process.getuid?.() ?? 'any';
  return createHash('sha256').update(`${root}\n${account}\n${text}`).digest('hex').slice(0, 16);
}
