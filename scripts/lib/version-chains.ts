import type { Knex } from 'knex';
import { z } from 'zod';
import { seeAs } from '../../server/db/in-transaction';
import type { Transaction } from '../../server/db/database';
import { verifyChain } from '../../shared/protocol/verify';

const ids = z.array(z.object({ id: z.string() }));
const link = z.object({
  protocol_id: z.string(),
  protocol_name: z.string(),
  number: z.number(),
  content: z.string(),
  content_hash: z.string(),
  parent_hash: z.string().nullable(),
});

export type ChainsVerdict =
  | { readonly ok: true; readonly labs: number; readonly versions: number }
  | {
      readonly ok: false;
      readonly labName: string;
      readonly protocolName: string;
      readonly number: number;
      readonly reason: string;
    };

/** Re-hashes every version of every lab, and names the first that is not what it was when it was saved. */
export async function verifyVersions(database: Knex): Promise<ChainsVerdict> {
  return database.transaction(async (transaction) => {
    const labs = await allLabs(transaction);
    let versions = 0;
    for (const [labId, labName] of labs) {
      await seeAs(transaction, { userId: null, labId });
      const protocols = ids.parse(await transaction('protocols').orderBy('id').select('id'));
      for (const { id } of protocols) {
        const rows = z
          .array(link)
          .parse(await transaction('versions').where({ protocol_id: id }).orderBy('number').select());
        const verdict = verifyChain(
          rows.map((row) => ({
            number: row.number,
            canonicalJson: row.content,
            contentHash: row.content_hash,
            parentHash: row.parent_hash,
          })),
        );
        if (!verdict.ok) {
          const protocolName = rows.find(({ number }) => number === verdict.number)?.protocol_name ?? id;
          return { ok: false, labName, protocolName, number: verdict.number, reason: verdict.reason };
        }
        versions += verdict.length;
      }
    }
    return { ok: true, labs: labs.size, versions };
  });
}

/** Row-level security shows nobody all labs, their tables' owner included; each person sees theirs, and a lab always has a lead. */
async function allLabs(transaction: Transaction): Promise<ReadonlyMap<string, string>> {
  const found = new Map<string, string>();
  for (const { id } of ids.parse(await transaction('users').orderBy('id').select('id'))) {
    await seeAs(transaction, { userId: id, labId: null });
    const labs = z
      .array(z.object({ id: z.string(), name: z.string() }))
      .parse(await transaction('labs').orderBy('id').select('id', 'name'));
    for (const lab of labs) found.set(lab.id, lab.name);
  }
  return found;
}
