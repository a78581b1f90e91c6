import { z } from 'zod';
import type { Thing } from '../../../shared/permissions';
import {
  type Calibration,
  type CalibrationInput,
  type CreatePlate,
  type Plate,
  plateConstructionSchema,
  plateKindSchema,
  plateMaterialSchema,
  type UpdatePlate,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';

const direction = z.union([z.literal(1), z.literal(-1)]);

const calibrationRow = z.object({
  calibration_id: z.string(),
  wavelength_nm: z.number(),
  temperature_c: z.number().nullable(),
  retardance_deg: z.number(),
  retardance_sigma_deg: z.number(),
  offset_deg: z.number(),
  offset_sigma_deg: z.number(),
  method: z.string(),
  calibration_note: z.string(),
  measured_at: z.date(),
  recorded_by_name: z.string(),
});

const plateRow = calibrationRow.extend({
  id: z.string(),
  lab_id: z.string(),
  name: z.string(),
  kind: plateKindSchema,
  design_wavelength_nm: z.number(),
  construction: plateConstructionSchema,
  material: plateMaterialSchema,
  whole_waves: z.number(),
  note: z.string(),
  retired_at: z.date().nullable(),
  revision: z.number(),
  seat_id: z.string(),
  seated_at: z.date(),
  mount_id: z.string(),
  mount_name: z.string(),
  direction,
  resolution_deg: z.number(),
  repeatability_deg: z.number(),
  range_from_deg: z.number().nullable(),
  range_to_deg: z.number().nullable(),
  speed_deg_per_s: z.number().nullable(),
  backlash_deg: z.number(),
  approach: z.enum(['rising', 'falling', 'either']),
  benches: z.array(z.strictObject({ id: z.string(), name: z.string() })),
});

const rowsOf = z.object({ rows: z.array(z.unknown()) });

export type StoredPlate = Plate & Thing & { readonly seatId: string; readonly mountId: string };

function mapCalibration(row: z.infer<typeof calibrationRow>): Calibration {
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
    measuredAt: row.measured_at.toISOString(),
    recordedBy: row.recorded_by_name,
  };
}

function mapRow(unread: unknown): StoredPlate {
  const row = plateRow.parse(unread);
  return {
    id: row.id,
    labId: row.lab_id,
    name: row.name,
    kind: row.kind,
    designWavelengthNm: row.design_wavelength_nm,
    construction: row.construction,
    material: row.material,
    order: row.whole_waves,
    note: row.note,
    mount: {
      name: row.mount_name,
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
    },
    seatedAt: row.seated_at.toISOString(),
    calibration: mapCalibration(row),
    retiredAt: row.retired_at?.toISOString() ?? null,
    benches: row.benches,
    revision: row.revision,
    seatId: row.seat_id,
    mountId: row.mount_id,
  };
}

/** What the API shows of a plate. */
export function asPlate(stored: StoredPlate): Plate {
  return {
    id: stored.id,
    name: stored.name,
    kind: stored.kind,
    designWavelengthNm: stored.designWavelengthNm,
    construction: stored.construction,
    material: stored.material,
    order: stored.order,
    note: stored.note,
    mount: stored.mount,
    seatedAt: stored.seatedAt,
    calibration: stored.calibration,
    retiredAt: stored.retiredAt,
    benches: stored.benches,
    revision: stored.revision,
  };
}

const calibrationColumns = `c.id as calibration_id, c.wavelength_nm, c.temperature_c, c.retardance_deg, c.retardance_sigma_deg,
  c.offset_deg, c.offset_sigma_deg, c.method, c.note as calibration_note, c.measured_at, u.name as recorded_by_name`;

const plateQuery = `
  select p.id, p.lab_id, p.name, p.kind, p.design_wavelength_nm, p.construction, p.material, p.whole_waves, p.note, p.retired_at, p.revision,
    s.id as seat_id, s.seated_at, m.id as mount_id, m.name as mount_name, m.direction, m.resolution_deg, m.repeatability_deg,
    m.range_from_deg, m.range_to_deg, m.speed_deg_per_s, m.backlash_deg, m.approach,
    ${calibrationColumns},
    coalesce((select json_agg(json_build_object('id', b.id, 'name', b.name) order by b.name)
      from bench_plates bp join benches b on b.lab_id = bp.lab_id and b.id = bp.bench_id
      where bp.lab_id = p.lab_id and bp.plate_id = p.id and bp.live), '[]'::json) as benches
  from plates p
  join seats s on s.lab_id = p.lab_id and s.plate_id = p.id and s.left_at is null
  join mounts m on m.lab_id = s.lab_id and m.id = s.mount_id
  join lateral (select * from calibrations where lab_id = s.lab_id and seat_id = s.id
    order by measured_at desc, recorded_at desc, id desc limit 1) c on true
  join users u on u.id = c.recorded_by
  where p.lab_id = ?`;

/** Every plate of a lab, those in use first, by name. */
export async function listPlates(transaction: Transaction, labId: string): Promise<StoredPlate[]> {
  const found: unknown = await transaction.raw(
    `${plateQuery} order by p.retired_at is not null, p.name, p.id`,
    [labId],
  );
  return rowsOf.parse(found).rows.map(mapRow);
}

export async function findPlate(
  transaction: Transaction,
  { labId, plateId }: { readonly labId: string; readonly plateId: string },
): Promise<StoredPlate | null> {
  const found: unknown = await transaction.raw(`${plateQuery} and p.id = ?`, [labId, plateId]);
  const [row] = rowsOf.parse(found).rows;
  return row === undefined ? null : mapRow(row);
}

/** As `findPlate`, and nobody else changes the plate until the transaction ends. */
export async function findPlateToChange(
  transaction: Transaction,
  key: { readonly labId: string; readonly plateId: string },
): Promise<StoredPlate | null> {
  await transaction('plates').where({ lab_id: key.labId, id: key.plateId }).forUpdate().select('id');
  return findPlate(transaction, key);
}

/** What was measured of a plate in its present seat, newest first. */
export async function listCalibrations(transaction: Transaction, plate: StoredPlate): Promise<Calibration[]> {
  const found: unknown = await transaction.raw(
    `select ${calibrationColumns} from calibrations c join users u on u.id = c.recorded_by
      where c.lab_id = ? and c.seat_id = ? order by c.measured_at desc, c.recorded_at desc, c.id desc`,
    [plate.labId, plate.seatId],
  );
  return z.array(calibrationRow).parse(rowsOf.parse(found).rows).map(mapCalibration);
}

/** Inserts a plate, its mount, the seat that joins them and what was measured. */
export async function insertPlate(
  transaction: Transaction,
  place: { readonly labId: string; readonly userId: string; readonly now: Date },
  plate: CreatePlate,
  id = newId(),
): Promise<string> {
  const mountId = newId();
  const seatId = newId();
  await transaction('plates').insert({
    id,
    lab_id: place.labId,
    ...plateColumns(plate),
    created_at: place.now,
  });
  await transaction('mounts').insert({ id: mountId, lab_id: place.labId, ...mountColumns(plate.mount) });
  await transaction('seats').insert({
    id: seatId,
    lab_id: place.labId,
    plate_id: id,
    mount_id: mountId,
    seated_at: place.now,
  });
  await insertCalibration(transaction, place, seatId, plate.calibration);
  return id;
}

export async function insertCalibration(
  transaction: Transaction,
  place: { readonly labId: string; readonly userId: string; readonly now: Date },
  seatId: string,
  calibration: CalibrationInput,
): Promise<string> {
  const id = newId();
  await transaction('calibrations').insert({
    id,
    lab_id: place.labId,
    seat_id: seatId,
    wavelength_nm: calibration.wavelengthNm,
    temperature_c: calibration.temperatureC,
    retardance_deg: calibration.retardanceDeg,
    retardance_sigma_deg: calibration.retardanceSigmaDeg,
    offset_deg: calibration.offsetDeg,
    offset_sigma_deg: calibration.offsetSigmaDeg,
    method: calibration.method,
    note: calibration.note,
    measured_at: calibration.measuredAt,
    recorded_by: place.userId,
    recorded_at: place.now,
  });
  return id;
}

export async function updatePlate(
  transaction: Transaction,
  stored: StoredPlate,
  plate: UpdatePlate,
): Promise<void> {
  await transaction('plates')
    .where({ lab_id: stored.labId, id: stored.id })
    .update({ ...plateColumns(plate), revision: stored.revision + 1 });
  await transaction('mounts')
    .where({ lab_id: stored.labId, id: stored.mountId })
    .update(mountColumns(plate.mount));
}

export async function setRetired(
  transaction: Transaction,
  stored: StoredPlate,
  at: Date | null,
): Promise<void> {
  await transaction('plates')
    .where({ lab_id: stored.labId, id: stored.id })
    .update({ retired_at: at, revision: stored.revision + 1 });
}

/** A new calibration changes what the plate shows, so what was opened before it is older. */
export async function raiseRevision(transaction: Transaction, stored: StoredPlate): Promise<void> {
  await transaction('plates')
    .where({ lab_id: stored.labId, id: stored.id })
    .update({ revision: stored.revision + 1 });
}

function plateColumns(plate: UpdatePlate) {
  return {
    name: plate.name,
    kind: plate.kind,
    design_wavelength_nm: plate.designWavelengthNm,
    construction: plate.construction,
    material: plate.material,
    whole_waves: plate.order,
    note: plate.note,
  };
}

function mountColumns(mount: CreatePlate['mount']) {
  return {
    name: mount.name,
    direction: mount.direction,
    resolution_deg: mount.resolutionDeg,
    repeatability_deg: mount.repeatabilityDeg,
    range_from_deg: mount.rangeDeg?.from ?? null,
    range_to_deg: mount.rangeDeg?.to ?? null,
    speed_deg_per_s: mount.speedDegPerS,
    backlash_deg: mount.backlashDeg,
    approach: mount.approach,
  };
}
