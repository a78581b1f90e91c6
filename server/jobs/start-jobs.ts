import { setTimeout as sleep } from 'node:timers/promises';
import type { Knex } from 'knex';
import PgBoss from 'pg-boss';
import type pg from 'pg';
import type { Logger } from 'pino';
import { inTransaction } from '../db/in-transaction';
import { queueJob } from './queue-job';
import { type Worker, workLoop } from './work-loop';

const daySeconds = 24 * 3600;

interface JobParts {
  /** The package's own statements: fetching, completing, retrying, expiring, archiving. */
  readonly sidePool: pg.Pool;
  readonly database: Knex;
  readonly logger: Logger;
  readonly workers: readonly Worker[];
}

export interface Jobs {
  /** Ends when the jobs in hand are done or given back; takes no new ones. */
  readonly stop: () => Promise<void>;
}

/**
 * Works on the queue in this process until it is stopped. Any number of servers may: a job is locked by whoever fetches
 * it, and given to another when it has been under way for too long.
 */
export function startJobs(parts: JobParts): Jobs {
  const stopping = new AbortController();
  const { signal } = stopping;
  const running = run(parts, signal);
  return {
    stop: async () => {
      stopping.abort();
      await running;
    },
  };
}

async function run(parts: JobParts, signal: AbortSignal): Promise<void> {
  const boss = await reachQueue(parts, signal);
  if (boss === null) return;
  const { logger, workers } = parts;
  const place = { boss, logger, signal };
  await Promise.all([keepLookingDaily(parts, signal), ...workers.map((each) => workLoop(place, each))]);
  await boss.stop({ graceful: false });
}

/** The queue as soon as the database answers; null when it is time to stop before. */
async function reachQueue({ sidePool, logger }: JobParts, signal: AbortSignal): Promise<PgBoss | null> {
  while (!signal.aborted) {
    const boss = new PgBoss({
      db: { executeSql: (text, values) => sidePool.query(text, values) },
      migrate: false,
      // Its clock makes queues, which only the owner may; the daily look below has a clock of its own.
      schedule: false,
      supervise: true,
      maintenanceIntervalSeconds: 30,
      // Longer than a day: what was done today stands in the way of doing it again.
      archiveCompletedAfterSeconds: 2 * daySeconds,
    });
    boss.on('error', (error) => logger.warn({ err: error }, 'the job queue could not be looked after'));
    try {
      return await boss.start();
    } catch (error) {
      logger.warn({ err: error }, 'the job queue cannot be reached yet');
      await pause(5_000, signal);
    }
  }
  return null;
}

/** Asks for today's look now and then: only the first to ask in a day (UTC) gets it. */
async function keepLookingDaily({ database, logger }: JobParts, signal: AbortSignal): Promise<void> {
  while (!signal.aborted) {
    try {
      await inTransaction(database, { userId: null, labId: null }, (transaction) =>
        queueJob(transaction, 'daily-look', {}, { onceInSeconds: daySeconds }),
      );
    } catch (error) {
      logger.warn({ err: error }, 'the daily look could not be queued');
    }
    await pause(10 * 60_000, signal);
  }
}

async function pause(ms: number, signal: AbortSignal): Promise<void> {
  await sleep(ms, undefined, { signal }).catch(() => undefined);
}
