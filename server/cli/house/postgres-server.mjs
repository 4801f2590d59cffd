/** Making, starting and stopping one PostgreSQL server from its programs. Used by the keeper alone. */
import { spawn } from 'node:child_process';
import {
  closeSync,
  existsSync,
  openSync,
  readFileSync,
  readdirSync,
  readlinkSync,
  realpathSync,
  renameSync,
  rmSync,
  statSync,
} from 'node:fs';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { isTaken } from './port.mjs';
import { password, programsFor } from './postgres-home.mjs';
import { run } from './processes.mjs';
import { Trouble } from './trouble.mjs';

const superuser = 'tenthmark';
const LOG_LIMIT_BYTES = 5_000_000;
/** Recovering a large cluster after a crash can take minutes; it is alive and says "starting" all the while. */
const READY_WITHIN_MS = 300_000;
const RETRY_WITHIN_MS = 20_000;

// English messages, because some of them are recognised below.
const environment = { PATH: process.env.PATH, LC_ALL: 'C.UTF-8', TZ: 'UTC' };
const asAccount = (account) => ({ ...account, cwd: '/', env: environment });

/** Makes the data folder when there is none. It appears under its name only when complete. */
export async function makeCluster({ home, account, throwAway }) {
  const data = join(home, 'data');
  if (existsSync(join(data, 'PG_VERSION'))) return;
  const bin = programsFor(data);
  const unfinished = join(home, 'data.new');
  rmSync(unfinished, { recursive: true, force: true });
  password(home, account);
  const args = ['-D', unfinished, '-U', superuser, '-E', 'UTF8', '--locale=C.UTF-8', '--auth=scram-sha-256'];
  args.push(`--pwfile=${join(home, 'password')}`, ...(throwAway ? ['--no-sync'] : []));
  const made = await run(join(bin, 'initdb'), args, asAccount(account));
  if (made.code !== 0) {
    const line =
      made.output.split('\n').find((text) => text.startsWith('initdb:')) ?? `initdb ended with ${made.code}.`;
    throw new Trouble(`PostgreSQL could not make its data folder: ${line.replace(/^initdb:\s*/, '')}.`);
  }
  // Single-user mode needs no running server, so the database is there before anyone can connect.
  const input = `CREATE DATABASE ${superuser}\n`;
  const created = await run(join(bin, 'postgres'), ['--single', '-D', unfinished, 'postgres'], {
    ...asAccount(account),
    input,
  });
  if (created.code !== 0)
    throw new Trouble(`PostgreSQL could not make its first database: ${created.output.trim()}`);
  renameSync(unfinished, data);
}

/** The lines of postmaster.pid: 0 process id, 3 port, 7 status. */
function pidFile(data) {
  try {
    return readFileSync(join(data, 'postmaster.pid'), 'utf8').split('\n');
  } catch {
    return [];
  }
}

function nameOf(pid) {
  try {
    return readFileSync(`/proc/${pid}/comm`, 'utf8').trim();
  } catch {
    return null;
  }
}

/** True for a process that has ended and only waits for its parent to notice. */
function hasEnded(pid) {
  try {
    return /\) Z /.test(readFileSync(`/proc/${pid}/stat`, 'utf8'));
  } catch {
    return true;
  }
}

/** True when process `pid` works in the folder `data`, as a server does in its own; false for one that has ended. */
function worksIn(pid, data) {
  try {
    return readlinkSync(`/proc/${pid}/cwd`) === realpathSync(data);
  } catch (error) {
    // In a container even root may not look into another account's process; then its name has to do.
    return error.code === 'EACCES' && nameOf(pid) === 'postgres' && !hasEnded(pid);
  }
}

/** True when any process still works in the data folder (a killed server's children outlive it for a moment). */
const inUse = (data) => readdirSync('/proc').some((pid) => /^\d+$/.test(pid) && worksIn(pid, data));

/** The server already running on this folder (its keeper was killed), or null. */
export async function runningServer(home) {
  const data = join(home, 'data');
  const [pid, , , port, , , , status] = pidFile(data);
  // The file outlives a killed server, and its process id may since name another program: ask where that one works.
  if (!pid || status?.trim() !== 'ready' || !worksIn(pid, data)) return null;
  if (!(await isTaken(Number(port)))) return null;
  return { pid: Number(pid), port: Number(port) };
}

/** Removes a lock file only when it provably belongs to nobody: its process id now names another program. */
function dropForeignLock(data) {
  const [pid] = pidFile(data);
  if (pid && nameOf(pid) !== 'postgres' && !inUse(data))
    rmSync(join(data, 'postmaster.pid'), { force: true });
}

async function attempt({ home, account, throwAway, port }) {
  const data = join(home, 'data');
  const settings = [`listen_addresses=127.0.0.1`, `port=${port}`, 'unix_socket_directories=', 'timezone=UTC'];
  if (throwAway) settings.push('fsync=off', 'synchronous_commit=off', 'full_page_writes=off');
  const logFile = join(home, 'postgres.log');
  if (existsSync(logFile) && statSync(logFile).size > LOG_LIMIT_BYTES) rmSync(logFile);
  const log = openSync(logFile, 'a', 0o600);
  const from = statSync(logFile).size;
  const args = ['-D', data, ...settings.flatMap((setting) => ['-c', setting])];
  const child = spawn(join(programsFor(data), 'postgres'), args, {
    ...asAccount(account),
    detached: true,
    stdio: ['ignore', log, log],
  });
  closeSync(log);
  const gone = new Promise((resolve) => child.once('exit', () => resolve(true)));
  for (const until = Date.now() + READY_WITHIN_MS; Date.now() < until;) {
    const [pid, , , , , , , status] = pidFile(data);
    if (Number(pid) === child.pid && status?.trim() === 'ready') return { pid: child.pid, port };
    if (await Promise.race([gone, pause(15, false)]))
      return { failed: readFileSync(logFile, 'utf8').slice(from) };
  }
  process.kill(child.pid, 'SIGQUIT');
  return { failed: 'FATAL: it was not ready in time' };
}

/**
 * Starts the server and waits until it takes connections.
 * @param freePort gives a port to try
 * @returns process id and port
 */
export async function startServer(cluster, freePort) {
  const data = join(cluster.home, 'data');
  for (const until = Date.now() + RETRY_WITHIN_MS; ;) {
    const result = await attempt({ ...cluster, port: await freePort() });
    if (!result.failed) return result;
    const passing = /could not (bind|create any TCP)|still in use|lock file .* already exists/.test(
      result.failed,
    );
    if (!passing || Date.now() > until) {
      const line =
        result.failed.split('\n').find((text) => /FATAL|PANIC|ERROR/.test(text)) ?? 'it ended without a word';
      const words = line.replace(/^.*?(FATAL|PANIC|ERROR):\s*/, '');
      throw new Trouble(
        `PostgreSQL did not start: ${words}.`,
        `Its log is ${join(cluster.home, 'postgres.log')}.`,
      );
    }
    dropForeignLock(data);
    await pause(300);
  }
}

/** True while the server lives. */
export const isAlive = ({ pid, home }) => worksIn(pid, join(home, 'data'));

/** Fast shutdown: open transactions are rolled back, data is written, clients are cut off. */
export async function stopServer(server) {
  // Not SIGTERM: that is the smart shutdown, which waits for clients that may never leave.
  if (isAlive(server)) process.kill(server.pid, 'SIGINT');
  for (const until = Date.now() + 30_000; isAlive(server); await pause(20)) {
    if (Date.now() > until) process.kill(server.pid, 'SIGQUIT');
  }
}
