import { z } from 'zod';
import type { Transaction } from '../../db/database';
import { rowsOf } from '../../db/rows';
import { queueJob } from '../../jobs';
import { isNewestVersion } from './newest-version';

const reportRows = z.array(z.object({ version_id: z.string() }));

/** What was changed: a plate (calibrated, seated, taken out), a mount, or a bench. */
type Changed = { readonly plateId: string } | { readonly benchId: string };

/**
 * Has it worked out what a change does to the newest version of each protocol that relies on it: by a job that is queued in
 * the change's own transaction, so that neither is there without the other.
 */
export async function requestReliance(
  transaction: Transaction,
  labId: string,
  changed: Changed,
): Promise<void> {
  const [where, id] =
    'plateId' in changed
      ? [
          `exists (select 1 from version_plates vp
            where vp.lab_id = v.lab_id and vp.version_id = v.id and vp.plate_id = ?)`,
          changed.plateId,
        ]
      : ['v.bench_id = ?', changed.benchId];
  // In the order of their ids, so that two changes at once do not wait for each other in a circle.
  const found: unknown = await transaction.raw(
    `insert into reliance_reports as r (lab_id, version_id, waiting, done, total)
      select v.lab_id, v.id, true, 0, v.target_count from versions v
      where v.lab_id = ? and ${where} and ${isNewestVersion}
      order by v.id
      on conflict (version_id) do update set waiting = true, done = 0
      returning version_id`,
    [labId, id],
  );
  const versionIds = reportRows.parse(rowsOf(found)).map(({ version_id }) => version_id);
  if (versionIds.length > 0) await queueJob(transaction, 'reliance', { labId, versionIds });
}
