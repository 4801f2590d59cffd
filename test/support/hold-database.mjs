/**
 * Jest's global set-up of the suites that need PostgreSQL: when `npm test` has not provided the test cluster already,
 * gets it for as long as Jest runs. So `npx jest --selectProjects api` works on its own.
 */
import { existsSync } from 'node:fs';
import { createProgress } from '../../server/cli/house/progress.mjs';
import { ensurePostgres, holdPostgres } from '../../server/cli/house/postgres.mjs';

export default async function holdDatabase() {
  if (existsSync('/usr/bin/chromium')) process.env.CHROMIUM_PATH ??= '/usr/bin/chromium';
  if (process.env.TEST_DATABASE_URL) return;
  await ensurePostgres(createProgress(process.stderr));
  const held = await holdPostgres('pg-test');
  process.env.TEST_DATABASE_URL = held.url;
  globalThis.tenthmarkTestDatabase = held;
}
