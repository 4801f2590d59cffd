/**
 * `npm start`: from a fresh clone to a served product by one command. Installs packages and PostgreSQL where they are
 * missing, builds what is stale, starts the database and the server, and stops all of it again.
 *
 *   DATABASE_URL   use this PostgreSQL server; none is installed or started
 *   PORT, HOST     where to listen (127.0.0.1, 4100 or the next free one)
 *
 * Every other setting is the server's own (server/config.ts) and is passed through.
 */
import { ensureBuilds } from './house/builds.mjs';
import { whenToStop } from './house/lifetime.mjs';
import { checkNode } from './house/node-version.mjs';
import { ensurePackages } from './house/packages.mjs';
import { ensurePostgres, holdPostgres } from './house/postgres.mjs';
import { stopChildren } from './house/processes.mjs';
import { createProgress } from './house/progress.mjs';
import { sessionSecret } from './house/secret.mjs';
import { startServerProcess } from './house/server-process.mjs';
import { inWords } from './house/trouble.mjs';

const begun = Date.now();
const progress = createProgress();
let database = null;
let ending = false;

/** The server first, so that it can finish what it is writing; the database after it. */
async function end(code) {
  ending = true;
  await stopChildren();
  await database?.release();
  process.exit(code);
}

async function databaseUrl() {
  if (process.env.DATABASE_URL) return process.env.DATABASE_URL;
  await ensurePostgres(progress);
  database = await progress.step('Starting PostgreSQL', () => holdPostgres('pg'));
  if (ending) await database.release();
  return database.url;
}

async function programs() {
  await ensurePackages(progress);
  await ensureBuilds(progress);
}

function announce({ address, signIns }) {
  progress.say(`\nTenthmark is at ${address} (after ${((Date.now() - begun) / 1000).toFixed(1)} s).`);
  if (signIns.length) {
    progress.say('Its demo team signs in as');
    const width = (key) => Math.max(...signIns.map((person) => person[key].length));
    for (const { role, email, password } of signIns) {
      progress.say(`  ${role.padEnd(width('role'))}  ${email.padEnd(width('email'))}  ${password}`);
    }
  }
  progress.say('Stop with Ctrl-C.');
}

whenToStop((code) => {
  progress.close('Stopping.');
  return end(code);
});
try {
  checkNode(progress);
  progress.say('Tenthmark');
  const [url] = await Promise.all([databaseUrl(), programs()]);
  const environment = {
    NODE_ENV: 'production',
    ...process.env,
    DATABASE_URL: url,
    TENTHMARK_SECRET: process.env.TENTHMARK_SECRET || sessionSecret(),
  };
  const server = await startServerProcess(environment, progress);
  announce(server);
  const how = await server.ended;
  if (!ending) {
    progress.say(`The server ended by itself (${how}).`);
    await end(1);
  }
} catch (error) {
  if (!ending) {
    progress.say(inWords(error));
    await end(1);
  }
}
