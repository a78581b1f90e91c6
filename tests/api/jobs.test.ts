import { setTimeout as sleep } from 'node:timers/promises';
import type { Knex } from 'knex';
import type pg from 'pg';
import PgBoss from 'pg-boss';
import { pino } from 'pino';
import { afterAll, afterEach, beforeAll, expect, test } from 'vitest';
import { z } from 'zod';
import { openDatabase, openSidePool } from '../../server/db/database';
import { inTransaction } from '../../server/db/in-transaction';
import { type Jobs, queueJob, queueJobs, startJobs, type Worker, worker } from '../../server/jobs';
import { newId } from '../../server/db/new-id';
import { createTestDatabase, type TestDatabase } from '../setup/database';

const silent = pino({ level: 'silent' });
const data = z.strictObject({ labId: z.string(), mailId: z.string() });
const nobody = { userId: null, labId: null };

let testDatabase: TestDatabase;
let database: Knex;
let owners: Knex;
let sidePool: pg.Pool;
const running: Jobs[] = [];

beforeAll(async () => {
  testDatabase = await createTestDatabase();
  const config = { databaseUrl: testDatabase.appUrl, databasePoolMax: 4 };
  database = openDatabase(config);
  sidePool = openSidePool(config, () => undefined);
  owners = openDatabase({ ...config, databaseUrl: testDatabase.adminUrl });
});
afterEach(async () => {
  await Promise.all(running.splice(0).map((jobs) => jobs.stop()));
  await owners('pgboss.job').delete();
});
afterAll(async () => {
  await Promise.all([database.destroy(), owners.destroy(), sidePool.end()]);
  await testDatabase.drop();
});

const job = () => ({ labId: newId(), mailId: newId() });

/** A server's share of the queue, in this process. */
function serve(work: Parameters<typeof worker<typeof data>>[1]): Jobs {
  const mail: Worker = worker({ name: 'mail', data, idleMs: 20 }, work);
  const jobs = startJobs({ sidePool, database, logger: silent, workers: [mail] });
  running.push(jobs);
  return jobs;
}

async function states(name = 'mail'): Promise<string[]> {
  const rows: unknown = await owners('pgboss.job').where({ name }).orderBy('created_on').select('state');
  return z
    .array(z.object({ state: z.string() }))
    .parse(rows)
    .map(({ state }) => state);
}

async function until(holds: () => boolean | Promise<boolean>): Promise<void> {
  while (!(await holds())) await sleep(20);
}

test('a job is there if and only if its change is: a transaction that is rolled back leaves none', async () => {
  await expect(
    inTransaction(database, nobody, async (transaction) => {
      await queueJob(transaction, 'mail', job());
      throw new Error('the change failed');
    }),
  ).rejects.toThrow('the change failed');
  expect(await states()).toEqual([]);
  await inTransaction(database, nobody, (transaction) => queueJob(transaction, 'mail', job()));
  expect(await states()).toEqual(['created']);
});

test('two servers do each of a hundred jobs once, between them', async () => {
  const jobs = Array.from({ length: 100 }, job);
  await inTransaction(database, nobody, (transaction) => queueJobs(transaction, 'mail', jobs));
  const done: string[] = [];
  const share: Parameters<typeof serve>[0] = async ({ mailId }) => {
    await sleep(1);
    done.push(mailId);
  };
  serve(share);
  serve(share);
  await until(async () => (await states()).every((state) => state === 'completed'));
  expect(done.toSorted()).toEqual(jobs.map(({ mailId }) => mailId).toSorted());
});

test('a job that fails is tried again, later each time, and the next one does not wait for it', async () => {
  const [first, second] = [job(), job()];
  await inTransaction(database, nobody, (transaction) => queueJobs(transaction, 'mail', [first, second]));
  const tried: string[] = [];
  serve(({ mailId }) => {
    tried.push(mailId);
    return mailId === first.mailId && tried.filter((id) => id === mailId).length === 1
      ? Promise.reject(new Error('busy'))
      : Promise.resolve();
  });
  await until(() => tried.length === 2);
  await until(async () => (await states()).includes('retry'));
  expect(new Set(tried)).toEqual(new Set([first.mailId, second.mailId]));
  // Time passes: ten seconds and more are too long for a test.
  await owners('pgboss.job')
    .where({ state: 'retry' })
    .update({ start_after: owners.raw('now()') });
  await until(async () => (await states()).every((state) => state === 'completed'));
  expect(tried.filter((id) => id === first.mailId)).toHaveLength(2);
});

test('what was in hand when a server was killed is given to another once its time is over', async () => {
  const lost = job();
  await inTransaction(database, nobody, (transaction) => queueJob(transaction, 'mail', lost));
  // A killed server leaves its job active, and its clock running.
  await owners('pgboss.job').update({
    state: 'active',
    started_on: owners.raw(`now() - interval '2 minutes'`),
  });
  const keeper = new PgBoss({
    db: { executeSql: (text, values) => sidePool.query(text, values) },
    migrate: false,
    supervise: false,
    schedule: false,
  });
  // What each server does every half minute, by the role that owns nothing.
  await keeper.maintain();
  expect(await states()).toEqual(['retry']);
  await owners('pgboss.job').update({ start_after: owners.raw('now()') });
  const done: string[] = [];
  serve(({ mailId }) => {
    done.push(mailId);
    return Promise.resolve();
  });
  await until(() => done.length === 1);
  expect(done).toEqual([lost.mailId]);
});

test('on stop the job in hand is given back for another server, and no new one is taken', async () => {
  await inTransaction(database, nobody, (transaction) => queueJobs(transaction, 'mail', [job(), job()]));
  let taken = 0;
  const jobs = serve(async (_data, signal) => {
    taken += 1;
    await sleep(60_000, undefined, { signal });
  });
  await until(() => taken === 1);
  const began = performance.now();
  await jobs.stop();
  expect(performance.now() - began).toBeLessThan(5_000);
  expect((await states()).toSorted()).toEqual(['created', 'retry']);
  expect(taken).toBe(1);
});

test('a job whose data is of another shape fails, and the worker goes on', async () => {
  await owners.raw(
    `insert into pgboss.job (name, data, policy, retry_limit) values ('mail', '{"labId": 1}', 'standard', 0)`,
  );
  await inTransaction(database, nobody, (transaction) => queueJob(transaction, 'mail', job()));
  let done = 0;
  serve(() => {
    done += 1;
    return Promise.resolve();
  });
  await until(() => done === 1);
  expect((await states()).toSorted()).toEqual(['completed', 'failed']);
});

test('a lost connection to the database ends neither the worker nor the process', async () => {
  let done = 0;
  serve(() => {
    done += 1;
    return Promise.resolve();
  });
  await inTransaction(database, nobody, (transaction) => queueJob(transaction, 'mail', job()));
  await until(() => done === 1);
  for (let round = 0; round < 3; round += 1) {
    await owners.raw(
      `select pg_terminate_backend(pid) from pg_stat_activity where usename = 'quarterturn_app' and datname = current_database()`,
    );
    await sleep(100);
  }
  await inTransaction(database, nobody, (transaction) => queueJob(transaction, 'mail', job()));
  await until(() => done === 2);
});

test('the daily look is asked for once a day, by however many servers', async () => {
  serve(() => Promise.resolve());
  serve(() => Promise.resolve());
  await until(async () => (await states('daily-look')).length > 0);
  await inTransaction(database, nobody, (transaction) =>
    queueJob(transaction, 'daily-look', {}, { onceInSeconds: 24 * 3600 }),
  );
  expect(await states('daily-look')).toHaveLength(1);
});

test('the role that works on the queue can neither make nor remove queues, and sees of labs their ids only', async () => {
  for (const sql of [
    `select pgboss.create_queue('mine', '{"policy": "standard"}')`,
    `select pgboss.delete_queue('mail')`,
    `truncate pgboss.job`,
    `create table pgboss.mine (id integer)`,
    `update pgboss.version set version = 1`,
  ]) {
    await expect(database.raw(sql), sql).rejects.toThrow(/permission denied|must be owner/);
  }
  const labId = newId();
  await owners('labs').insert({
    id: labId,
    name: 'A lab',
    phase: 'kz-wt',
    handedness: 'receiver',
    s3_sign: 'R',
    calibration_due_days: 90,
  });
  const found: unknown = await database.raw('select every_lab_id() as id');
  expect(z.object({ rows: z.array(z.unknown()) }).parse(found).rows).toEqual([{ id: labId }]);
  // The setting by which the function sees them opens nothing to anybody else.
  await database.transaction(async (transaction) => {
    await transaction.raw(`select set_config('app.every_lab', 'ids', true)`);
    expect(await transaction('labs').select('id')).toEqual([]);
  });
});
