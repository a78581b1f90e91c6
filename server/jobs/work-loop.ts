import { setTimeout as sleep } from 'node:timers/promises';
import type PgBoss from 'pg-boss';
import type { Logger } from 'pino';
import type { z } from 'zod';
import type { JobKind } from './queues';

/** One kind of job and who does it. */
export interface Worker {
  readonly name: JobKind;
  /** How long an empty queue is left alone. */
  readonly idleMs: number;
  readonly work: (data: unknown, signal: AbortSignal) => Promise<void>;
}

/**
 * `work` does one job. It runs again when the process dies in it, so whatever it does twice counts once; it throws to be
 * tried again, and soon after the signal says stop.
 */
export function worker<S extends z.ZodType>(
  kind: { readonly name: JobKind; readonly data: S; readonly idleMs: number },
  work: (data: z.output<S>, signal: AbortSignal) => Promise<void>,
): Worker {
  const { name, idleMs, data: schema } = kind;
  return { name, idleMs, work: (data, signal) => work(schema.parse(data), signal) };
}

interface Place {
  readonly boss: PgBoss;
  readonly logger: Logger;
  readonly signal: AbortSignal;
}

/**
 * Takes one job after the other until the signal says stop, and then ends after the one in hand. The package's own
 * `work` leaves the failure to reach a lost database to nobody, which would end the process.
 */
export async function workLoop(place: Place, { name, idleMs, work }: Worker): Promise<void> {
  const { boss, signal } = place;
  while (!signal.aborted) {
    // Answers an empty list where the database does not answer.
    const [job] = await boss.fetch<unknown>(name);
    if (job === undefined) await sleep(idleMs, undefined, { signal }).catch(() => undefined);
    else await workOn(place, job, work);
  }
}

async function workOn(
  { boss, logger, signal }: Place,
  { id, name, data }: PgBoss.Job<unknown>,
  work: Worker['work'],
): Promise<void> {
  try {
    await work(data, signal);
    await boss.complete(name, id);
  } catch (error) {
    if (!signal.aborted) logger.warn({ err: error, job: id, kind: name }, 'a job failed');
    const message = error instanceof Error ? error.message : 'failed';
    // Where this fails as well the job expires, and whoever comes next takes it up.
    await boss.fail(name, id, { message }).catch(() => undefined);
  }
}
