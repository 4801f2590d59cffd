/**
 * Child processes, each in a process group of its own, so that stopping one stops whatever it started too,
 * and Ctrl-C reaches only us: we decide the order in which things stop.
 */
import { spawn } from 'node:child_process';

const running = new Set();
let stopping = false;

/**
 * Starts a child that `stopChildren` will stop.
 * @param options.patienceMs how long it may take to stop when asked; installs and builds hold nothing worth waiting for
 */
export function start(command, args, { patienceMs = 700, ...options } = {}) {
  // Whoever was waiting for a child that we stopped must not go on with the next one.
  if (stopping) throw new Error('Stopping.');
  const child = spawn(command, args, { detached: true, stdio: 'ignore', ...options });
  child.patienceMs = patienceMs;
  running.add(child);
  child.once('exit', () => running.delete(child));
  child.once('error', () => running.delete(child));
  return child;
}

/**
 * Runs a command to its end.
 * @param options.onOutput gets every piece of output; without it the output is only collected
 * @param options.timeoutMs after this long it is stopped
 * @returns exit code (or signal name) and all output, standard output and error as they came
 * @throws when the command cannot be started at all
 */
export function run(command, args, { onOutput, input, timeoutMs, ...options } = {}) {
  return new Promise((resolve, reject) => {
    const stdio = [input === undefined ? 'ignore' : 'pipe', 'pipe', 'pipe'];
    const child = start(command, args, { ...options, stdio });
    let output = '';
    const take = (piece) => {
      output += piece;
      onOutput?.(String(piece));
    };
    child.stdout.on('data', take);
    child.stderr.on('data', take);
    if (input !== undefined) child.stdin.end(input);
    const patience = timeoutMs ? setTimeout(() => void stop(child), timeoutMs) : undefined;
    child.once('error', reject);
    child.once('close', (code, signal) => {
      clearTimeout(patience);
      resolve({ code: code ?? signal, output });
    });
  });
}

function signalGroup(child, signal) {
  try {
    process.kill(-child.pid, signal);
  } catch {
    // The group has gone already, which is what was wanted.
  }
}

/** Resolves once the child has gone; asks first, insists when its patience is over. */
export function stop(child) {
  if (child.exitCode !== null || child.signalCode !== null) return Promise.resolve();
  return new Promise((resolve) => {
    const insist = setTimeout(() => signalGroup(child, 'SIGKILL'), child.patienceMs);
    child.ref();
    child.once('exit', () => {
      clearTimeout(insist);
      // A child can leave helpers behind in its group (a bundler's service, test workers): none may stay.
      signalGroup(child, 'SIGKILL');
      resolve();
    });
    signalGroup(child, 'SIGTERM');
  });
}

/** Stops everything started here, for good: nothing more is started. */
export function stopChildren() {
  stopping = true;
  return Promise.all([...running].map((child) => stop(child)));
}
