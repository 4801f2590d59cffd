/**
 * The two builds: the web application (`dist/web`) and the server (`dist/server`). Each is made beside its place and
 * moved there when complete, so a build cut short or failed never stands where a good one is expected, and a server
 * already running goes on serving whole files.
 */
import { existsSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { digestOf } from './fresh.mjs';
import { withLock } from './lock.mjs';
import { inClone, root, runFolder } from './places.mjs';
import { run } from './processes.mjs';
import { Trouble } from './trouble.mjs';

const always = ['package-lock.json', 'tsconfig.json', 'shared'];

const web = {
  name: 'web application',
  place: inClone('dist/web'),
  inputs: [...always, 'angular.json', 'src'],
  command: [
    'node_modules/@angular/cli/bin/ng.js',
    'build',
    '--output-path',
    'dist/.web-new',
    '--progress=false',
  ],
  made: inClone('dist/.web-new'),
  // Angular puts what browsers get into a folder of this name whenever the output path is given on the command line.
  result: inClone('dist/.web-new/browser'),
};

const server = {
  name: 'server',
  place: inClone('dist/server'),
  inputs: [...always, 'server'],
  command: [
    'node_modules/typescript/bin/tsc',
    '-p',
    'server/tsconfig.json',
    '--outDir',
    'dist/.server-new',
    '--incremental',
    'false',
  ],
  made: inClone('dist/.server-new'),
  result: inClone('dist/.server-new'),
};

/** Where a running server's program is. */
export const serverProgram = join(server.place, 'server/main.js');

const stampOf = (build) => `${build.place}.inputs`;

function isFresh(build, digest) {
  const stamp = stampOf(build);
  return existsSync(build.place) && existsSync(stamp) && readFileSync(stamp, 'utf8') === digest;
}

/** True when `dist/server` is that of the sources as they stand. */
export const serverIsFresh = () => isFresh(server, digestOf(server.inputs));

async function make(build, digest) {
  mkdirSync(inClone('dist'), { recursive: true });
  rmSync(build.made, { recursive: true, force: true });
  const { code, output } = await run(process.execPath, build.command, {
    cwd: root,
    env: { ...process.env, NG_CLI_ANALYTICS: 'false', NODE_ENV: 'production' },
  });
  const log = join(runFolder('log'), `build-${build.name.replace(' ', '-')}.log`);
  writeFileSync(log, output);
  if (code !== 0 || !existsSync(build.result)) {
    const lines = output.split('\n').filter((line) => /error/i.test(line));
    throw new Trouble(
      `The ${build.name} could not be built: ${lines[0]?.trim() ?? `the build ended with ${code}`}`,
      `All of it is in ${log}.`,
    );
  }
  rmSync(stampOf(build), { force: true });
  rmSync(build.place, { recursive: true, force: true });
  renameSync(build.result, build.place);
  rmSync(build.made, { recursive: true, force: true });
  writeFileSync(stampOf(build), digest);
}

async function ensure(build, progress, force) {
  if (!force && isFresh(build, digestOf(build.inputs))) return false;
  const waiting = () =>
    progress.say(`  Another process of this clone is building the ${build.name}: waiting for it.`);
  return withLock(
    `build ${build.name}`,
    async () => {
      // Taken again: another process may have built it while we waited.
      const digest = digestOf(build.inputs);
      if (!force && isFresh(build, digest)) return false;
      await progress.step(`Building the ${build.name}`, () => make(build, digest));
      return true;
    },
    waiting,
  );
}

/** Builds whatever is stale. Needs the packages. */
export async function ensureBuilds(progress, { force = false } = {}) {
  // Both are waited for before the first failure is told: none may be left running on its own.
  const results = await Promise.allSettled([ensure(server, progress, force), ensure(web, progress, force)]);
  const failed = results.find((result) => result.status === 'rejected');
  if (failed) throw failed.reason;
}
