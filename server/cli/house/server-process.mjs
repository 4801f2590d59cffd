/**
 * The server as a child process. It says over its message channel
 *   {"type": "progress", "text"}            what it is doing before it is ready
 *   {"type": "ready", "address", "signIns"} when it takes requests; sign-ins are the demo's accounts, if any
 * and stops by itself when the channel closes, which happens however we end.
 */
import { serverProgram } from './builds.mjs';
import { firstFreePort } from './port.mjs';
import { root } from './places.mjs';
import { start, stop } from './processes.mjs';
import { Trouble } from './trouble.mjs';

async function choosePort(wanted, host) {
  try {
    return await firstFreePort(wanted, host);
  } catch (error) {
    const why = { EACCES: 'this account may not', EADDRNOTAVAIL: 'this machine has no such address' };
    const reason = why[error.code] ?? error.message;
    throw new Trouble(`Cannot listen on ${host}, port ${wanted}: ${reason}.`, 'Set HOST and PORT to others.');
  }
}

/** Starts the server on `port`; resolves to its first "ready", or to null when it ended before. */
function launch(environment, port, onProgress) {
  const child = start(process.execPath, ['--enable-source-maps', serverProgram], {
    cwd: root,
    env: { ...environment, PORT: String(port) },
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
    // Requests being answered are finished first.
    patienceMs: 8000,
  });
  const ready = new Promise((resolve, reject) => {
    child.on('message', (message) => {
      if (message?.type === 'progress') onProgress(message.text);
      if (message?.type === 'ready') resolve(message);
    });
    child.once('exit', () => resolve(null));
    child.once('error', reject);
  });
  return { child, ready };
}

/**
 * Starts the server and waits until it takes requests.
 * @param environment what the server reads its settings from; PORT and HOST choose where it listens
 * @returns `address`, `signIns`, `ended` (a promise of how it ended) and `stop()`
 */
export async function startServerProcess(environment, progress) {
  const host = environment.HOST || '127.0.0.1';
  const wanted = Number(environment.PORT || 4100);
  if (!Number.isInteger(wanted) || wanted < 0 || wanted > 65535) {
    throw new Trouble(
      `PORT is "${environment.PORT}".`,
      'Set it to a number from 0 to 65535, or leave it unset for 4100.',
    );
  }
  return progress.step('Starting the server', async (relabel) => {
    for (let attempt = 1; ; attempt += 1) {
      const port = await choosePort(wanted, host);
      if (port !== wanted && wanted !== 0) {
        progress.say(
          `  Port ${wanted} is taken by another program: using ${port}. Set PORT to choose another.`,
        );
      }
      const { child, ready } = launch({ ...environment, HOST: host }, port, (text) =>
        relabel(`Starting the server: ${text}`),
      );
      const message = await ready;
      if (message) {
        relabel('Starting the server');
        const ended = new Promise((resolve) => child.once('exit', (code, signal) => resolve(code ?? signal)));
        return { address: message.address, signIns: message.signIns ?? [], ended, stop: () => stop(child) };
      }
      // Two starts can find the same port free; the one that listens second ends, and looks again.
      const lostTheRace = attempt < 5 && (await choosePort(port, host)) !== port;
      if (!lostTheRace) throw new Trouble('The server ended before it was ready; what it said is above.');
    }
  });
}
