import { existsSync } from 'node:fs';
import { dirname, join } from 'node:path';

/** Folder that holds package.json; the server runs from its sources as well as from dist/. */
export function projectRoot(): string {
  let folder = __dirname;
  while (!existsSync(join(folder, 'package.json'))) {
    const parent = dirname(folder);
    if (parent === folder) throw new Error('No package.json above the server.');
    folder = parent;
  }
  return folder;
}
