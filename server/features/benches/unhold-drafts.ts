import { z } from 'zod';
import { draftContentSchema } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';

const draftRow = z.object({ protocol_id: z.string(), content: z.string(), revision: z.number() });

/**
 * Held angles and present dials belong to the plates they were read from. When other plates stand in a bench's beam, or the
 * same in another order, every draft for it forgets them and gets older, so that a page with the old ones meets a conflict.
 */
export async function unholdDrafts(
  transaction: Transaction,
  { labId, benchId }: { readonly labId: string; readonly benchId: string },
): Promise<void> {
  const drafts = z
    .array(draftRow)
    .parse(
      await transaction('drafts')
        .where({ lab_id: labId, bench_id: benchId })
        .orderBy('protocol_id')
        .forUpdate()
        .select('protocol_id', 'content', 'revision'),
    );
  for (const { protocol_id, content, revision } of drafts) {
    const draft = draftContentSchema.parse(JSON.parse(content));
    const holds =
      draft.presentDialsDeg !== null || draft.targets.some(({ heldFastAxesDeg }) => heldFastAxesDeg !== null);
    if (!holds) continue;
    const targets = draft.targets.map((target) => ({ ...target, heldFastAxesDeg: null }));
    await transaction('drafts')
      .where({ lab_id: labId, protocol_id })
      .update({
        content: JSON.stringify({ ...draft, presentDialsDeg: null, targets }),
        revision: revision + 1,
      });
  }
}
