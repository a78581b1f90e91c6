import { fileURLToPath } from 'node:url';
import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { run } from '../../scripts/lib/run.mjs';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
});
afterAll(async () => {
  await database.drop();
});

/** As a person would run it by hand, with tsx to read the migrations. */
async function migrate(...words: readonly string[]): Promise<void> {
  const ran = await run(process.execPath, ['--import', 'tsx', 'node_modules/knex/bin/cli.js', ...words], {
    cwd: fileURLToPath(new URL('../..', import.meta.url)),
    env: { ...process.env, DATABASE_OWNER_URL: database.ownerUrl },
  });
  if (ran.code !== 0) throw new Error(ran.output);
}

async function rows(sql: string): Promise<unknown[]> {
  const client = new pg.Client({ connectionString: database.adminUrl });
  await client.connect();
  try {
    return (await client.query<Record<string, unknown>>(sql)).rows;
  } finally {
    await client.end();
  }
}

/** Everything that a migration makes, as text: columns, constraints, indexes, policies, triggers, functions, rights. */
async function schema(): Promise<unknown[]> {
  const queries = [
    `select table_name, column_name, data_type, is_nullable, column_default, generation_expression from information_schema.columns where table_schema = 'public' order by 1, 2`,
    `select conrelid::regclass::text as t, conname, pg_get_constraintdef(oid) from pg_constraint where connamespace = 'public'::regnamespace order by 1, 2`,
    `select indexname, indexdef from pg_indexes where schemaname = 'public' order by 1`,
    `select tablename, policyname, cmd, qual, with_check from pg_policies order by 1, 2`,
    `select tgrelid::regclass::text as t, tgname, pg_get_triggerdef(oid) from pg_trigger where not tgisinternal order by 1, 2`,
    `select proname, prosrc from pg_proc where pronamespace = 'public'::regnamespace order by 1`,
    `select table_name, grantee, privilege_type from information_schema.role_table_grants where table_schema = 'public' order by 1, 2, 3`,
    `select table_name, column_name, grantee, privilege_type from information_schema.role_column_grants where table_schema = 'public' and grantee = 'quarterturn_app' order by 1, 2, 3, 4`,
  ];
  const found: unknown[] = [];
  for (const sql of queries) found.push(await rows(sql));
  return found;
}

test('all migrations go down to nothing, and up again to the very same schema', async () => {
  const before = await schema();
  await migrate('migrate:rollback', '--all');
  const tables = await rows(
    `select tablename from pg_tables where schemaname = 'public' and tablename not like 'knex_%'`,
  );
  const functions = await rows(`select proname from pg_proc where pronamespace = 'public'::regnamespace`);
  expect([tables, functions]).toEqual([[], []]);
  await migrate('migrate:latest');
  expect(await schema()).toEqual(before);
});
