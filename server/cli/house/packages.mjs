/** The npm packages: installed from the lockfile whenever `node_modules` is not what the lockfile says. */
import { createHash } from 'node:crypto';
import { existsSync, lstatSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { withLock } from './lock.mjs';
import { inClone, root, runFolder } from './places.mjs';
import { run } from './processes.mjs';
import { Trouble } from './trouble.mjs';

const folder = inClone('node_modules');
const stamp = join(folder, '.tenthmark-lock');
const lockfile = inClone('package-lock.json');

/** What an install depends on: the lockfile, and what native packages are chosen by. */
function wanted() {
  const lock = readFileSync(lockfile);
  const node = process.versions.node.split('.')[0];
  return createHash('sha256')
    .update(lock)
    .update(`\n${node} ${process.platform} ${process.arch}`)
    .digest('hex');
}

const read = (file) => (existsSync(file) ? readFileSync(file, 'utf8') : '');

/**
 * May a package of the lockfile be missing here? Yes when it is optional and either names another platform or names
 * none: those are what other platforms' packages need. A C library that is named may be another machine's too.
 */
function mayBeMissing({ optional, os, cpu, libc }) {
  if (!optional) return false;
  const namesThisOne = os?.includes(process.platform) && (!cpu || cpu.includes(process.arch)) && !libc;
  return !namesThisOne;
}

/** True when npm's own record of what it installed has all of the lockfile: somebody ran `npm ci` by hand. */
function installedByHand() {
  const record = read(join(folder, '.package-lock.json'));
  if (!record) return false;
  const have = JSON.parse(record).packages;
  return Object.entries(JSON.parse(readFileSync(lockfile, 'utf8')).packages).every(([path, entry]) => {
    if (path === '') return true;
    if (!have[path]) return mayBeMissing(entry);
    return have[path].version === entry.version && have[path].integrity === entry.integrity;
  });
}

/** True when nothing needs installing. */
function packagesAreFresh() {
  if (!existsSync(folder)) return false;
  // A linked node_modules belongs to whoever made the link: installing through it would change another clone.
  if (lstatSync(folder).isSymbolicLink()) return true;
  const now = wanted();
  if (read(stamp) === now) return true;
  if (!installedByHand()) return false;
  writeFileSync(stamp, now);
  return true;
}

/** The npm that runs us, else the one beside this Node.js, else whatever the shell finds. */
function npmCommand() {
  const script =
    process.env.npm_execpath ?? join(dirname(process.execPath), '../lib/node_modules/npm/bin/npm-cli.js');
  return existsSync(script) && script.endsWith('.js') ? [process.execPath, script] : ['npm'];
}

async function install() {
  const [command, ...before] = npmCommand();
  // No package of the lockfile needs its install script; skipping them keeps other people's code from running as us.
  const args = [
    ...before,
    'ci',
    '--ignore-scripts',
    '--prefer-offline',
    '--no-fund',
    '--no-audit',
    '--loglevel=error',
  ];
  // A production setting of the shell would leave out the tools that build the application.
  const { code, output } = await run(command, [...args, '--include=dev'], {
    cwd: root,
    env: { ...process.env, NODE_ENV: '' },
  });
  if (code === 0) {
    writeFileSync(stamp, wanted());
    return;
  }
  const log = join(runFolder('log'), 'packages.log');
  writeFileSync(log, output);
  const line =
    output.split('\n').find((text) => /^npm error (?!code)/.test(text)) ?? `npm ended with ${code}.`;
  throw new Trouble(
    `The packages could not be installed: ${line.replace(/^npm error /, '')}`,
    `Check the network and the proxy settings, then start again; npm's own words are in ${log}.`,
  );
}

/** Installs the packages when they are missing or not the lockfile's. */
export async function ensurePackages(progress) {
  if (packagesAreFresh()) return;
  const waiting = () => progress.say('  Another start of this clone is installing packages: waiting for it.');
  await withLock(
    'packages',
    async () => {
      if (packagesAreFresh()) return;
      await progress.step('Installing packages', install);
    },
    waiting,
  );
}
