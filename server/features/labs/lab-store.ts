import { z } from 'zod';
import type { Thing } from '../../../shared/permissions';
import { conventionSchema, type Lab, type UpdateLab } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';

const labRow = z.object({
  id: z.string(),
  name: z.string(),
  phase: conventionSchema.shape.phase,
  handedness: conventionSchema.shape.handedness,
  s3_sign: conventionSchema.shape.s3Sign,
  calibration_due_days: z.number(),
});

export type StoredLab = Lab & Thing;

function mapRow(row: unknown): StoredLab {
  const { id, name, phase, handedness, s3_sign, calibration_due_days } = labRow.parse(row);
  return {
    id,
    labId: id,
    name,
    convention: { phase, handedness, s3Sign: s3_sign },
    calibrationDueDays: calibration_due_days,
  };
}

/** The lab as it is stored, or null where the transaction's viewer cannot see it. The usual thing that decides access. */
export async function findLab(
  transaction: Transaction,
  { labId }: { readonly labId: string },
): Promise<StoredLab | null> {
  const found: unknown = await transaction('labs').where({ id: labId }).first();
  return found === undefined ? null : mapRow(found);
}

/**
 * As `findLab`, and its settings stay as they are until the transaction ends: for whoever writes what is read by the
 * lab's convention. Taken before any other row, so that nobody waits in a circle.
 */
export async function holdLab(
  transaction: Transaction,
  { labId }: { readonly labId: string },
): Promise<StoredLab | null> {
  const found: unknown = await transaction('labs').where({ id: labId }).forShare().first();
  return found === undefined ? null : mapRow(found);
}

/** As `findLab`, and nobody else changes its settings or holds them still until the transaction ends. */
export async function findLabToChange(
  transaction: Transaction,
  { labId }: { readonly labId: string },
): Promise<StoredLab | null> {
  // Not FOR UPDATE: every row of the lab refers to its key, and would wait for a change of its name.
  const found: unknown = await transaction('labs').where({ id: labId }).forNoKeyUpdate().first();
  return found === undefined ? null : mapRow(found);
}

/** What the API shows of a lab. */
export function asLab({ id, name, convention, calibrationDueDays }: StoredLab): Lab {
  return { id, name, convention, calibrationDueDays };
}

export async function insertLab(transaction: Transaction, lab: Lab): Promise<void> {
  await transaction('labs').insert({ id: lab.id, ...columnsOf(lab) });
}

/** Writes what is given and leaves the rest as it is. */
export async function updateLab(transaction: Transaction, labId: string, change: UpdateLab): Promise<void> {
  const columns = columnsOf(change);
  if (Object.values(columns).every((value) => value === undefined)) return;
  await transaction('labs').where({ id: labId }).update(columns);
}

function columnsOf({ name, convention, calibrationDueDays }: UpdateLab) {
  return {
    name,
    phase: convention?.phase,
    handedness: convention?.handedness,
    s3_sign: convention?.s3Sign,
    calibration_due_days: calibrationDueDays,
  };
}
