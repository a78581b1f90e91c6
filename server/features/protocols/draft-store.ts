import { z } from 'zod';
import type { Thing } from '../../../shared/permissions';
import {
  type Draft,
  type DraftContent,
  draftContentSchema,
  type Protocol,
  protocolKindSchema,
  type ProtocolSummary,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { holdLab } from '../labs';
import { latestVersions } from './version-store';

const draftRow = z.object({
  protocol_id: z.string(),
  lab_id: z.string(),
  revision: z.number(),
  content: z.string(),
  saved_at: z.date(),
  saved_by_name: z.string(),
});
const summaryRow = z.object({
  protocol_id: z.string(),
  name: z.string(),
  purpose: z.string(),
  kind: protocolKindSchema,
  bench_name: z.string(),
  target_count: z.number(),
  saved_at: z.date(),
  saved_by_name: z.string(),
});

export type StoredProtocol = Protocol & Thing;

export function asProtocol({ id, draft, latestVersion }: StoredProtocol): Protocol {
  return { id, draft, latestVersion };
}

/** Every protocol of a lab, the latest saved first. */
export async function listProtocols(transaction: Transaction, labId: string): Promise<ProtocolSummary[]> {
  const rows: unknown[] = await transaction('drafts')
    .join('benches', 'benches.id', 'drafts.bench_id')
    .join('users', 'users.id', 'drafts.saved_by')
    .where({ 'drafts.lab_id': labId })
    .orderBy([
      { column: 'drafts.saved_at', order: 'desc' },
      { column: 'drafts.protocol_id', order: 'desc' },
    ])
    .select(
      'drafts.protocol_id',
      'drafts.name',
      'drafts.purpose',
      'drafts.kind',
      'drafts.target_count',
      'drafts.saved_at',
      'benches.name as bench_name',
      'users.name as saved_by_name',
    );
  const latest = await latestVersions(transaction, labId);
  return z
    .array(summaryRow)
    .parse(rows)
    .map((row) => ({
      id: row.protocol_id,
      name: row.name,
      purpose: row.purpose,
      kind: row.kind,
      benchName: row.bench_name,
      targetCount: row.target_count,
      draftSavedAt: row.saved_at.toISOString(),
      draftSavedBy: row.saved_by_name,
      latestVersion: latest.get(row.protocol_id) ?? null,
    }));
}

export async function findProtocol(
  transaction: Transaction,
  { labId, protocolId }: { readonly labId: string; readonly protocolId: string },
): Promise<StoredProtocol | null> {
  const found: unknown = await transaction('drafts')
    .join('users', 'users.id', 'drafts.saved_by')
    .where({ 'drafts.lab_id': labId, 'drafts.protocol_id': protocolId })
    .first(
      'drafts.protocol_id',
      'drafts.lab_id',
      'drafts.revision',
      'drafts.content',
      'drafts.saved_at',
      'users.name as saved_by_name',
    );
  if (found === undefined) return null;
  const row = draftRow.parse(found);
  const latest = await latestVersions(transaction, labId, protocolId);
  return {
    id: row.protocol_id,
    labId: row.lab_id,
    draft: {
      revision: row.revision,
      content: draftContentSchema.parse(JSON.parse(row.content)),
      savedAt: row.saved_at.toISOString(),
      savedBy: row.saved_by_name,
    },
    latestVersion: latest.get(protocolId) ?? null,
  };
}

/** As `findProtocol`, and nobody else saves its draft or a version, or changes the lab's convention, until the transaction ends. */
export async function findProtocolToChange(
  transaction: Transaction,
  key: { readonly labId: string; readonly protocolId: string },
): Promise<StoredProtocol | null> {
  await holdLab(transaction, key);
  await transaction('drafts')
    .where({ lab_id: key.labId, protocol_id: key.protocolId })
    .forUpdate()
    .select('protocol_id');
  return findProtocol(transaction, key);
}

interface Saving {
  readonly labId: string;
  readonly user: { readonly id: string; readonly name: string };
  readonly now: Date;
}

export async function insertProtocol(
  transaction: Transaction,
  { labId, user, now }: Saving,
  protocolId: string,
  content: DraftContent,
): Promise<Protocol> {
  await transaction('protocols').insert({
    id: protocolId,
    lab_id: labId,
    created_by: user.id,
    created_at: now,
  });
  await transaction('drafts').insert({
    protocol_id: protocolId,
    lab_id: labId,
    revision: 1,
    ...columnsOf(content),
    saved_at: now,
    saved_by: user.id,
  });
  return { id: protocolId, draft: asDraft(1, content, { user, now }), latestVersion: null };
}

export async function updateDraft(
  transaction: Transaction,
  { labId, user, now }: Saving,
  stored: Protocol,
  content: DraftContent,
): Promise<Draft> {
  const revision = stored.draft.revision + 1;
  await transaction('drafts')
    .where({ lab_id: labId, protocol_id: stored.id })
    .update({ revision, ...columnsOf(content), saved_at: now, saved_by: user.id });
  return asDraft(revision, content, { user, now });
}

function asDraft(
  revision: number,
  content: DraftContent,
  { user, now }: Pick<Saving, 'user' | 'now'>,
): Draft {
  return { revision, content, savedAt: now.toISOString(), savedBy: user.name };
}

function columnsOf(content: DraftContent) {
  return {
    content: JSON.stringify(content),
    name: content.name,
    purpose: content.purpose,
    kind: content.kind,
    bench_id: content.benchId,
    target_count: content.targets.length,
  };
}
