import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { pruneRateLimits } from '../../server/http/prune-rate-limits';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let testDatabase: TestDatabase;
let pool: pg.Pool;
beforeAll(async () => {
  testDatabase = await createTestDatabase();
  pool = new pg.Pool({ connectionString: testDatabase.appUrl, max: 1 });
});
afterAll(async () => {
  await pool.end();
  await testDatabase.drop();
});

test('counts whose time is over go at the start; those that still count stay', async () => {
  await pool.query('insert into rate_limits (key, points, expire) values ($1, 3, $2), ($3, 3, $4)', [
    'api:old',
    Date.now() - 1,
    'api:now',
    Date.now() + 60_000,
  ]);
  const failures: unknown[] = [];
  const stop = pruneRateLimits(pool, (error) => failures.push(error));
  const kept = async () => {
    const { rows } = await pool.query<{ key: string }>('select key from rate_limits');
    return rows.map(({ key }) => key);
  };
  await expect.poll(kept).toEqual(['api:now']);
  stop();
  expect(failures).toEqual([]);
});
