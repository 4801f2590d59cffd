/**
 * `npm run -s judge -- request.json` (or `-` for standard input): one judgement without server or database.
 * Standard output carries the judgement alone, so whatever this script has to say goes to standard error.
 * The work is done by judge.ts: from the compiled server where that is current, else straight from the source.
 */
import { createRequire } from 'node:module';
import { inClone } from './house/places.mjs';
import { serverIsFresh } from './house/builds.mjs';
import { ensurePackages } from './house/packages.mjs';
import { createProgress } from './house/progress.mjs';
import { inWords } from './house/trouble.mjs';

const require = createRequire(import.meta.url);

async function load() {
  if (serverIsFresh()) return require(inClone('dist/server/server/cli/judge.js'));
  // Read by tsx when it is loaded; by default it looks in the working directory, which is the caller's.
  process.env.TSX_TSCONFIG_PATH = inClone('server/tsconfig.json');
  const { register } = await import('tsx/cjs/api');
  register();
  return require(inClone('server/cli/judge.ts'));
}

try {
  await ensurePackages(createProgress(process.stderr));
  const { main } = await load();
  // npm runs scripts in the clone; file names on the command line are meant from where the caller stands.
  if (process.env.npm_lifecycle_event === 'judge' && process.env.INIT_CWD)
    process.chdir(process.env.INIT_CWD);
  process.exitCode = await main(process.argv.slice(2));
} catch (error) {
  console.error(inWords(error));
  process.exitCode = 1;
}
