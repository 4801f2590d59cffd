/** The programs the suites need beside Node.js: PostgreSQL, Chromium, and a Python that has SciPy. */
import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { ensureDebian, which } from '../../server/cli/house/debian.mjs';
import { ensurePostgres, holdPostgres } from '../../server/cli/house/postgres.mjs';
import { inWords } from '../../server/cli/house/trouble.mjs';

const findChromium = () =>
  [process.env.CHROMIUM_PATH, which('chromium'), which('chromium-browser')].find(
    (file) => file && existsSync(file),
  ) ?? null;

const hasScipy = (python) =>
  spawnSync(python, ['-c', 'import scipy.stats'], { stdio: 'ignore' }).status === 0;

/** Debian's own interpreter is the one its scipy package serves; another on the PATH may have its own. */
const findPython = () =>
  [process.env.PYTHON, '/usr/bin/python3', which('python3')].filter(Boolean).find(hasScipy) ?? null;

const chromium = {
  missing: 'The browser tests need Chromium, which is not installed.',
  instead: 'set CHROMIUM_PATH',
};
const scipy = {
  missing: 'The notebook check needs Python with SciPy, which is not installed.',
  instead: 'set PYTHON to an interpreter that has it',
};

/** Which suites need which tool. Of the unit tests only those of the notebooks need Python: see `notebooks` below. */
const needs = {
  database: ['api', 'e2e'],
  chromium: ['e2e'],
  python: ['unit'],
};

/**
 * Finds, installs and starts what the wanted suites need.
 * @returns `environment` for the tests, `database` to release afterwards, and `missing`: suite to reason, where
 *   `notebooks` stands for the unit specs with that word in their path
 */
export async function prepareTools(wanted, progress) {
  const environment = {};
  const missing = new Map();
  const asked = (tool) => needs[tool].filter((suite) => wanted.includes(suite));
  let database = null;

  async function get(tool, work) {
    const suites = asked(tool);
    if (suites.length === 0) return;
    try {
      await work();
    } catch (error) {
      for (const suite of tool === 'python' ? ['notebooks'] : suites) missing.set(suite, inWords(error));
    }
  }
  await Promise.all([
    get('database', async () => {
      await ensurePostgres(progress);
      database = await progress.step('Starting the test database', () => holdPostgres('pg-test'));
      environment.TEST_DATABASE_URL = database.url;
    }),
    get('chromium', async () => {
      environment.CHROMIUM_PATH = await ensureDebian('chromium', findChromium, chromium, progress);
    }),
    get('python', async () => {
      environment.PYTHON = await ensureDebian('python3-scipy', findPython, scipy, progress);
    }),
  ]);
  return { environment, database, missing };
}
