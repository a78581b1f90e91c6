import { z } from 'zod';
import { attachmentKindSchema, type AttachedFile } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { rowsOf } from '../../db/rows';
import { fileColumns, fileRow, mapFile } from '../files';

const attachedRow = fileRow.extend({ kind: attachmentKindSchema });

interface PlateKey {
  readonly labId: string;
  readonly plateId: string;
}

/** Photos and data sheets of a plate, newest first. */
export async function listAttachedFiles(
  transaction: Transaction,
  { labId, plateId }: PlateKey,
): Promise<AttachedFile[]> {
  const found: unknown = await transaction.raw(
    `select ${fileColumns}, a.kind from plate_files a
      join files f on f.lab_id = a.lab_id and f.id = a.file_id join users u on u.id = f.uploaded_by
      where a.lab_id = ? and a.plate_id = ? and a.removed_at is null order by a.created_at desc, a.id desc`,
    [labId, plateId],
  );
  return z
    .array(attachedRow)
    .parse(rowsOf(found))
    .map((row) => ({ ...mapFile(row), kind: row.kind }));
}

/** Attaches a file, or brings back one that was taken off. */
export async function attachFile(
  transaction: Transaction,
  { labId, plateId }: PlateKey,
  file: { readonly fileId: string; readonly kind: AttachedFile['kind'] },
  now: Date,
): Promise<void> {
  await transaction('plate_files')
    .insert({
      id: newId(),
      lab_id: labId,
      plate_id: plateId,
      file_id: file.fileId,
      kind: file.kind,
      created_at: now,
    })
    .onConflict(['lab_id', 'plate_id', 'file_id'])
    .merge({ kind: file.kind, removed_at: null, created_at: now });
}

/** @returns whether it was attached. The file itself stays. */
export async function detachFile(
  transaction: Transaction,
  { labId, plateId }: PlateKey,
  fileId: string,
  now: Date,
): Promise<boolean> {
  const changed: unknown = await transaction('plate_files')
    .where({ lab_id: labId, plate_id: plateId, file_id: fileId })
    .whereNull('removed_at')
    .update({ removed_at: now });
  return changed === 1;
}
