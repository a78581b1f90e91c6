import { z } from 'zod';
import { type Convention, sameConvention } from '../../../shared/optics/convention';
import { translateExpression } from '../../../shared/protocol/translate-expression';
import { draftContentSchema } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';

const draftRow = z.object({ protocol_id: z.string(), content: z.string(), revision: z.number() });
const benchRow = z.object({ id: z.string(), input_expression: z.string(), revision: z.number() });

/**
 * Rewrites what a lab has written so far when it changes its convention: the change is in what is shown, never in what
 * light the plates make. Versions keep the convention they were frozen with. Every draft and bench gets older by it, so
 * that a page that was opened under the old convention is refused whatever it saves.
 * @returns how many had words to translate.
 */
export async function translateLab(
  transaction: Transaction,
  change: { readonly labId: string; readonly userId: string; readonly now: Date },
  from: Convention,
  to: Convention,
): Promise<{ readonly drafts: number; readonly benches: number }> {
  if (sameConvention(from, to)) return { drafts: 0, benches: 0 };
  return {
    drafts: await translateDrafts(transaction, change, from, to),
    benches: await translateBenches(transaction, change.labId, from, to),
  };
}

async function translateDrafts(
  transaction: Transaction,
  { labId, userId, now }: { readonly labId: string; readonly userId: string; readonly now: Date },
  from: Convention,
  to: Convention,
): Promise<number> {
  let translated = 0;
  const drafts = z
    .array(draftRow)
    .parse(await transaction('drafts').where({ lab_id: labId }).orderBy('protocol_id').forUpdate().select());
  for (const { protocol_id, content, revision } of drafts) {
    const draft = draftContentSchema.parse(JSON.parse(content));
    const targets = draft.targets.map((target) => ({
      ...target,
      expression: translateExpression(target.expression, draft.kind, from, to),
    }));
    const same = targets.every(({ expression }, index) => expression === draft.targets[index]?.expression);
    if (!same) translated += 1;
    await transaction('drafts')
      .where({ lab_id: labId, protocol_id })
      .update({
        revision: revision + 1,
        ...(same ? {} : { content: JSON.stringify({ ...draft, targets }), saved_at: now, saved_by: userId }),
      });
  }
  return translated;
}

async function translateBenches(
  transaction: Transaction,
  labId: string,
  from: Convention,
  to: Convention,
): Promise<number> {
  let translated = 0;
  const benches = z
    .array(benchRow)
    .parse(await transaction('benches').where({ lab_id: labId }).orderBy('id').forUpdate().select());
  for (const { id, input_expression, revision } of benches) {
    const expression = translateExpression(input_expression, 'prepare', from, to);
    if (expression !== input_expression) translated += 1;
    await transaction('benches')
      .where({ lab_id: labId, id })
      .update({ input_expression: expression, revision: revision + 1 });
  }
  return translated;
}
