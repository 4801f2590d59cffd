/** Programs from Debian's own packages: found, or installed when we may. */
import { existsSync, writeFileSync } from 'node:fs';
import { spawn } from 'node:child_process';
import { delimiter, join } from 'node:path';
import { runFolder } from './places.mjs';
import { Trouble } from './trouble.mjs';

/** Full path of a program on the PATH, or null. */
export function which(program) {
  const folders = (process.env.PATH ?? '').split(delimiter).filter(Boolean);
  return folders.map((folder) => join(folder, program)).find((file) => existsSync(file)) ?? null;
}

/** True when this account may install Debian packages. */
const mayInstall = () => process.getuid?.() === 0 && which('apt-get') !== null;

/**
 * Runs apt-get to its end even if we are stopped meanwhile: a package manager cut short leaves the machine
 * half-configured, which is worse than a few seconds of work nobody waits for.
 */
function aptGet(args) {
  return new Promise((resolve, reject) => {
    const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive', LC_ALL: 'C.UTF-8' };
    // Wait for another apt (unattended upgrades on a fresh machine) instead of failing on its lock.
    const child = spawn('apt-get', ['-o', 'DPkg::Lock::Timeout=600', ...args], {
      env,
      detached: true,
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    let output = '';
    child.stdout.on('data', (piece) => (output += piece));
    child.stderr.on('data', (piece) => (output += piece));
    child.once('error', reject);
    child.once('close', (code) => resolve({ code, output }));
  });
}

let queue = Promise.resolve();
let lists = null;

async function install(name) {
  const updated = await (lists ??= aptGet(['-q', 'update']));
  const installed = await aptGet(['-q', 'install', '-y', '--no-install-recommends', name]);
  if (installed.code === 0) return;
  const log = join(runFolder('log'), `apt-${name}.log`);
  writeFileSync(log, `${updated.output}\n${installed.output}`);
  const line =
    installed.output.split('\n').find((text) => text.startsWith('E:')) ??
    `apt-get ended with ${installed.code}.`;
  throw new Trouble(
    `Debian's package ${name} could not be installed: ${line.replace(/^E:\s*/, '')}`,
    `Check the network, run "apt-get install ${name}" by hand, then start again; its words are in ${log}.`,
  );
}

/**
 * Makes sure that a Debian package is there.
 * @param find returns what is looked for (a path), or null when it is missing
 * @param remedy what to do instead when we may not install
 * @throws Trouble when it is missing and cannot be installed
 */
export async function ensureDebian(name, find, remedy, progress) {
  const found = find();
  if (found) return found;
  if (!mayInstall()) {
    throw new Trouble(
      `${remedy.missing} Only root may install it.`,
      `Run "sudo apt-get install --no-install-recommends ${name}"${remedy.instead ? `, or ${remedy.instead}` : ''}, then start again.`,
    );
  }
  // One apt-get at a time: two of our own would wait for each other's lock without saying so.
  const mine = queue.then(() =>
    progress.step(`Installing ${name} from Debian's packages`, () => install(name)),
  );
  queue = mine.catch(() => undefined);
  await mine;
  const after = find();
  if (!after)
    throw new Trouble(`Debian's package ${name} is installed, but what it should bring was not found.`);
  return after;
}
