/**
 * Is a build still that of its sources? Judged by content: a checkout gives every file the time of the checkout,
 * so times of files say nothing.
 */
import { createHash } from 'node:crypto';
import { readFileSync, readdirSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { inClone } from './places.mjs';

/** Files no build contains: tests, their support, and the scripts that do the building. */
const isNotBuilt = (path) => /\.spec\.ts$|\.mjs$|(^|\/)src\/testing(\/|$)/.test(path);

function* filesOf(path) {
  const full = inClone(path);
  const found = statSync(full, { throwIfNoEntry: false });
  if (!found || isNotBuilt(path)) return;
  if (found.isFile()) return yield path;
  for (const name of readdirSync(full).sort()) yield* filesOf(join(path, name));
}

/**
 * One digest over the names and contents of all files under `inputs`.
 * @param inputs files and folders, relative to the clone; those missing count as empty
 */
export function digestOf(inputs) {
  const hash = createHash('sha256');
  for (const input of inputs) {
    for (const file of filesOf(input)) {
      const content = readFileSync(inClone(file));
      hash.update(`${file}\n${content.length}\n`).update(content);
    }
  }
  return hash.digest('hex');
}
