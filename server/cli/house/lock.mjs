/**
 * A lock between processes of one clone: two starts at once must not install or build into one another.
 * It is a listening socket with an abstract name: the kernel allows one listener and frees the name the moment
 * its process ends, however it ends, so there is never a stale lock to judge. (Linux only, as Debian is.)
 */
import { createServer } from 'node:net';
import { setTimeout as pause } from 'node:timers/promises';
import { cloneKey } from './places.mjs';

const RETRY_MS = 150;

/** The abstract socket name for `purpose` in this clone. */
export const socketName = (purpose) => `\0tenthmark-${cloneKey(purpose)}`;

function tryToListen(name) {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.once('error', (error) => (error.code === 'EADDRINUSE' ? resolve(null) : reject(error)));
    server.listen(name, () => {
      server.unref();
      resolve(server);
    });
  });
}

/**
 * Runs `work` while no other process of this clone holds `purpose`.
 * @param onWait called once when somebody else holds it
 */
export async function withLock(purpose, work, onWait) {
  let held = await tryToListen(socketName(purpose));
  if (!held) onWait?.();
  while (!held) {
    await pause(RETRY_MS);
    held = await tryToListen(socketName(purpose));
  }
  try {
    return await work();
  } finally {
    held.close();
  }
}
