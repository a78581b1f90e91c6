import { z } from 'zod';
import type { Transaction } from '../../db/database';

const row = z.object({
  protocol_id: z.string(),
  name: z.string(),
  target_count: z.number(),
  saved_at: z.date(),
  saved_by_name: z.string(),
  after_version: z.number().nullable(),
  ahead: z.boolean(),
});
const rowsOf = z.object({ rows: z.array(row) });

export interface DraftAhead {
  readonly protocolId: string;
  readonly protocolName: string;
  readonly targetCount: number;
  readonly savedAt: string;
  readonly savedBy: string;
  readonly afterVersion: number | null;
}

/** Drafts that were saved after their newest version was frozen, latest first, and how many protocols there are. */
export async function draftsAhead(
  transaction: Transaction,
  labId: string,
): Promise<{ readonly drafts: readonly DraftAhead[]; readonly protocolCount: number }> {
  const found: unknown = await transaction.raw(
    `select d.protocol_id, d.name, d.target_count, d.saved_at, u.name as saved_by_name, v.number as after_version,
        v.draft_revision is distinct from d.revision as ahead
      from drafts d
      join users u on u.id = d.saved_by
      left join lateral (select number, draft_revision from versions
        where lab_id = d.lab_id and protocol_id = d.protocol_id order by number desc limit 1) v on true
      where d.lab_id = ? order by d.saved_at desc, d.protocol_id desc`,
    [labId],
  );
  const { rows } = rowsOf.parse(found);
  const drafts = rows
    .filter(({ ahead }) => ahead)
    .map((draft) => ({
      protocolId: draft.protocol_id,
      protocolName: draft.name,
      targetCount: draft.target_count,
      savedAt: draft.saved_at.toISOString(),
      savedBy: draft.saved_by_name,
      afterVersion: draft.after_version,
    }));
  return { drafts, protocolCount: rows.length };
}
