import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { z } from 'zod';
import { canonicalJson, contentHash } from '../../shared/protocol/canonical-json';
import { type Harness, startHarness } from './support/harness';
import { makeLab, type TestLab } from './support/lab';

let harness: Harness;
let own: TestLab;
let foreign: TestLab;
beforeAll(async () => {
  harness = await startHarness();
  own = await makeLab(harness, await harness.signIn('adaeze-holm'), 'Own lab');
  foreign = await makeLab(harness, await harness.signIn('oskar-lindqvist'), 'Foreign lab');
}, 60_000);
afterAll(async () => {
  await harness.close();
});

const labTables = [
  'memberships',
  'invitations',
  'plates',
  'mounts',
  'seats',
  'calibrations',
  'files',
  'plate_files',
  'scan_columns',
  'benches',
  'bench_plates',
  'protocols',
  'drafts',
  'versions',
  'version_plates',
  'reliance_reports',
  'mails',
  'due_notices',
  'runs',
  'readings',
  'run_events',
  'audit_events',
];
const foreverTables = [
  'versions',
  'calibrations',
  'files',
  'readings',
  'run_events',
  'audit_events',
  'account_events',
];

async function connected<Result>(url: string, work: (client: pg.Client) => Promise<Result>): Promise<Result> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

/** A transaction of the server's role that sees as a lab, and leaves nothing behind. */
function seeing<Result>(labId: string, work: (client: pg.Client) => Promise<Result>): Promise<Result> {
  return connected(harness.testDatabase.appUrl, async (client) => {
    await client.query('begin');
    await client.query(`select set_config('app.lab_id', $1, true)`, [labId]);
    const result = await work(client);
    await client.query('rollback');
    return result;
  });
}

const rowsOf = async (client: pg.Client, sql: string, values: unknown[] = []) =>
  (await client.query<Record<string, unknown>>(sql, values)).rows;

test('every table that carries a lab is behind row-level security, its owner not excepted', async () => {
  const unguarded = await connected(harness.testDatabase.adminUrl, (client) =>
    rowsOf(
      client,
      `select c.relname from pg_class c join pg_namespace n on n.oid = c.relnamespace
        where n.nspname = 'public' and c.relkind = 'r' and (c.relname = 'labs' or exists (
          select from pg_attribute a where a.attrelid = c.oid and a.attname = 'lab_id'))
        and not (c.relrowsecurity and c.relforcerowsecurity)`,
    ),
  );
  expect(unguarded).toEqual([]);
  const carrying = await connected(harness.testDatabase.adminUrl, (client) =>
    rowsOf(
      client,
      `select table_name as name from information_schema.columns where table_schema = 'public' and column_name = 'lab_id' order by 1`,
    ),
  );
  expect(carrying.map((row) => row['name'])).toEqual(labTables.toSorted());
});

test("the server's role sees of each table the one lab it looks at, and without one nothing", async () => {
  for (const table of labTables) {
    const seen = await seeing(own.labId, (client) => rowsOf(client, `select distinct lab_id from ${table}`));
    expect([table, seen.every((row) => row['lab_id'] === own.labId)]).toEqual([table, true]);
    const blind = await connected(harness.testDatabase.appUrl, (client) =>
      rowsOf(client, `select 1 from ${table}`),
    );
    expect([table, blind]).toEqual([table, []]);
  }
  expect(await seeing(own.labId, (client) => rowsOf(client, 'select id from labs'))).toEqual([
    { id: own.labId },
  ]);
});

test("nothing of another lab can be written, moved or referred to by the server's role", async () => {
  const attempts = [
    `insert into protocols (id, lab_id, created_by) select gen_random_uuid(), '${foreign.labId}', user_id from memberships limit 1`,
    `update plates set lab_id = '${foreign.labId}'`,
    `insert into memberships (lab_id, user_id, role) select '${foreign.labId}', user_id, 'lead' from memberships limit 1`,
    // A row of the own lab that points at the other lab's version or plate.
    `insert into runs (id, lab_id, number, version_id, state, setting_count, start_dials_deg, started_at, started_by)
      select gen_random_uuid(), '${own.labId}', 99, '${foreign.version.id}', 'running', 1, '{}', now(), user_id from memberships limit 1`,
    `insert into bench_plates (lab_id, bench_id, part, position, plate_id) values ('${own.labId}', '${own.benchId}', 'analysis', 5, '${foreign.plateIds[0]}')`,
  ];
  for (const sql of attempts) {
    await expect(
      seeing(own.labId, (client) => rowsOf(client, sql)),
      sql,
    ).rejects.toThrow(/row-level security|violates foreign key|never/);
  }
  const untouched = await seeing(own.labId, async (client) => {
    const changed = await client.query(
      `update plates set note = 'mine now' where id = '${foreign.sparePlateId}'`,
    );
    return changed.rowCount;
  });
  expect(untouched).toBe(0);
});

test('what is recorded for ever is refused every change: by right to the server, by rule to everybody', async () => {
  for (const table of foreverTables) {
    for (const sql of [
      `update ${table} set id = gen_random_uuid()`,
      `delete from ${table}`,
      `truncate ${table} cascade`,
    ]) {
      await expect(
        seeing(own.labId, (client) => rowsOf(client, sql)),
        sql,
      ).rejects.toThrow(/permission denied|never changed/);
    }
  }
  // The superuser passes rights and row security, but not the rule.
  for (const table of ['versions', 'calibrations', 'run_events', 'audit_events', 'account_events']) {
    for (const sql of [`update ${table} set id = id`, `delete from ${table}`, `truncate ${table} cascade`]) {
      await expect(
        connected(harness.testDatabase.adminUrl, (client) => rowsOf(client, sql)),
        sql,
      ).rejects.toThrow('never changed');
    }
  }
});

test('a version whose text and hash differ, or that follows no version, cannot even be inserted', async () => {
  const copy = (change: string) =>
    seeing(own.labId, (client) =>
      rowsOf(
        client,
        `insert into versions (id, lab_id, protocol_id, bench_id, number, parent_hash, content_hash, content,
            draft_revision, protocol_name, bench_name, message, target_count, tolerance_infidelity, saved_at, saved_by)
          select gen_random_uuid(), lab_id, protocol_id, bench_id, ${change}, draft_revision, protocol_name, bench_name, message,
            target_count, tolerance_infidelity, saved_at, saved_by from versions limit 1`,
      ),
    );
  const hashed = (text: string) => `'${contentHash(text)}', '${text}'`;
  await expect(copy(`2, content_hash, content_hash, content || ' '`)).rejects.toThrow(
    'violates check constraint',
  );
  await expect(copy(`2, '${'0'.repeat(64)}', ${hashed('{}')}`)).rejects.toThrow(
    'violates foreign key constraint',
  );
  await expect(copy(`1, null, ${hashed('{}')}`)).rejects.toThrow('duplicate key');
  await expect(copy(`2, null, ${hashed('{}')}`)).rejects.toThrow('violates check constraint');
});

test("each lab's record is one unbroken chain of hashes over canonical JSON", async () => {
  const events = z
    .array(
      z.object({
        content: z.string(),
        hash: z.string(),
        parent_hash: z.string().nullable(),
        sequence: z.coerce.number(),
      }),
    )
    .parse(
      await seeing(own.labId, (client) =>
        rowsOf(client, 'select content, hash, parent_hash, sequence from audit_events order by sequence'),
      ),
    );
  expect(events.length).toBeGreaterThan(6);
  let parent: string | null = null;
  for (const [index, event] of events.entries()) {
    expect(event.sequence).toBe(index + 1);
    expect(event.parent_hash).toBe(parent);
    expect(contentHash(event.content)).toBe(event.hash);
    const content: unknown = JSON.parse(event.content);
    expect(canonicalJson(content)).toBe(event.content);
    expect(content).toMatchObject({ parentHash: parent, sequence: index + 1, labId: own.labId });
    parent = event.hash;
  }
});

test('numbers that are no numbers are refused by the columns themselves, every one of them', async () => {
  const columns = z
    .array(z.object({ table: z.string(), column: z.string(), checks: z.array(z.string()) }))
    .parse(
      await connected(harness.testDatabase.adminUrl, (client) =>
        rowsOf(
          client,
          // The checks of this column alone: what stands beside it in the row does not matter.
          `select c.table_name as table, c.column_name as column, array(
              select pg_get_expr(k.conbin, k.conrelid) from pg_constraint k
                join pg_attribute a on a.attrelid = k.conrelid and k.conkey = array[a.attnum]
                where k.contype = 'c' and k.conrelid = c.table_name::regclass and a.attname = c.column_name) as checks
            from information_schema.columns c
            where c.table_schema = 'public' and c.data_type = 'double precision' order by 1, 2`,
        ),
      ),
    );
  expect(columns.length).toBeGreaterThan(15);
  const taken: string[] = [];
  for (const { table, column, checks } of columns) {
    for (const value of ['NaN', 'Infinity', '-Infinity']) {
      const [row] = await connected(harness.testDatabase.adminUrl, (client) =>
        rowsOf(
          client,
          `select ${checks.length === 0 ? 'true' : checks.join(' and ')} as taken
            from (select '${value}'::double precision as ${column}) as written`,
        ),
      );
      if (row?.['taken'] !== false) taken.push(`${table}.${column} takes ${value}`);
    }
  }
  expect(taken).toEqual([]);
  await expect(
    seeing(own.labId, (client) => rowsOf(client, `update plates set design_wavelength_nm = 'NaN'`)),
  ).rejects.toThrow('violates check constraint');
});

test('whole waves are those of a multi-order plate, in its row too', async () => {
  for (const built of [
    `construction = 'multi-order', whole_waves = 0`,
    `construction = 'multi-order', whole_waves = -1`,
    `construction = 'compound-zero-order', whole_waves = 1`,
    `construction = 'unknown', whole_waves = 6`,
  ]) {
    await expect(
      seeing(own.labId, (client) => rowsOf(client, `update plates set ${built}`)),
      built,
    ).rejects.toThrow('violates check constraint');
  }
});
