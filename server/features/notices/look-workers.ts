import type { Knex } from 'knex';
import { z } from 'zod';
import { inTransaction } from '../../db/in-transaction';
import { jobData, queueJob, queueJobs, type Worker, worker } from '../../jobs';
import { tellWhatIsDue } from './tell-due';

const labRows = z.object({ rows: z.array(z.object({ id: z.string() })) });

/** The daily look: at every lab for what has fallen due, and for versions whose report no change has asked for. */
export function lookWorkers({
  database,
  publicOrigin,
}: {
  readonly database: Knex;
  readonly publicOrigin: string;
}): readonly Worker[] {
  return [
    worker({ name: 'daily-look', data: jobData['daily-look'], idleMs: 1_000 }, () =>
      inTransaction(database, { userId: null, labId: null }, async (transaction) => {
        const found: unknown = await transaction.raw('select every_lab_id() as id');
        const labs = labRows.parse(found).rows.map(({ id }) => ({ labId: id }));
        await queueJobs(transaction, 'lab-look', labs);
      }),
    ),
    worker({ name: 'lab-look', data: jobData['lab-look'], idleMs: 1_000 }, ({ labId }) =>
      inTransaction(database, { userId: null, labId }, async (transaction) => {
        await tellWhatIsDue(transaction, { labId, publicOrigin, now: new Date() });
        await queueJob(transaction, 'reliance', { labId, versionIds: null });
      }),
    ),
  ];
}
