import type { DataSource } from 'typeorm';
import { createDataSource, migrate } from '../../server/db/data-source';
import { createTestDatabase, type TestDatabase } from '../support/test-database';

// Three servers at once on a busy machine take their time.
jest.setTimeout(60_000);

let database: TestDatabase;
let db: DataSource;

beforeAll(async () => {
  database = await createTestDatabase();
  db = await createDataSource(database.url, 5).initialize();
});

afterAll(async () => {
  await db.destroy();
  await database.drop();
});

/** Columns of all tables as PostgreSQL tells them, and indexes with their definitions. */
async function shape(): Promise<{ columns: string[]; indexes: string[] }> {
  const columns: { line: string }[] = await db.query(
    `select table_name || '.' || column_name || ' ' || udt_name || ' ' || is_nullable as line
       from information_schema.columns where table_schema = 'public' order by 1`,
  );
  const indexes: { line: string }[] = await db.query(
    `select indexdef as line from pg_indexes where schemaname = 'public' order by 1`,
  );
  const own = ({ line }: { line: string }): boolean => !/\bmigrations/.test(line);
  return {
    columns: columns.filter(own).map(({ line }) => line),
    indexes: indexes.filter(own).map(({ line }) => line),
  };
}

test('up, down and up again: down leaves nothing, and the second up makes what the first made', async () => {
  await migrate(db);
  const first = await shape();
  expect(first.columns.length).toBeGreaterThan(100);
  for (const _ of db.migrations) await db.undoLastMigration({ transaction: 'each' });
  expect(await shape()).toEqual({ columns: [], indexes: [] });
  await migrate(db);
  expect(await shape()).toEqual(first);
});

test('servers starting at the same moment do not run a migration twice', async () => {
  for (const _ of db.migrations) await db.undoLastMigration({ transaction: 'each' });
  const others = await Promise.all([1, 2, 3].map(() => createDataSource(database.url, 2).initialize()));
  await Promise.all(others.map(migrate));
  await Promise.all(others.map((other) => other.destroy()));
  const rows: { count: string }[] = await db.query('select count(*) from migrations');
  expect(Number(rows[0]?.count)).toBe(db.migrations.length);
});

const SQL_TYPES: Record<string, string> = {
  uuid: 'uuid',
  text: 'text',
  integer: 'int4',
  boolean: 'bool',
  timestamptz: 'timestamptz',
  'double precision': 'float8',
  jsonb: 'jsonb',
  bytea: 'bytea',
};

test('every table is as its entity says: the same columns, types and whether they may be empty', async () => {
  const { columns } = await shape();
  const said = db.entityMetadatas.flatMap(({ tableName, columns: all }) =>
    all.map((column) => {
      const type = SQL_TYPES[String(column.type)] ?? `unknown ${String(column.type)}`;
      const array = column.isArray ? '_' : '';
      return `${tableName}.${column.databaseName} ${array}${type} ${column.isNullable ? 'YES' : 'NO'}`;
    }),
  );
  expect(said.sort()).toEqual(columns.sort());
});

test('numbers come back bit for bit, as columns and inside JSON', async () => {
  const numbers = [
    0.1 + 0.2,
    5e-324,
    -1.7976931348623157e308,
    2.2250738585072014e-308,
    2 ** 53 - 1,
    1e21,
    1e-7,
    1 / 3,
  ];
  const [row] = await db.query<{ float: number[]; json: number[] }[]>(
    'select $1::float8[] as float, $2::jsonb as json',
    [numbers, JSON.stringify(numbers)],
  );
  expect(row?.float).toEqual(numbers);
  expect(row?.json).toEqual(numbers);
});
