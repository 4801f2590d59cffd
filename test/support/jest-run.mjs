/** Runs Jest projects as one child process and reads its counts from its own report. */
import { existsSync, readFileSync, rmSync } from 'node:fs';
import { join, relative, sep } from 'node:path';
import { root, runFolder } from '../../server/cli/house/places.mjs';
import { run } from '../../server/cli/house/processes.mjs';

/** A run that hangs (a server that never answers) is ended rather than waited for. */
const PATIENCE_MS = 15 * 60_000;

/** The project a spec file belongs to. */
function projectOf(file) {
  const [top, folder] = relative(root, file).split(sep);
  return top === 'test' ? folder : 'component';
}

const empty = (name) => ({ name, passed: 0, failed: 0, skipped: 0, seconds: 0, failures: [] });

/** Adds one spec file's results to its project's suite. */
function count(suite, file) {
  const where = relative(root, file.name);
  suite.seconds += (file.endTime - file.startTime) / 1000;
  for (const test of file.assertionResults) {
    if (test.status === 'passed') suite.passed += 1;
    else if (test.status === 'failed') {
      suite.failed += 1;
      suite.failures.push(`${where}: ${test.fullName}`);
    } else suite.skipped += 1;
  }
  // A file that cannot be loaded holds tests that did not run: one failure, though no test has failed.
  const broken = file.status === 'failed' && !file.assertionResults.some((test) => test.status === 'failed');
  if (broken) {
    suite.failed += 1;
    suite.failures.push(`${where}: could not run`);
  }
}

/**
 * @param projects names of Jest projects; none gives no suites
 * @param options further words for Jest's command line
 * @returns one suite for each project, in the order given
 */
export async function runJest(projects, options, environment, progress) {
  if (projects.length === 0) return [];
  progress.say(`\nJest: ${projects.join(', ')}`);
  const report = join(runFolder('test'), `jest-${projects[0]}.json`);
  rmSync(report, { force: true });
  const command = ['node_modules/jest/bin/jest.js', '--selectProjects', ...projects, '--passWithNoTests'];
  const { code } = await run(process.execPath, [...command, ...options, '--json', `--outputFile=${report}`], {
    cwd: root,
    timeoutMs: PATIENCE_MS,
    env: { ...process.env, ...environment, FORCE_COLOR: '0' },
    onOutput: (piece) => process.stdout.write(piece),
  });
  const suites = new Map(projects.map((name) => [name, empty(name)]));
  if (existsSync(report)) {
    for (const file of JSON.parse(readFileSync(report, 'utf8')).testResults)
      count(suites.get(projectOf(file.name)), file);
  }
  const list = [...suites.values()];
  for (const suite of list) {
    // A suite of nothing would pass for ever.
    if (suite.passed + suite.failed + suite.skipped > 0) continue;
    suite.failed = 1;
    suite.failures.push(
      existsSync(report) ? 'no tests were found' : `Jest ended with ${code} and left no report`,
    );
  }
  if (code !== 0 && list.every((suite) => suite.failed === 0)) {
    list[0].failed = 1;
    list[0].failures.push(`Jest ended with ${code} although every test passed`);
  }
  return list;
}
