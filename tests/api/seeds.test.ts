import { fileURLToPath } from 'node:url';
import knex, { type Knex } from 'knex';
import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { verifyVersions } from '../../scripts/lib/version-chains';
import { run } from '../../scripts/lib/run.mjs';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let testDatabase: TestDatabase;
let owner: Knex;
let admin: pg.Client;
beforeAll(async () => {
  testDatabase = await createTestDatabase();
  owner = knex({ client: 'pg', connection: testDatabase.ownerUrl, pool: { min: 0, max: 2 } });
  admin = new pg.Client({ connectionString: testDatabase.adminUrl });
  await admin.connect();
  // As a person would, with tsx to read the seeds.
  const ran = await run(process.execPath, ['--import', 'tsx', 'scripts/seed.ts'], {
    cwd: fileURLToPath(new URL('../..', import.meta.url)),
    env: { ...process.env, DATABASE_OWNER_URL: testDatabase.ownerUrl },
  });
  if (ran.code !== 0) throw new Error(ran.output);
}, 60_000);
afterAll(async () => {
  await admin.end();
  await owner.destroy();
  await testDatabase.drop();
});

test("the demo labs' record holds every reading and every change of a run, in the order of time", async () => {
  const { rows: counts } = await admin.query<Record<string, string>>(
    `select (select count(*) from readings) as readings,
      (select count(*) from audit_events where kind = 'reading.recorded') as recorded,
      (select count(*) from run_events) as changes,
      (select count(*) from audit_events where kind like 'run.%') as told`,
  );
  const [count] = counts;
  expect(Number(count?.['readings'])).toBeGreaterThan(20);
  expect(count?.['recorded']).toBe(count?.['readings']);
  expect(count?.['told']).toBe(count?.['changes']);
  const { rows } = await admin.query<{ lab_id: string; at: Date }>(
    'select lab_id, at from audit_events order by lab_id, sequence',
  );
  for (const [index, { lab_id, at }] of rows.entries()) {
    const before = rows[index - 1];
    if (before?.lab_id === lab_id) expect(at.getTime()).toBeGreaterThanOrEqual(before.at.getTime());
  }
});

test("the demo labs' versions are chained as the server's are", async () => {
  expect(await verifyVersions(owner)).toMatchObject({ ok: true, labs: 2 });
});

test("the demo lab's scan is kept with its file, and leaves fast and slow open", async () => {
  const { rows } = await admin.query<Record<string, unknown>>(
    `select p.name, c.open_questions, c.offset_deg, c.retardance_deg, f.name as file_name
      from calibrations c join seats s on s.id = c.seat_id join plates p on p.id = s.plate_id join files f on f.id = c.file_id`,
  );
  expect(rows).toMatchObject([{ name: 'Q-E', open_questions: ['axis'], file_name: 'q-e-780nm.csv' }]);
  // The plate that the file was made up from has 89.2° with its zero at 8.95.
  expect(Math.abs(Number(rows[0]?.['retardance_deg']) - 89.2)).toBeLessThan(0.5);
  expect(Math.abs(Number(rows[0]?.['offset_deg']) - 8.95)).toBeLessThan(0.2);
});
