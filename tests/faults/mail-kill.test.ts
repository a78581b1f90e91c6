import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { createServer, type Server } from 'node:net';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import type { Knex } from 'knex';
import PgBoss from 'pg-boss';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { z } from 'zod';
import { type RunningFakeSmtp, startFakeSmtp } from '../../fake-smtp/listen';
import { openDatabase, openSidePool } from '../../server/db/database';
import { inTransaction } from '../../server/db/in-transaction';
import { newId } from '../../server/db/new-id';
import { queueMail } from '../../server/mail';
import { createTestDatabase, type TestDatabase } from '../setup/database';

const root = fileURLToPath(new URL('../..', import.meta.url));
const portOf = z.object({ port: z.number() });

let testDatabase: TestDatabase;
let database: Knex;
let owners: Knex;
let smtp: RunningFakeSmtp;
/** Takes connections and says nothing: whoever sends to it is caught in the middle. */
let silent: Server;
const running = new Set<ChildProcess>();

beforeAll(async () => {
  testDatabase = await createTestDatabase();
  database = openDatabase({ databaseUrl: testDatabase.appUrl, databasePoolMax: 2 });
  owners = openDatabase({ databaseUrl: testDatabase.adminUrl, databasePoolMax: 2 });
  smtp = await startFakeSmtp({ smtpPort: 0, httpPort: 0 });
  silent = createServer((socket) => socket.on('error', () => undefined)).listen(0, '127.0.0.1');
  await once(silent, 'listening');
});
afterAll(async () => {
  for (const child of running) child.kill('SIGKILL');
  silent.close();
  await Promise.all([smtp.close(), database.destroy(), owners.destroy()]);
  await testDatabase.drop();
});

/** The product's own server as a process that can be killed. */
function startServer(smtpUrl: string): ChildProcess {
  const child = spawn(process.execPath, ['--import', 'tsx', path.join(root, 'server/index.ts')], {
    cwd: root,
    stdio: 'ignore',
    env: {
      ...process.env,
      NODE_ENV: 'test',
      PORT: '0',
      PUBLIC_URL: 'http://127.0.0.1:4999',
      DATABASE_URL: testDatabase.appUrl,
      SESSION_SECRET: 'the same secret for all of these servers',
      FAKE_GITHUB_URL: 'http://127.0.0.1:9',
      FAKE_SMTP_URL: smtpUrl,
      LOG_LEVEL: 'silent',
    },
  });
  running.add(child);
  return child;
}

async function queueOne(): Promise<void> {
  const [userId, labId] = [newId(), newId()];
  await owners('users').insert({ id: userId, name: 'Adaeze Holm', login: userId });
  await owners('labs').insert({
    id: labId,
    name: 'A lab',
    phase: 'kz-wt',
    handedness: 'receiver',
    s3_sign: 'R',
    calibration_due_days: 90,
  });
  await inTransaction(database, { userId: null, labId }, (transaction) =>
    queueMail(
      transaction,
      { labId, now: new Date() },
      {
        toUserId: userId,
        to: { name: 'Adaeze Holm', address: 'adaeze@lab.example' },
        subject: 'Q-D is due for calibration today',
        text: 'Measure it.',
      },
    ),
  );
}

test('a server killed between the commit of a mail and its sending loses nothing: another sends it, once', async () => {
  await queueOne();
  const { port } = portOf.parse(silent.address());
  const caught = once(silent, 'connection');
  const first = startServer(`smtp://127.0.0.1:${port}`);
  await caught;
  const gone = once(first, 'exit');
  first.kill('SIGKILL');
  await gone;
  const left: unknown = await owners('pgboss.job').where({ name: 'mail' }).first('state');
  expect(left).toEqual({ state: 'active' });
  expect(smtp.mailbox.messages).toEqual([]);

  // A minute passes, and what each server does every half minute is done; the wait before the retry passes too.
  await owners('pgboss.job').update({ started_on: owners.raw(`started_on - interval '2 minutes'`) });
  const sidePool = openSidePool({ databaseUrl: testDatabase.appUrl, databasePoolMax: 2 }, () => undefined);
  await new PgBoss({
    db: { executeSql: (text, values) => sidePool.query(text, values) },
    migrate: false,
    supervise: false,
    schedule: false,
  }).maintain();
  await sidePool.end();
  await owners('pgboss.job')
    .where({ state: 'retry' })
    .update({ start_after: owners.raw('now()') });

  const second = startServer(smtp.smtpUrl);
  while (smtp.mailbox.messages.length === 0) await sleep(50);
  await sleep(1_500);
  expect(smtp.mailbox.messages.map(({ envelopeTo }) => envelopeTo)).toEqual([['adaeze@lab.example']]);
  const stopped = once(second, 'exit');
  const began = performance.now();
  second.kill('SIGTERM');
  expect(await stopped).toEqual([0, null]);
  expect(performance.now() - began).toBeLessThan(10_000);
  expect(await owners('mails').whereNull('sent_at').select('id')).toEqual([]);
}, 240_000);

test('a mail server that says nothing keeps no server from stopping in time, and its mail is tried again', async () => {
  await queueOne();
  const { port } = portOf.parse(silent.address());
  const caught = once(silent, 'connection');
  const server = startServer(`smtp://127.0.0.1:${port}`);
  await caught;
  const stopped = once(server, 'exit');
  server.kill('SIGTERM');
  expect(await stopped).toEqual([0, null]);
  const left: unknown = await owners('pgboss.job')
    .where({ name: 'mail' })
    .whereNot({ state: 'completed' })
    .first('state');
  expect(left).toEqual({ state: 'retry' });
}, 240_000);
