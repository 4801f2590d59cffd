/**
 * Keeps one PostgreSQL server while anybody needs it: a small process of its own, started by the first who asks.
 * Those who need the database hold a connection to the keeper's socket. A connection ends with its process, however
 * that ends, so the keeper always knows who is left, and stops the server when nobody is. The socket's name is also
 * the lock: of two keepers started at once, the second finds the name taken and leaves.
 *
 * Says one JSON line to whoever connects: {"port"} once the server is up, or {"trouble"}. It never says the password:
 * any account may connect to an abstract socket, while the password's file is for its owner.
 *
 * Usage: postgres-keeper.mjs NAME, where NAME is `pg` or begins with `pg-test`
 */
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { socketName } from './lock.mjs';
import { anyFreePort, firstFreePort } from './port.mjs';
import { clusterHome, databaseAccount, makeHome } from './postgres-home.mjs';
import { isAlive, makeCluster, runningServer, startServer, stopServer } from './postgres-server.mjs';
import { inWords } from './trouble.mjs';

const name = process.argv[2];
const throwAway = name.startsWith('pg-test');
/** How long the server outlives its last holder: nothing, but for a holder that connects as another leaves. */
const LINGER_MS = 50;
const CHECK_MS = 500;

const holders = new Set();
let news = null;
let server = null;
let stopping = false;
let reviving = null;

const tell = (socket) => news && socket.write(`${JSON.stringify(news)}\n`);

/** The port of last time if it is free, else any: an address once noted down stays right. */
function portChooser(home) {
  const file = join(home, 'port');
  let last = existsSync(file) ? Number(readFileSync(file, 'utf8')) : 0;
  return async () => {
    const port = last ? await firstFreePort(last, '127.0.0.1') : 0;
    const chosen = port === last && port ? port : await anyFreePort();
    last = 0;
    return chosen;
  };
}

async function up() {
  const account = databaseAccount();
  const cluster = { home: clusterHome(name), account, throwAway };
  const already = await runningServer(cluster.home);
  if (already) return { ...cluster, ...already };
  if (throwAway) rmSync(join(cluster.home, 'data'), { recursive: true, force: true });
  makeHome(cluster.home, account);
  await makeCluster(cluster);
  const started = await startServer(cluster, portChooser(cluster.home));
  writeFileSync(join(cluster.home, 'port'), String(started.port));
  return { ...cluster, ...started };
}

/** Brings a server that was killed back on the same port, so that its clients only have to connect again. */
async function watch() {
  if (server && !stopping && !isAlive(server)) {
    const { port } = server;
    reviving = startServer(server, () => port);
    server = { ...server, ...(await reviving) };
  }
  if (!stopping) setTimeout(() => void watch().catch(fail), CHECK_MS);
}

async function end() {
  // The name stays taken until the server has stopped, so that no second keeper meets it half-way down.
  stopping = true;
  const revived = await reviving?.catch(() => null);
  if (revived) server = { ...server, ...revived };
  if (server) await stopServer(server);
  if (server && throwAway) rmSync(join(server.home, 'data'), { recursive: true, force: true });
  process.exit(0);
}

function fail(error) {
  news = { trouble: inWords(error) };
  holders.forEach(tell);
  setTimeout(() => process.exit(1), 100);
}

const endWhenUnused = () => {
  if (news && holders.size === 0 && !stopping)
    setTimeout(() => holders.size === 0 && !stopping && void end(), LINGER_MS);
};

const listener = createServer((socket) => {
  if (stopping) return socket.destroy();
  holders.add(socket);
  socket.on('error', () => socket.destroy());
  // A holder that says it is leaving keeps its end open, to see by our closing it that the server has stopped.
  const leave = () => {
    holders.delete(socket);
    if (holders.size > 0) socket.end();
    endWhenUnused();
  };
  socket.once('data', leave);
  socket.once('close', () => holders.has(socket) && leave());
  tell(socket);
});
listener.once('error', (error) => process.exit(error.code === 'EADDRINUSE' ? 0 : 1));
listener.listen(socketName(name), async () => {
  try {
    server = await up();
    news = { port: server.port };
    holders.forEach(tell);
    endWhenUnused();
    void watch().catch(fail);
  } catch (error) {
    fail(error);
  }
});
// Only the last holder's leaving ends it; a signal meant for somebody else's group must not.
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => undefined);
