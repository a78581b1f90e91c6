import { z } from 'zod';
import {
  type Calibration,
  type CalibrationInput,
  scanLightKindSchema,
  type SeatedCalibration,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { rowsOf } from '../../db/rows';
import { calibrationColumns, calibrationRow, mapCalibration } from './plate-rows';

/** The most of a plate's history that one page shows. */
const mostShown = 1000;

const seatedRow = calibrationRow.extend({
  seat_id: z.string(),
  scan_name: z.string().nullable(),
  sha256: z.string().nullable(),
  size_bytes: z.number().nullable(),
  light: scanLightKindSchema.nullable(),
});
const fittedRow = calibrationRow.extend({ seat_id: z.string(), fit: z.string().nullable() });

/** What was measured of a plate in all its seats, newest first. */
export async function listCalibrations(
  transaction: Transaction,
  key: { readonly labId: string; readonly plateId: string },
): Promise<SeatedCalibration[]> {
  const found: unknown = await transaction.raw(
    `select ${calibrationColumns}, c.seat_id, f.name as scan_name, f.sha256, f.size_bytes,
        c.fit::json -> 'light' ->> 'kind' as light from seats s
      join calibrations c on c.lab_id = s.lab_id and c.seat_id = s.id join users u on u.id = c.recorded_by
      left join files f on f.lab_id = c.lab_id and f.id = c.file_id
      where s.lab_id = ? and s.plate_id = ? order by c.measured_at desc, c.recorded_at desc, c.id desc limit ${mostShown}`,
    [key.labId, key.plateId],
  );
  return z
    .array(seatedRow)
    .parse(rowsOf(found))
    .map((row) => ({ ...mapCalibration(row), seatId: row.seat_id, scan: mapScan(row) }));
}

function mapScan(row: z.infer<typeof seatedRow>): SeatedCalibration['scan'] {
  const { scan_name: name, sha256, size_bytes: sizeBytes, light } = row;
  if (name === null || sha256 === null || sizeBytes === null || light === null) return null;
  return { name, sha256, sizeBytes, light };
}

/** A calibration, the seat it was measured in, and the text of its fit where it came from a scan. */
export interface FoundCalibration {
  readonly calibration: Calibration;
  readonly seatId: string;
  readonly fit: string | null;
}

/** One calibration of a plate, with the text of its fit where it came from a scan. */
export async function findCalibration(
  transaction: Transaction,
  key: { readonly labId: string; readonly plateId: string; readonly calibrationId: string },
): Promise<FoundCalibration | null> {
  const found: unknown = await transaction.raw(
    `select ${calibrationColumns}, c.seat_id, c.fit from calibrations c
      join seats s on s.lab_id = c.lab_id and s.id = c.seat_id join users u on u.id = c.recorded_by
      where c.lab_id = ? and s.plate_id = ? and c.id = ?`,
    [key.labId, key.plateId, key.calibrationId],
  );
  const [row] = rowsOf(found);
  if (row === undefined) return null;
  const read = fittedRow.parse(row);
  return { calibration: mapCalibration(read), seatId: read.seat_id, fit: read.fit };
}

/** What was measured, and how and when, as its columns. */
export function measuredColumns(calibration: Omit<CalibrationInput, 'settlesId'>) {
  return {
    wavelength_nm: calibration.wavelengthNm,
    temperature_c: calibration.temperatureC,
    retardance_deg: calibration.retardanceDeg,
    retardance_sigma_deg: calibration.retardanceSigmaDeg,
    offset_deg: calibration.offsetDeg,
    offset_sigma_deg: calibration.offsetSigmaDeg,
    method: calibration.method,
    note: calibration.note,
    open_questions: calibration.openQuestions,
    measured_at: calibration.measuredAt,
  };
}

/** Of a scan: the file as it came and canonical JSON of how it was read and fitted. */
export interface ScanRecord {
  readonly fileId: string;
  readonly fit: string;
}

export async function insertCalibration(
  transaction: Transaction,
  place: { readonly labId: string; readonly userId: string; readonly now: Date },
  seatId: string,
  calibration: CalibrationInput,
  scan: ScanRecord | null = null,
): Promise<string> {
  const id = newId();
  await transaction('calibrations').insert({
    id,
    lab_id: place.labId,
    seat_id: seatId,
    ...measuredColumns(calibration),
    settles_id: calibration.settlesId,
    file_id: scan?.fileId ?? null,
    fit: scan?.fit ?? null,
    recorded_by: place.userId,
    recorded_at: place.now,
  });
  return id;
}
