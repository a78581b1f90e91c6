import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
});
afterAll(async () => {
  await database.drop();
});

async function rows(url: string, sql: string): Promise<unknown[]> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    return (await client.query<Record<string, unknown>>(sql)).rows;
  } finally {
    await client.end();
  }
}

test("the server's role can neither pass row security nor own or make anything", async () => {
  const role = await rows(
    database.appUrl,
    'SELECT rolsuper, rolbypassrls, rolcreatedb, rolcreaterole FROM pg_roles WHERE rolname = current_user',
  );
  expect(role).toEqual([{ rolsuper: false, rolbypassrls: false, rolcreatedb: false, rolcreaterole: false }]);
  const owned = await rows(
    database.adminUrl,
    "SELECT relname FROM pg_class JOIN pg_roles ON pg_roles.oid = relowner WHERE rolname = 'quarterturn_app'",
  );
  expect(owned).toEqual([]);
  await expect(rows(database.appUrl, 'CREATE TABLE mine (id integer)')).rejects.toThrow('permission denied');
});

test('pages of the database carry checksums and its text sorts by code point', async () => {
  const settings = await rows(
    database.appUrl,
    "SELECT current_setting('data_checksums') AS checksums, datcollate AS collate, pg_encoding_to_char(encoding) AS encoding FROM pg_database WHERE datname = current_database()",
  );
  expect(settings).toEqual([{ checksums: 'on', collate: 'C', encoding: 'UTF8' }]);
});

test('each test database is its own: dropping one leaves the other', async () => {
  const other = await createTestDatabase();
  await other.drop();
  await expect(rows(other.appUrl, 'SELECT 1')).rejects.toThrow('does not exist');
  expect(await rows(database.appUrl, 'SELECT 1 AS one')).toEqual([{ one: 1 }]);
});
