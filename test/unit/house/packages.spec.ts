import { spawnSync } from 'node:child_process';
import { cpSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';

const house = resolve(__dirname, '../../../server/cli/house');

/** Stands in for npm: notes its arguments and records the packages of the lockfile as npm does. */
const STAND_IN = `
const { appendFileSync, mkdirSync, copyFileSync, existsSync } = require('node:fs');
appendFileSync('npm-calls', process.argv.slice(2).join(' ') + '\\n');
if (existsSync('no-network')) {
  console.error('npm error code ENOTFOUND\\nnpm error network request to the registry failed');
  process.exit(1);
}
mkdirSync('node_modules', { recursive: true });
copyFileSync('package-lock.json', 'node_modules/.package-lock.json');
`;

const ASK = `
import { ensurePackages } from './server/cli/house/packages.mjs';
const progress = { say: console.log, step: (label, work) => work() };
await ensurePackages(progress).catch((error) => console.log(error.message));
`;

interface Lock {
  packages: Record<string, object>;
}

const lockOf = (version: string): Lock => ({
  packages: {
    '': {},
    'node_modules/gauge': { version, integrity: 'sha512-a' },
    // Needed on another platform, and by a package of another platform: npm leaves both out here.
    'node_modules/gauge-elsewhere': { version, integrity: 'sha512-b', optional: true, os: ['plan9'] },
    'node_modules/runtime-elsewhere': { version, integrity: 'sha512-c', optional: true },
    'node_modules/gauge-here': {
      version,
      integrity: 'sha512-d',
      optional: true,
      os: [process.platform],
      cpu: [process.arch],
    },
  },
});

describe('ensurePackages', () => {
  let clone: string;
  const write = (path: string, text: string): void => writeFileSync(join(clone, path), text);
  const calls = (): number =>
    existsSync(join(clone, 'npm-calls'))
      ? readFileSync(join(clone, 'npm-calls'), 'utf8').split('\n').length - 1
      : 0;
  const ask = (): string =>
    spawnSync(process.execPath, ['ask.mjs'], {
      cwd: clone,
      encoding: 'utf8',
      env: { ...process.env, npm_execpath: join(clone, 'npm.js') },
    }).stdout;

  beforeEach(() => {
    clone = mkdtempSync(join(tmpdir(), 'tenthmark-packages-'));
    cpSync(house, join(clone, 'server/cli/house'), { recursive: true });
    write('npm.js', STAND_IN);
    write('ask.mjs', ASK);
    write('package-lock.json', JSON.stringify(lockOf('1.0.0')));
  });
  afterEach(() => rmSync(clone, { recursive: true, force: true }));

  it('installs once, from the lockfile, without install scripts, and again when the lockfile changes', () => {
    ask();
    ask();
    expect(calls()).toBe(1);
    expect(readFileSync(join(clone, 'npm-calls'), 'utf8')).toMatch(/^ci --ignore-scripts --prefer-offline/);
    write('package-lock.json', JSON.stringify(lockOf('1.0.1')));
    ask();
    expect(calls()).toBe(2);
  });

  it('leaves alone what npm installed before, less what only other platforms need', () => {
    const { packages } = lockOf('1.0.0');
    delete packages['node_modules/gauge-elsewhere'];
    delete packages['node_modules/runtime-elsewhere'];
    mkdirSync(join(clone, 'node_modules'));
    write('node_modules/.package-lock.json', JSON.stringify({ packages }));
    ask();
    expect(calls()).toBe(0);
  });

  it('installs when a package of this platform is missing from what npm installed before', () => {
    const { packages } = lockOf('1.0.0');
    delete packages['node_modules/gauge-here'];
    mkdirSync(join(clone, 'node_modules'));
    write('node_modules/.package-lock.json', JSON.stringify({ packages }));
    ask();
    expect(calls()).toBe(1);
  });

  it("says npm's reason in one line and tries again next time", () => {
    write('no-network', '');
    const said = ask();
    expect(said).toContain('The packages could not be installed: network request to the registry failed');
    expect(said.trim().split('\n')).toHaveLength(1);
    rmSync(join(clone, 'no-network'));
    ask();
    expect(calls()).toBe(2);
  });
});
