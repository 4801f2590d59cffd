/** `npm run build`: builds what is stale; `npm run build -- --force` builds all. */
import { parseArgs } from 'node:util';
import { ensureBuilds } from './house/builds.mjs';
import { whenToStop } from './house/lifetime.mjs';
import { checkNode } from './house/node-version.mjs';
import { ensurePackages } from './house/packages.mjs';
import { stopChildren } from './house/processes.mjs';
import { createProgress } from './house/progress.mjs';
import { inWords } from './house/trouble.mjs';

const progress = createProgress();
whenToStop(async (code) => {
  await stopChildren();
  process.exit(code);
});
try {
  const { values } = parseArgs({ options: { force: { type: 'boolean', default: false } } });
  checkNode(progress);
  await ensurePackages(progress);
  await ensureBuilds(progress, values);
  progress.say('Built: dist/web and dist/server are those of the sources.');
} catch (error) {
  progress.say(inWords(error));
  process.exitCode = 1;
}
