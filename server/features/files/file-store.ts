import { createHash } from 'node:crypto';
import { z } from 'zod';
import type { Thing } from '../../../shared/permissions';
import { type MediaType, mediaTypeSchema, type StoredFile } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { rowsOf } from '../../db/rows';

export const fileRow = z.object({
  file_id: z.string(),
  file_name: z.string(),
  media_type: mediaTypeSchema,
  sha256: z.string(),
  size_bytes: z.number(),
  uploaded_by_name: z.string(),
  uploaded_at: z.date(),
});

export const fileColumns = `f.id as file_id, f.name as file_name, f.media_type, f.sha256, f.size_bytes, u.name as uploaded_by_name,
  f.uploaded_at`;

const bytesRow = z.object({ content: z.instanceof(Buffer) });
/** A sum over no rows is null. */
const sumRow = z.object({ total: z.coerce.number().nullable() });

export function mapFile(row: z.infer<typeof fileRow>): StoredFile {
  return {
    id: row.file_id,
    name: row.file_name,
    mediaType: row.media_type,
    sha256: row.sha256,
    sizeBytes: row.size_bytes,
    uploadedBy: row.uploaded_by_name,
    uploadedAt: row.uploaded_at.toISOString(),
  };
}

interface FileKey {
  readonly labId: string;
  readonly fileId: string;
}

/** What is known of a file, without its bytes. */
export async function findFile(
  transaction: Transaction,
  { labId, fileId }: FileKey,
): Promise<(StoredFile & Thing) | null> {
  const found: unknown = await transaction.raw(
    `select ${fileColumns} from files f join users u on u.id = f.uploaded_by where f.lab_id = ? and f.id = ?`,
    [labId, fileId],
  );
  const [row] = rowsOf(found);
  return row === undefined ? null : { ...mapFile(fileRow.parse(row)), labId };
}

/** The bytes of a file as they came. @throws Error where there is none: look for the file first. */
export async function readBytes(transaction: Transaction, { labId, fileId }: FileKey): Promise<Buffer> {
  const found: unknown = await transaction('files').where({ lab_id: labId, id: fileId }).first('content');
  return bytesRow.parse(found).content;
}

/** What one person's files in a lab come to, in bytes. */
export async function storedBytes(
  transaction: Transaction,
  person: { readonly labId: string; readonly userId: string },
): Promise<number> {
  const found: unknown = await transaction('files')
    .where({ lab_id: person.labId, uploaded_by: person.userId })
    .sum({ total: 'size_bytes' })
    .first();
  return sumRow.parse(found).total ?? 0;
}

export async function insertFile(
  transaction: Transaction,
  place: { readonly labId: string; readonly userId: string; readonly now: Date },
  file: { readonly name: string; readonly mediaType: MediaType; readonly bytes: Buffer },
): Promise<string> {
  const id = newId(place.now);
  await transaction('files').insert({
    id,
    lab_id: place.labId,
    name: file.name,
    media_type: file.mediaType,
    sha256: createHash('sha256').update(file.bytes).digest('hex'),
    size_bytes: file.bytes.length,
    content: file.bytes,
    uploaded_by: place.userId,
    uploaded_at: place.now,
  });
  return id;
}
