/**
 * When to stop: Ctrl-C, SIGTERM, a closed terminal, or the death of whoever started us.
 * npm does not pass SIGTERM on to its script and cannot pass SIGKILL on, so the parent is watched instead.
 */
import { readFileSync } from 'node:fs';

const WATCH_MS = 500;

/** Parent, state and start time of a process, or null when it has gone (Linux only; elsewhere always null). */
function about(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    const name = stat.slice(stat.indexOf('(') + 1, stat.lastIndexOf(')'));
    return { name, parent: Number(fields[1]), since: fields[19], dead: fields[0] === 'Z' };
  } catch {
    return null;
  }
}

/** Those whose death ends us: the parent and, when that is only the shell npm runs scripts in, npm itself. */
function guardians() {
  const parent = about(process.ppid);
  if (!parent) return [];
  const found = [{ pid: process.ppid, since: parent.since }];
  if (process.env.npm_lifecycle_event && /^(sh|dash|bash|ash|busybox)$/.test(parent.name)) {
    const above = about(parent.parent);
    if (above) found.push({ pid: parent.parent, since: above.since });
  }
  return found;
}

/**
 * Calls `end(exitCode)` once, at the first reason to stop. A second signal ends the process there and then;
 * the database's keeper notices that by itself and stops the database.
 */
export function whenToStop(end) {
  const parent = process.ppid;
  const watched = guardians();
  let ending = false;

  const finish = (code) => {
    if (ending) process.exit(code);
    ending = true;
    clearInterval(watch);
    void end(code);
  };
  const watch = setInterval(() => {
    const orphaned = watched.some(({ pid, since }) => {
      const now = about(pid);
      return !now || now.dead || now.since !== since;
    });
    if (orphaned || process.ppid !== parent) finish(143);
  }, WATCH_MS);
  watch.unref();

  process.on('SIGINT', () => finish(130));
  process.on('SIGTERM', () => finish(143));
  process.on('SIGHUP', () => finish(129));
}
