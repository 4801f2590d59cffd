import { randomBytes } from 'node:crypto';
import { Client } from 'pg';

/** A database of one test file's own. */
export interface TestDatabase {
  /** Connection address with full rights on this database. */
  readonly url: string;
  /** Removes the database; connections still open to it are cut off. */
  drop(): Promise<void>;
}

async function asOwner(adminUrl: string, statement: string): Promise<void> {
  const client = new Client({ connectionString: adminUrl });
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}

/**
 * Makes an empty database in the test cluster, to be called in `beforeAll` (with `drop` in `afterAll`), so that test
 * files can run side by side without seeing one another's rows.
 *
 * @returns the new database, empty: migrations have not run
 * @throws Error when TEST_DATABASE_URL is not set; `npm test` and plain `npx jest` both set it by themselves
 */
export async function createTestDatabase(): Promise<TestDatabase> {
  const adminUrl = process.env['TEST_DATABASE_URL'];
  if (!adminUrl) {
    throw new Error('TEST_DATABASE_URL is not set. Run the tests by "npm test" or "npx jest", which set it.');
  }
  const name = `t_${randomBytes(6).toString('hex')}`;
  await asOwner(adminUrl, `CREATE DATABASE ${name}`);
  const url = new URL(adminUrl);
  url.pathname = `/${name}`;
  return {
    url: url.href,
    drop: () => asOwner(adminUrl, `DROP DATABASE IF EXISTS ${name} WITH (FORCE)`),
  };
}
