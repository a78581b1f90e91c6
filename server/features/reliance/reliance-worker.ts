import type { Knex } from 'knex';
import { inTransaction } from '../../db/in-transaction';
import { jobData, queueJob, type Worker, worker } from '../../jobs';
import { tellWhoLeftTolerance } from '../notices';
import { newestVersionIds } from './report-store';
import { workOut } from './work-out';

/** Well below the time after which a job counts as lost: what is left then is another job. */
const longestMs = 120_000;

/** Works out what changed plates and benches do to versions, and writes to those whom it concerns. */
export function relianceWorker({
  database,
  publicOrigin,
}: {
  readonly database: Knex;
  readonly publicOrigin: string;
}): Worker {
  const kind = { name: 'reliance', data: jobData.reliance, idleMs: 500 } as const;
  return worker(kind, async ({ labId, versionIds: asked }, signal) => {
    const within = <Result>(work: Parameters<typeof inTransaction<Result>>[2]) =>
      inTransaction(database, { userId: null, labId }, work);
    const versionIds = await within((transaction) => newestVersionIds(transaction, labId, asked));
    const began = performance.now();
    for (const [place, versionId] of versionIds.entries()) {
      signal.throwIfAborted();
      if (performance.now() - began > longestMs) {
        const left = versionIds.slice(place);
        await within((transaction) => queueJob(transaction, 'reliance', { labId, versionIds: left }));
        return;
      }
      await workOut({ database, labId, signal }, versionId);
    }
    await within((transaction) =>
      tellWhoLeftTolerance(transaction, { labId, publicOrigin, now: new Date() }),
    );
  });
}
