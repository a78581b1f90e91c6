import type { UpdatePlate } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { rowsOf } from '../../db/rows';
import { requestReliance } from '../beam-changes';
import { calibrationColumns, mapPlate, type StoredPlate } from './plate-rows';

/** Plates with their present seat and its newest calibration, as the database's own triggers keep them. */
export const plateQuery = `
  select p.id, p.lab_id, p.name, p.kind, p.design_wavelength_nm, p.construction, p.material, p.whole_waves, p.serial,
    p.clear_aperture_mm, p.coating_from_nm, p.coating_to_nm, p.damage_note, p.note, p.retired_at, p.revision,
    s.id as seat_id, s.seated_at, m.id as mount_id, m.name as mount_name, m.direction, m.resolution_deg, m.repeatability_deg,
    m.range_from_deg, m.range_to_deg, m.speed_deg_per_s, m.backlash_deg, m.approach,
    ${calibrationColumns},
    coalesce((select json_agg(json_build_object('id', b.id, 'name', b.name) order by b.name)
      from (select distinct bench_id from bench_plates bp where bp.lab_id = p.lab_id and bp.plate_id = p.id and bp.live) live
      join benches b on b.lab_id = p.lab_id and b.id = live.bench_id), '[]'::json) as benches
  from plates p
  left join seats s on s.lab_id = p.lab_id and s.id = p.seat_id
  left join mounts m on m.lab_id = s.lab_id and m.id = s.mount_id
  left join calibrations c on c.lab_id = p.lab_id and c.id = p.calibration_id
  left join users u on u.id = c.recorded_by
  where p.lab_id = ?`;

/** These plates, in no order. */
export async function findPlates(
  transaction: Transaction,
  labId: string,
  plateIds: readonly string[],
): Promise<StoredPlate[]> {
  if (plateIds.length === 0) return [];
  const found: unknown = await transaction.raw(`${plateQuery} and p.id = any(?)`, [labId, [...plateIds]]);
  return rowsOf(found).map(mapPlate);
}

/** The plates that some bench in use has in its beam, and as many of the others in use as make `atLeast`; by name. */
export async function findPlatesAtHand(
  transaction: Transaction,
  labId: string,
  atLeast: number,
): Promise<StoredPlate[]> {
  const found: unknown = await transaction.raw(
    `with beams as (select distinct plate_id from bench_plates where lab_id = ? and live),
      others as (select id from plates where lab_id = ? and retired_at is null and id not in (select plate_id from beams)
        order by name collate by_number, id limit greatest(0, ? - (select count(*) from beams)))
      ${plateQuery} and p.id in (select plate_id from beams union all select id from others)
      order by p.name collate by_number, p.id`,
    [labId, labId, atLeast, labId],
  );
  return rowsOf(found).map(mapPlate);
}

/** The plates that some bench in use has in its beam, by name. */
export function findPlatesInBeams(transaction: Transaction, labId: string): Promise<StoredPlate[]> {
  return findPlatesAtHand(transaction, labId, 0);
}

export async function findPlate(
  transaction: Transaction,
  { labId, plateId }: { readonly labId: string; readonly plateId: string },
): Promise<StoredPlate | null> {
  const [plate] = await findPlates(transaction, labId, [plateId]);
  return plate ?? null;
}

/** As `findPlate`, and nobody else changes the plate until the transaction ends. */
export async function findPlateToChange(
  transaction: Transaction,
  key: { readonly labId: string; readonly plateId: string },
): Promise<StoredPlate | null> {
  await transaction('plates').where({ lab_id: key.labId, id: key.plateId }).forUpdate().select('id');
  return findPlate(transaction, key);
}

export async function insertPlate(
  transaction: Transaction,
  place: { readonly labId: string; readonly now: Date },
  plate: UpdatePlate,
  id = newId(),
): Promise<string> {
  await transaction('plates').insert({
    id,
    lab_id: place.labId,
    ...plateColumns(plate),
    created_at: place.now,
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

/**
 * Of a plate whose seat or calibration is another now: what was opened before it is older, and what relies on it is looked
 * at anew.
 */
export async function raiseRevision(transaction: Transaction, stored: StoredPlate): Promise<void> {
  await transaction('plates')
    .where({ lab_id: stored.labId, id: stored.id })
    .update({ revision: stored.revision + 1 });
  await requestReliance(transaction, stored.labId, { plateId: stored.id });
}

/** What a plate is, as its columns hold it. */
export function plateColumns(plate: UpdatePlate) {
  return {
    name: plate.name,
    kind: plate.kind,
    design_wavelength_nm: plate.designWavelengthNm,
    construction: plate.construction,
    material: plate.material,
    whole_waves: plate.order,
    serial: plate.serial,
    clear_aperture_mm: plate.clearApertureMm,
    coating_from_nm: plate.coatingNm?.from ?? null,
    coating_to_nm: plate.coatingNm?.to ?? null,
    damage_note: plate.damageNote,
    note: plate.note,
  };
}
