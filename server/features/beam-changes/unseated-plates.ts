import { z } from 'zod';
import type { VersionContent } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { rowsOf } from '../../db/rows';

const plateRow = z.object({ plate_id: z.string() });

/** Those of a version's plates that have left the seat in which its zero was measured, by id. */
export async function unseatedPlateIds(
  transaction: Transaction,
  labId: string,
  { bench: { plates } }: VersionContent,
): Promise<ReadonlySet<string>> {
  const found: unknown = await transaction.raw(
    `select s.plate_id from calibrations c join seats s on s.lab_id = c.lab_id and s.id = c.seat_id
      where c.lab_id = ? and c.id = any(?) and s.left_at is not null order by s.plate_id`,
    [labId, plates.map(({ calibration }) => calibration.id)],
  );
  return new Set(rowsOf(found).map((row) => plateRow.parse(row).plate_id));
}
