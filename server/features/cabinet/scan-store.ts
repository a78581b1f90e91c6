import { z } from 'zod';
import { type ScanColumns, scanColumnsSchema } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';

const columnsRow = z.object({ columns: z.string() });

/** Which column was what in the last file of this lab that looked alike; null for one that looks new. */
export async function rememberedColumns(
  transaction: Transaction,
  labId: string,
  signature: string,
): Promise<ScanColumns | null> {
  const found: unknown = await transaction('scan_columns')
    .where({ lab_id: labId, signature })
    .first('columns');
  if (found === undefined) return null;
  return scanColumnsSchema.parse(JSON.parse(columnsRow.parse(found).columns));
}

export async function rememberColumns(
  transaction: Transaction,
  place: { readonly labId: string; readonly now: Date },
  signature: string,
  columns: ScanColumns,
): Promise<void> {
  const kept = { columns: JSON.stringify(columns), used_at: place.now };
  await transaction('scan_columns')
    .insert({ lab_id: place.labId, signature, ...kept })
    .onConflict(['lab_id', 'signature'])
    .merge(kept);
}
