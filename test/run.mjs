/**
 * `npm test`: all set-up (packages, PostgreSQL, Chromium, SciPy, builds), then lint and every Jest project.
 * The last line is always `N passed, N failed, N skipped`.
 *
 *   npm test                      everything
 *   npm test -- unit reference    only these: lint, or a folder of test/, or component
 *   node test/run.mjs --database  prints the test cluster's address and keeps it running until Ctrl-C
 *
 * A single file needs none of this: `npx jest test/api/health.spec.ts` gets the test cluster by itself
 * (test/support/hold-database.mjs). The tests find in their environment TEST_DATABASE_URL, CHROMIUM_PATH and
 * PYTHON (an interpreter that has SciPy).
 */
import { parseArgs } from 'node:util';
import { ensureBuilds } from '../server/cli/house/builds.mjs';
import { whenToStop } from '../server/cli/house/lifetime.mjs';
import { ensurePackages } from '../server/cli/house/packages.mjs';
import { holdPostgres } from '../server/cli/house/postgres.mjs';
import { stopChildren } from '../server/cli/house/processes.mjs';
import { createProgress } from '../server/cli/house/progress.mjs';
import { Trouble, inWords } from '../server/cli/house/trouble.mjs';
import { lint } from './lint.mjs';
import { runJest } from './support/jest-run.mjs';
import { prepareTools } from './support/tools.mjs';

const quick = ['unit', 'reference', 'calibration', 'component', 'api'];
/** In band after the others: it starts the whole product and a browser, and should not compete for two cores. */
const alone = ['e2e'];
const all = ['lint', ...quick, ...alone];

const progress = createProgress();
let database = null;
let ending = false;

async function end(code) {
  // Stopped by a signal, the suites fail on their way out; the signal's exit code stands.
  if (ending) return;
  ending = true;
  await stopChildren();
  await database?.release();
  process.exit(code);
}

async function keepDatabase() {
  await ensurePackages(progress);
  database = await holdPostgres('pg-test');
  progress.say(`export TEST_DATABASE_URL='${database.url}'`);
  progress.say('The test cluster runs until Ctrl-C.');
  setInterval(() => undefined, 60_000);
}

/** Lint's steps in the form of a suite. */
async function lintSuite() {
  const from = Date.now();
  progress.say('\nLint');
  const results = await lint(progress);
  const failures = results.filter((result) => !result.passed).map((result) => result.name);
  return {
    name: 'lint',
    passed: results.length - failures.length,
    failed: failures.length,
    skipped: 0,
    seconds: (Date.now() - from) / 1000,
    failures,
  };
}

function summary(suites) {
  const sum = (key) => suites.reduce((total, suite) => total + suite[key], 0);
  progress.say('\nSuite         passed  failed  skipped   seconds');
  for (const suite of suites) {
    const cells = [suite.passed, suite.failed, suite.skipped].map((count) => String(count).padStart(8));
    progress.say(`${suite.name.padEnd(12)}${cells.join('')}${suite.seconds.toFixed(1).padStart(10)}`);
  }
  const failures = suites.flatMap((suite) => suite.failures.map((failure) => `  ${suite.name}: ${failure}`));
  if (failures.length) progress.say(`\nFailed:\n${failures.join('\n')}`);
  const notes = suites.flatMap((suite) => suite.notes ?? []);
  if (notes.length) progress.say(`\n${notes.join('\n')}`);
  progress.say(`\n${sum('passed')} passed, ${sum('failed')} failed, ${sum('skipped')} skipped`);
  return sum('failed') === 0 ? 0 : 1;
}

/** A suite whose tools are missing: a failure where the machine must have them (CI), else said and skipped. */
function cannotRun(name, reason) {
  const must = Boolean(process.env.CI);
  return {
    name,
    passed: 0,
    failed: must ? 1 : 0,
    skipped: must ? 0 : 1,
    seconds: 0,
    failures: must ? [`could not run: ${reason}`] : [],
    notes: must ? [] : [`The suite ${name} did not run: ${reason}`],
  };
}

/** Packages, and the builds where a wanted suite runs the built product. A build that fails is one failed suite. */
async function prepareProduct(wanted) {
  await ensurePackages(progress);
  if (!wanted.some((name) => alone.includes(name))) return [];
  try {
    await ensureBuilds(progress);
    return [];
  } catch (error) {
    return [{ name: 'build', passed: 0, failed: 1, skipped: 0, seconds: 0, failures: [inWords(error)] }];
  }
}

async function runSuites(wanted) {
  const [tools, suites] = await Promise.all([prepareTools(wanted, progress), prepareProduct(wanted)]);
  database = tools.database;
  for (const [name, reason] of tools.missing) suites.push(cannotRun(name, reason));
  const runnable = wanted.filter((name) => !tools.missing.has(name));

  if (runnable.includes('lint')) suites.push(await lintSuite());
  const together = runnable.filter((name) => quick.includes(name));
  // Of the unit tests only the notebooks' need Python; they are left out by name where there is none.
  const options = [
    '--maxWorkers=2',
    ...(tools.missing.has('notebooks') ? ['--testPathIgnorePatterns=notebook'] : []),
  ];
  suites.push(...(await runJest(together, options, tools.environment, progress)));
  const after = runnable.filter((name) => alone.includes(name));
  suites.push(...(await runJest(after, ['--runInBand'], tools.environment, progress)));
  return summary(suites);
}

// A run cut short has no result: nothing that could be read as one may follow.
whenToStop((code) => {
  progress.close('Stopped before the end.');
  return end(code);
});
try {
  const { values, positionals } = parseArgs({
    allowPositionals: true,
    options: { database: { type: 'boolean' } },
  });
  const unknown = positionals.find((name) => !all.includes(name));
  if (unknown) throw new Trouble(`There is no suite "${unknown}".`, `The suites are ${all.join(', ')}.`);
  if (values.database) await keepDatabase();
  else await end(await runSuites(positionals.length ? positionals : all));
} catch (error) {
  progress.say(inWords(error));
  progress.say('0 passed, 1 failed, 0 skipped');
  await end(1);
}
