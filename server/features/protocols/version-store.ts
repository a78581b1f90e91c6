import { z } from 'zod';
import type { Thing } from '../../../shared/permissions';
import type { Frozen } from '../../../shared/protocol/freeze';
import { type Version, versionContentSchema, type VersionSummary } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';

const summaryRow = z.object({
  id: z.string(),
  lab_id: z.string(),
  protocol_id: z.string(),
  protocol_name: z.string(),
  number: z.number(),
  message: z.string(),
  content_hash: z.string(),
  target_count: z.number(),
  saved_at: z.date(),
  saved_by_name: z.string(),
});
const versionRow = summaryRow.extend({ content: z.string(), parent_hash: z.string().nullable() });

export type StoredVersion = Version & Thing;

function mapSummary(row: z.infer<typeof summaryRow>): VersionSummary {
  return {
    id: row.id,
    protocolId: row.protocol_id,
    protocolName: row.protocol_name,
    number: row.number,
    message: row.message,
    contentHash: row.content_hash,
    targetCount: row.target_count,
    savedAt: row.saved_at.toISOString(),
    savedBy: row.saved_by_name,
  };
}

export function asVersion({ summary, content, canonicalJson, parentHash }: StoredVersion): Version {
  return { summary, content, canonicalJson, parentHash };
}

const summaryColumns = [
  'versions.id',
  'versions.lab_id',
  'versions.protocol_id',
  'versions.protocol_name',
  'versions.number',
  'versions.message',
  'versions.content_hash',
  'versions.target_count',
  'versions.saved_at',
  'users.name as saved_by_name',
] as const;

function versions(transaction: Transaction, labId: string) {
  return transaction('versions')
    .join('users', 'users.id', 'versions.saved_by')
    .where({ 'versions.lab_id': labId });
}

/** The newest version of each protocol, or of one. */
export async function latestVersions(
  transaction: Transaction,
  labId: string,
  protocolId?: string,
): Promise<ReadonlyMap<string, VersionSummary>> {
  const rows: unknown[] = await versions(transaction, labId)
    .modify((query) => {
      if (protocolId !== undefined) void query.where({ 'versions.protocol_id': protocolId });
    })
    .distinctOn('versions.protocol_id')
    .orderBy([{ column: 'versions.protocol_id' }, { column: 'versions.number', order: 'desc' }])
    .select(summaryColumns);
  return new Map(
    z
      .array(summaryRow)
      .parse(rows)
      .map((row) => [row.protocol_id, mapSummary(row)]),
  );
}

/** A protocol's versions, newest first. */
export async function listVersions(
  transaction: Transaction,
  labId: string,
  protocolId: string,
): Promise<VersionSummary[]> {
  const rows: unknown[] = await versions(transaction, labId)
    .where({ 'versions.protocol_id': protocolId })
    .orderBy('versions.number', 'desc')
    .select(summaryColumns);
  return z.array(summaryRow).parse(rows).map(mapSummary);
}

/** A lab's versions, newest first, by page: ids rise with time, so the last id of a page is the cursor. */
export async function pageOfVersions(
  transaction: Transaction,
  labId: string,
  page: { readonly before: string | null; readonly limit: number },
): Promise<{ readonly items: VersionSummary[]; readonly nextCursor: string | null }> {
  const rows: unknown[] = await versions(transaction, labId)
    .modify((query) => {
      if (page.before !== null) void query.where('versions.id', '<', page.before);
    })
    .orderBy('versions.id', 'desc')
    .limit(page.limit + 1)
    .select(summaryColumns);
  const found = z.array(summaryRow).parse(rows).map(mapSummary);
  const items = found.slice(0, page.limit);
  return { items, nextCursor: found.length > page.limit ? (items.at(-1)?.id ?? null) : null };
}

function mapVersion(unread: unknown): StoredVersion {
  const row = versionRow.parse(unread);
  return {
    labId: row.lab_id,
    summary: mapSummary(row),
    content: versionContentSchema.parse(JSON.parse(row.content)),
    canonicalJson: row.content,
    parentHash: row.parent_hash,
  };
}

export async function findVersion(
  transaction: Transaction,
  key: { readonly labId: string; readonly protocolId: string; readonly number: number },
): Promise<StoredVersion | null> {
  const found: unknown = await versions(transaction, key.labId)
    .where({ 'versions.protocol_id': key.protocolId, 'versions.number': key.number })
    .first(...summaryColumns, 'versions.content', 'versions.parent_hash');
  return found === undefined ? null : mapVersion(found);
}

export async function findVersionById(
  transaction: Transaction,
  labId: string,
  id: string,
): Promise<StoredVersion | null> {
  const found: unknown = await versions(transaction, labId)
    .where({ 'versions.id': id })
    .first(...summaryColumns, 'versions.content', 'versions.parent_hash');
  return found === undefined ? null : mapVersion(found);
}

/** Keeps a frozen draft for ever. */
export async function insertVersion(
  transaction: Transaction,
  id: string,
  frozen: Extract<Frozen, { ok: true }>,
  draftRevision: number,
): Promise<VersionSummary> {
  const { content } = frozen;
  await transaction('versions').insert({
    id,
    lab_id: content.lab.id,
    protocol_id: content.protocol.id,
    bench_id: content.bench.id,
    number: content.number,
    parent_hash: content.parentHash,
    content_hash: frozen.contentHash,
    content: frozen.canonicalJson,
    draft_revision: draftRevision,
    protocol_name: content.protocol.name,
    bench_name: content.bench.name,
    message: content.message,
    target_count: content.targets.length,
    tolerance_infidelity: content.toleranceInfidelity,
    saved_at: content.savedAt,
    saved_by: content.savedBy.id,
  });
  await transaction('version_plates').insert(
    content.bench.plates.map((plate) => ({ lab_id: content.lab.id, version_id: id, plate_id: plate.id })),
  );
  return {
    id,
    protocolId: content.protocol.id,
    protocolName: content.protocol.name,
    number: content.number,
    message: content.message,
    contentHash: frozen.contentHash,
    targetCount: content.targets.length,
    savedAt: content.savedAt,
    savedBy: content.savedBy.name,
  };
}
