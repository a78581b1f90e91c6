import { z } from 'zod';
import type { Transaction } from '../../db/database';

const rowsOf = z.object({
  rows: z.array(
    z.object({
      run_id: z.string(),
      next_setting: z.number().nullable(),
      last_done_setting: z.number().nullable(),
    }),
  ),
});

/** Where a run stands, in settings counted from 1. */
export interface Standing {
  /** The first that is neither done nor skipped; null when none is left. */
  readonly nextSetting: number | null;
  /** The one that was done last and still counts as done; null when none is. */
  readonly lastDoneSetting: number | null;
}

export async function standings(
  transaction: Transaction,
  labId: string,
  runIds: readonly string[],
): Promise<ReadonlyMap<string, Standing>> {
  const found: unknown = await transaction.raw(
    `select r.id as run_id,
        (select min(place) + 1 from generate_series(0, r.setting_count - 1) place
          where not exists (select 1 from readings
            where lab_id = r.lab_id and run_id = r.id and setting_index = place)) as next_setting,
        (select setting_index + 1 from (select distinct on (setting_index) setting_index, outcome, sequence
            from readings where lab_id = r.lab_id and run_id = r.id order by setting_index, sequence desc) last
          where outcome = 'done' order by sequence desc limit 1) as last_done_setting
      from runs r where r.lab_id = ? and r.id = any(?)`,
    [labId, [...runIds]],
  );
  return new Map(
    rowsOf
      .parse(found)
      .rows.map((row) => [
        row.run_id,
        { nextSetting: row.next_setting, lastDoneSetting: row.last_done_setting },
      ]),
  );
}
