/** Free ports. */
import { createServer } from 'node:net';

/** Resolves to the port listened on for a moment, or null when it is taken. */
function probe(port, host) {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.once('error', (error) => (error.code === 'EADDRINUSE' ? resolve(null) : reject(error)));
    server.listen({ port, host, exclusive: true }, () => {
      const given = server.address().port;
      server.close(() => resolve(given));
    });
  });
}

/** True when somebody listens on a port of this machine. */
export const isTaken = async (port) => (await probe(port, '127.0.0.1')) === null;

/** A port the system says is free. */
export const anyFreePort = () => probe(0, '127.0.0.1');

/** The first free port from `wanted` on. */
export async function firstFreePort(wanted, host) {
  for (let port = wanted; port < wanted + 100; port += 1) {
    if (await probe(port, host)) return port;
  }
  return probe(0, host);
}
