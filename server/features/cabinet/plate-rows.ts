import { z } from 'zod';
import { plateHealth } from '../../../shared/plate-health';
import type { Thing } from '../../../shared/permissions';
import {
  type Calibration,
  type CabinetPlate,
  type Lab,
  type Mount,
  openQuestionSchema,
  type Plate,
  plateConstructionSchema,
  plateKindSchema,
  plateMaterialSchema,
} from '../../../shared/schemas';

const direction = z.union([z.literal(1), z.literal(-1)]);

export const mountColumnsRow = z.object({
  direction,
  resolution_deg: z.number(),
  repeatability_deg: z.number(),
  range_from_deg: z.number().nullable(),
  range_to_deg: z.number().nullable(),
  speed_deg_per_s: z.number().nullable(),
  backlash_deg: z.number(),
  approach: z.enum(['rising', 'falling', 'either']),
});

/** A mount's engraving and motion from its columns. */
export function mapMountColumns(row: z.infer<typeof mountColumnsRow>, name: string): Mount {
  return {
    name,
    direction: row.direction,
    resolutionDeg: row.resolution_deg,
    repeatabilityDeg: row.repeatability_deg,
    rangeDeg:
      row.range_from_deg === null || row.range_to_deg === null
        ? null
        : { from: row.range_from_deg, to: row.range_to_deg },
    speedDegPerS: row.speed_deg_per_s,
    backlashDeg: row.backlash_deg,
    approach: row.approach,
  };
}

export const calibrationRow = z.object({
  calibration_id: z.string(),
  wavelength_nm: z.number(),
  temperature_c: z.number().nullable(),
  retardance_deg: z.number(),
  retardance_sigma_deg: z.number(),
  offset_deg: z.number(),
  offset_sigma_deg: z.number(),
  method: z.string(),
  calibration_note: z.string(),
  open_questions: z.array(openQuestionSchema),
  settles_id: z.string().nullable(),
  file_id: z.string().nullable(),
  measured_at: z.date(),
  recorded_by_name: z.string(),
});

export const calibrationColumns = `c.id as calibration_id, c.wavelength_nm, c.temperature_c, c.retardance_deg, c.retardance_sigma_deg,
  c.offset_deg, c.offset_sigma_deg, c.method, c.note as calibration_note, c.open_questions, c.settles_id, c.file_id, c.measured_at,
  coalesce(c.recorded_as, u.name) as recorded_by_name`;

export function mapCalibration(row: z.infer<typeof calibrationRow>): Calibration {
  return {
    id: row.calibration_id,
    wavelengthNm: row.wavelength_nm,
    temperatureC: row.temperature_c,
    retardanceDeg: row.retardance_deg,
    retardanceSigmaDeg: row.retardance_sigma_deg,
    offsetDeg: row.offset_deg,
    offsetSigmaDeg: row.offset_sigma_deg,
    method: row.method,
    note: row.calibration_note,
    openQuestions: row.open_questions,
    settlesId: row.settles_id,
    fileId: row.file_id,
    measuredAt: row.measured_at.toISOString(),
    recordedBy: row.recorded_by_name,
  };
}

/** What a plate is, as its columns. */
export const plateColumnsRow = z.object({
  name: z.string(),
  kind: plateKindSchema,
  design_wavelength_nm: z.number(),
  construction: plateConstructionSchema,
  material: plateMaterialSchema,
  whole_waves: z.number(),
  serial: z.string(),
  clear_aperture_mm: z.number().nullable(),
  coating_from_nm: z.number().nullable(),
  coating_to_nm: z.number().nullable(),
  damage_note: z.string(),
  note: z.string(),
  retired_at: z.date().nullable(),
});

/** What a plate is from its columns. */
export function mapPlateColumns(row: z.infer<typeof plateColumnsRow>) {
  const { coating_from_nm: from, coating_to_nm: to } = row;
  return {
    name: row.name,
    kind: row.kind,
    designWavelengthNm: row.design_wavelength_nm,
    construction: row.construction,
    material: row.material,
    order: row.whole_waves,
    serial: row.serial,
    clearApertureMm: row.clear_aperture_mm,
    coatingNm: from === null || to === null ? null : { from, to },
    damageNote: row.damage_note,
    note: row.note,
    retiredAt: row.retired_at?.toISOString() ?? null,
  };
}

const plateRow = plateColumnsRow.extend({
  id: z.string(),
  lab_id: z.string(),
  revision: z.number(),
  benches: z.array(z.strictObject({ id: z.string(), name: z.string() })),
});
const seatRow = mountColumnsRow.extend({
  seat_id: z.string(),
  seated_at: z.date(),
  mount_id: z.string(),
  mount_name: z.string(),
});
const noSeat = z.object({ seat_id: z.null() });
const noCalibration = z.object({ calibration_id: z.null() });

/** A plate as it is stored; how healthy it is depends on the lab's rule and the day. */
export type StoredPlate = Omit<CabinetPlate, 'health'> & Thing;

export function mapPlate(unread: unknown): StoredPlate {
  const row = plateRow.parse(unread);
  const seat = z.union([noSeat, seatRow]).parse(unread);
  const calibration = z.union([noCalibration, calibrationRow]).parse(unread);
  return {
    id: row.id,
    labId: row.lab_id,
    ...mapPlateColumns(row),
    seat:
      seat.seat_id === null
        ? null
        : {
            id: seat.seat_id,
            mountId: seat.mount_id,
            mount: mapMountColumns(seat, seat.mount_name),
            seatedAt: seat.seated_at.toISOString(),
          },
    calibration: calibration.calibration_id === null ? null : mapCalibration(calibration),
    benches: row.benches,
    revision: row.revision,
  };
}

/** What the API shows of a plate on a day. */
export function asCabinetPlate(
  { labId: _labId, ...plate }: StoredPlate,
  lab: Pick<Lab, 'calibrationDueDays'>,
  now: Date,
): CabinetPlate {
  const facts = {
    retired: plate.retiredAt !== null,
    seated: plate.seat !== null,
    measuredAt: plate.calibration?.measuredAt ?? null,
    hasOpenQuestion: plate.calibration !== null && plate.calibration.openQuestions.length > 0,
  };
  return { ...plate, health: plateHealth(facts, lab.calibrationDueDays, now) };
}

/** The plate as a bench and a solver take it, or null while it cannot be dialled. */
export function asReadyPlate(stored: StoredPlate): Plate | null {
  if (stored.seat === null || stored.calibration === null) return null;
  return {
    id: stored.id,
    name: stored.name,
    kind: stored.kind,
    designWavelengthNm: stored.designWavelengthNm,
    construction: stored.construction,
    material: stored.material,
    order: stored.order,
    note: stored.note,
    mount: stored.seat.mount,
    seatedAt: stored.seat.seatedAt,
    calibration: stored.calibration,
    retiredAt: stored.retiredAt,
    benches: stored.benches,
    revision: stored.revision,
  };
}
