import { z } from 'zod';
import { canonicalJson, contentHash } from '../../shared/protocol/canonical-json';
import type { Transaction } from '../db/database';
import { newId } from '../db/new-id';

/** What happened to what. `details` is JSON and holds no secret. */
export interface AuditEntry {
  readonly kind: string;
  readonly subjectId: string;
  readonly details?: Readonly<Record<string, unknown>>;
}

interface AuditOrigin {
  readonly labId: string;
  readonly actor: { readonly id: string; readonly name: string };
  readonly at: Date;
}

const lastRow = z.object({ sequence: z.coerce.number(), hash: z.string() });

/**
 * Appends to a lab's record: each event's hash covers its parent's, so a change or a gap shows. Takes the lab's turn,
 * which is held until the transaction ends: call it last.
 */
export async function recordEvent(
  transaction: Transaction,
  origin: AuditOrigin,
  entry: AuditEntry,
): Promise<void> {
  await transaction.raw('select pg_advisory_xact_lock(hashtextextended(?, 1))', [origin.labId]);
  const found: unknown = await transaction('audit_events')
    .where({ lab_id: origin.labId })
    .orderBy('sequence', 'desc')
    .first('sequence', 'hash');
  const parent = found === undefined ? null : lastRow.parse(found);
  const id = newId(origin.at);
  const sequence = (parent?.sequence ?? 0) + 1;
  const content = canonicalJson({
    format: 'quarterturn.audit/1',
    id,
    labId: origin.labId,
    sequence,
    parentHash: parent?.hash ?? null,
    at: origin.at.toISOString(),
    actor: origin.actor,
    kind: entry.kind,
    subjectId: entry.subjectId,
    details: entry.details ?? {},
  });
  await transaction('audit_events').insert({
    id,
    lab_id: origin.labId,
    sequence,
    parent_hash: parent?.hash ?? null,
    hash: contentHash(content),
    content,
    kind: entry.kind,
    subject_id: entry.subjectId,
    actor_id: origin.actor.id,
    at: origin.at,
  });
}
