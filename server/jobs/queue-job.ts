import type { Knex } from 'knex';
import PgBoss from 'pg-boss';
import { z } from 'zod';
import type { Transaction } from '../db/database';
import { rowsOf } from '../db/rows';
import type { JobData, JobKind } from './queues';

/** What the package's statements are given. */
const bindable = z.union([z.string(), z.number(), z.boolean(), z.null()]);

/** Writes a job's row and keeps nothing: each job goes through the transaction that it is given. */
const sender = new PgBoss({
  db: { executeSql: () => Promise.reject(new Error('a job is queued in a transaction')) },
  migrate: false,
  supervise: false,
  schedule: false,
});

interface When {
  /** Seconds in which one job of this kind and key is enough, counted in slots of the database's clock. */
  readonly onceInSeconds?: number;
  readonly key?: string;
}

/** Queues a job in the transaction of the change that it follows: it is there if and only if the change is. */
export async function queueJob<Kind extends JobKind>(
  transaction: Transaction,
  name: Kind,
  data: JobData<Kind>,
  when: When = {},
): Promise<void> {
  await queueJobs(transaction, name, [data], when);
}

/** As `queueJob`, for several in one statement. */
export async function queueJobs<Kind extends JobKind>(
  transaction: Transaction,
  name: Kind,
  jobs: readonly JobData<Kind>[],
  { onceInSeconds, key }: When = {},
): Promise<void> {
  const rows = jobs.map((data) => ({
    name,
    data,
    ...(onceInSeconds === undefined ? {} : { singletonSeconds: onceInSeconds }),
    ...(key === undefined ? {} : { singletonKey: key }),
  }));
  await sender.insert(rows, { db: overTransaction(transaction) });
}

/** The package writes parameters as $1, $2; knex as question marks. */
function overTransaction(transaction: Transaction): PgBoss.Db {
  return {
    executeSql: async (text, values: readonly unknown[]) => {
      const bindings: Knex.RawBinding[] = [];
      const sql = text.replace(/\$(\d+)/g, (_whole, number: string) => {
        bindings.push(bindable.parse(values[Number(number) - 1] ?? null));
        return '?';
      });
      return { rows: [...rowsOf(await transaction.raw(sql, bindings))] };
    },
  };
}
