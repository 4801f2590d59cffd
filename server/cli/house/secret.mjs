/** The secret that signs session cookies, when the environment gives none. */
import { randomBytes } from 'node:crypto';
import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { runFolder } from './places.mjs';

/** Made at random once and kept readable by its owner alone, so that sign-ins outlive a restart. */
export function sessionSecret() {
  const file = join(runFolder(), 'secret');
  try {
    // "wx": of two starts at once, one writes and the other reads what was written.
    writeFileSync(file, randomBytes(32).toString('base64url'), { mode: 0o600, flag: 'wx' });
  } catch (error) {
    if (error.code !== 'EEXIST') throw error;
  }
  return readFileSync(file, 'utf8').trim();
}
