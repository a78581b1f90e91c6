import type { CreatePlate, SeatPlate, TakeOut } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { brokenUnique } from '../../db/sql-state';
import { toMilliseconds } from '../../db/to-milliseconds';
import { conflict, refused } from '../../errors';
import { insertCalibration } from './calibration-store';
import { findMountToChange, insertMount, type StoredMount } from './mount-store';
import type { StoredPlate } from './plate-rows';
import { insertPlate } from './plate-store';
import { endSeat, insertSeat } from './seat-store';
import { requireMeasured, whenLeft, whenSeated } from './seat-times';

/** Where and by whom something of a cabinet is written. */
export interface CabinetPlace {
  readonly labId: string;
  readonly userId: string;
  readonly now: Date;
}

/** The indexes that keep names apart: to look first would leave a moment between. */
const named: Readonly<Record<string, { readonly what: string; readonly path: string }>> = {
  plates_one_of_a_name: { what: 'plate', path: 'name' },
  mounts_one_of_a_name: { what: 'mount', path: 'name' },
};

/** @throws ProblemError 422 at `path` where a plate or a mount in use has the name already. */
export async function namedOnce<Result>(
  names: { readonly plate?: string; readonly mount?: string },
  work: () => Promise<Result>,
  mountPath = 'name',
): Promise<Result> {
  try {
    return await work();
  } catch (error) {
    const index = named[brokenUnique(error) ?? ''];
    if (index === undefined) throw error;
    const isMount = index.what === 'mount';
    const name = isMount ? names.mount : names.plate;
    throw refused([
      {
        path: isMount ? mountPath : index.path,
        message: `There is a ${index.what} called ${name ?? 'so'} already. Choose another name.`,
      },
    ]);
  }
}

/** A new plate, with the mount it comes in, its seat and what was measured, as far as there is any. */
export async function addPlate(
  transaction: Transaction,
  place: CabinetPlace,
  { seat, ...plate }: CreatePlate,
  id = newId(),
): Promise<string> {
  if (seat.kind !== 'none' && seat.calibration !== null) {
    requireNothingToSettle(seat.calibration.settlesId, 'seat.calibration.settlesId');
  }
  await insertPlate(transaction, place, plate, id);
  if (seat.kind === 'none') return id;
  const mount =
    seat.kind === 'new-mount'
      ? { id: await insertMount(transaction, place, seat.mount), name: seat.mount.name }
      : await emptyMount(transaction, { labId: place.labId, mountId: seat.mountId }, 'seat.mountId');
  const measuredAt = seat.calibration?.measuredAt ?? null;
  if (measuredAt !== null) {
    const sits = seat.since === null ? null : { seatedAt: toMilliseconds(seat.since), mount };
    const path = 'seat.calibration.measuredAt';
    requireMeasured(plate, sits, { at: measuredAt, now: place.now, path });
  }
  const seatedAt = await whenSeated(
    transaction,
    { labId: place.labId, plateId: id, mountId: mount.id },
    // Where nobody says since when, it sat by the time that it was measured.
    seat.since === null && measuredAt !== null
      ? { at: measuredAt, now: place.now, path: 'seat.calibration.measuredAt' }
      : { at: seat.since, now: place.now, path: 'seat.since' },
  );
  const seatId = await insertSeat(transaction, place, { plateId: id, mountId: mount.id, seatedAt });
  if (seat.calibration !== null) await insertCalibration(transaction, place, seatId, seat.calibration);
  return id;
}

/** Of a seat that ended, for the record. */
interface EndedSeat {
  readonly seatId: string;
  readonly mountId: string;
  readonly leftAt: string;
  readonly why: string;
}

/** Of a seat that began, for the record, with the one that ended for it. */
interface SeatRecord {
  readonly seatId: string;
  readonly mountId: string;
  readonly seatedAt: string;
  readonly ended: EndedSeat | null;
}

/**
 * Puts a plate into a mount. Where it sits already, that seat ends: its zero is void from then on, even if the mount is
 * the same, since nobody puts a plate back to a tenth of a degree by eye.
 * @returns what the record says of it.
 */
export async function seatPlate(
  transaction: Transaction,
  place: CabinetPlace,
  plate: StoredPlate,
  { mountId, why, at }: SeatPlate,
): Promise<SeatRecord> {
  if (plate.retiredAt !== null) {
    throw conflict(
      'plate-retired',
      `${plate.name} is retired. Return it to the cabinet before it is seated.`,
    );
  }
  if (plate.seat !== null && why === '') {
    throw refused([
      { path: 'why', message: `${plate.name} sits in ${plate.seat.mount.name}. Write why that seat ends.` },
    ]);
  }
  const ended = plate.seat === null ? null : await takeOutPlate(transaction, place, plate, { why, at });
  const mount = await emptyMount(transaction, { labId: place.labId, mountId }, 'mountId');
  const seat = { plateId: plate.id, mountId: mount.id };
  const seating = { at, now: place.now, path: 'at' };
  const seatedAt = await whenSeated(transaction, { labId: place.labId, ...seat }, seating);
  const seatId = await insertSeat(transaction, place, { ...seat, seatedAt });
  return { seatId, mountId, seatedAt: seatedAt.toISOString(), ended };
}

/** Ends a plate's seat, and with it the zero that was measured in it. @returns what the record says of it. */
export async function takeOutPlate(
  transaction: Transaction,
  place: Pick<CabinetPlace, 'labId' | 'now'>,
  plate: StoredPlate,
  { why, at }: TakeOut,
): Promise<EndedSeat> {
  const { seat } = plate;
  if (seat === null) throw conflict('not-seated', `${plate.name} sits in no mount.`);
  const leftAt = await whenLeft(transaction, plate, seat, { at, now: place.now });
  await endSeat(transaction, { labId: place.labId, seatId: seat.id }, { at: leftAt, why });
  return { seatId: seat.id, mountId: seat.mountId, leftAt: leftAt.toISOString(), why };
}

/** A calibration answers an open question of one of the same seat, or none. */
export function requireNothingToSettle(settlesId: string | null, path: string): void {
  if (settlesId === null) return;
  throw refused([{ path, message: 'A first calibration answers no earlier one. Leave this out.' }]);
}

/** @throws ProblemError 422 where no plate can be put into it. */
async function emptyMount(
  transaction: Transaction,
  key: { readonly labId: string; readonly mountId: string },
  path: string,
): Promise<StoredMount> {
  const mount = await findMountToChange(transaction, key);
  if (mount === null) {
    throw refused([{ path, message: 'There is no such mount in the cabinet. Choose another.' }]);
  }
  if (mount.retiredAt !== null) {
    throw refused([
      { path, message: `${mount.name} is retired. Return it to the cabinet, or choose another.` },
    ]);
  }
  if (mount.plate !== null) {
    throw refused([
      {
        path,
        message: `${mount.plate.name} sits in ${mount.name}. Take it out first, or choose another mount.`,
      },
    ]);
  }
  return mount;
}
