import { z } from 'zod';
import type { Transaction } from '../../db/database';

const idRows = z.array(z.object({ calibration_id: z.string() }));
const measurerRows = z.array(z.object({ id: z.string(), recorded_by: z.string() }));

export type NoticeStage = 'due' | 'overdue' | 'left-tolerance';

/**
 * Notes that people are told of these calibrations at this stage. @returns those that nobody was told of before: two
 * servers that look at the same moment wait for each other here, and only one of them gets a calibration.
 */
export async function noteFirst(
  transaction: Transaction,
  { labId, now }: { readonly labId: string; readonly now: Date },
  stage: NoticeStage,
  calibrationIds: readonly string[],
): Promise<ReadonlySet<string>> {
  if (calibrationIds.length === 0) return new Set();
  // In one order, so that they do not wait in a circle.
  const rows: unknown = await transaction('due_notices')
    .insert(
      [...new Set(calibrationIds)]
        .sort()
        .map((calibration_id) => ({ lab_id: labId, calibration_id, stage, noticed_at: now })),
    )
    .onConflict(['calibration_id', 'stage'])
    .ignore()
    .returning('calibration_id');
  return new Set(idRows.parse(rows).map(({ calibration_id }) => calibration_id));
}

/** Who recorded each of these calibrations. */
export async function measurers(
  transaction: Transaction,
  labId: string,
  calibrationIds: readonly string[],
): Promise<ReadonlyMap<string, string>> {
  const rows: unknown = await transaction('calibrations')
    .where({ lab_id: labId })
    .whereIn('id', calibrationIds)
    .select('id', 'recorded_by');
  return new Map(measurerRows.parse(rows).map((row) => [row.id, row.recorded_by]));
}
