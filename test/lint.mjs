/**
 * `npm run lint`: form, rules, types, layers and leftovers, two steps at a time.
 * Each step is one command; `npm test` counts each as one test.
 */
import { fileURLToPath } from 'node:url';
import { ensurePackages } from '../server/cli/house/packages.mjs';
import { root } from '../server/cli/house/places.mjs';
import { run, stopChildren } from '../server/cli/house/processes.mjs';
import { createProgress } from '../server/cli/house/progress.mjs';
import { inWords } from '../server/cli/house/trouble.mjs';
import { whenToStop } from '../server/cli/house/lifetime.mjs';

const tsc = 'node_modules/typescript/bin/tsc';
const ngc = 'node_modules/@angular/compiler-cli/bundles/src/bin/ngc.js';

/** Longest first, so that the last ones to run are short and both cores stay busy. */
const steps = [
  { name: 'rules (eslint)', command: ['node_modules/eslint/bin/eslint.js', '.', '--max-warnings=0'] },
  {
    name: 'types of the application, its templates included',
    command: [ngc, '-p', 'src/tsconfig.app.json', '--noEmit'],
  },
  {
    name: 'form (prettier)',
    command: ['node_modules/prettier/bin/prettier.cjs', '--check', '--log-level=warn', '.'],
  },
  { name: 'types of the component specs', command: [tsc, '-p', 'src/tsconfig.spec.json', '--noEmit'] },
  { name: 'types of the tests', command: [tsc, '-p', 'test/tsconfig.json', '--noEmit'] },
  {
    name: 'types of the server',
    command: [tsc, '-p', 'server/tsconfig.json', '--noEmit', '--incremental', 'false'],
  },
  {
    name: 'layers (dependency-cruiser)',
    command: [
      'node_modules/dependency-cruiser/bin/dependency-cruise.mjs',
      '--config',
      '.dependency-cruiser.cjs',
      'shared',
      'server',
      'src',
      'test',
    ],
  },
  { name: 'types of the web workers', command: [tsc, '-p', 'src/tsconfig.worker.json', '--noEmit'] },
  { name: 'types of the shared engine', command: [tsc, '-p', 'shared/tsconfig.json', '--noEmit'] },
  { name: 'leftovers (knip)', command: ['node_modules/knip/bin/knip.js', '--no-progress'] },
];

/**
 * Runs every step, however many fail.
 * @returns for each step its name, whether it passed, seconds taken and its output
 */
export async function lint(progress) {
  const waiting = [...steps];
  const results = [];
  async function work() {
    for (let step = waiting.shift(); step; step = waiting.shift()) {
      const from = Date.now();
      const { code, output } = await run(process.execPath, step.command, { cwd: root });
      const result = {
        name: step.name,
        passed: code === 0,
        seconds: (Date.now() - from) / 1000,
        output: output.trim(),
      };
      results.push(result);
      const mark = result.passed ? 'passed' : 'FAILED';
      progress.say(`  ${mark}  ${step.name}  ${result.seconds.toFixed(1)} s`);
    }
  }
  await Promise.all([work(), work()]);
  for (const { name, output } of results.filter((result) => !result.passed))
    progress.say(`\n--- ${name}\n${output}\n`);
  return results;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  whenToStop(async (code) => {
    await stopChildren();
    process.exit(code);
  });
  try {
    const progress = createProgress();
    await ensurePackages(progress);
    const failed = (await lint(progress)).filter((result) => !result.passed);
    if (failed.length) progress.say(`Lint: ${failed.length} of ${steps.length} steps failed.`);
    else progress.say('Lint: all steps passed.');
    process.exitCode = failed.length ? 1 : 0;
  } catch (error) {
    console.error(inWords(error));
    process.exitCode = 1;
  }
}
