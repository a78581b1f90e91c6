import { clockSlackMs } from '../../../shared/clock-slack';
import type { CreatePlate, SeatPlate } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { brokenUnique } from '../../db/sql-state';
import { conflict, refused } from '../../errors';
import { insertCalibration } from './calibration-store';
import { findMountToChange, insertMount, type StoredMount } from './mount-store';
import type { StoredPlate } from './plate-rows';
import { insertPlate } from './plate-store';
import { endSeat, insertSeat, lastTakenOut } from './seat-store';

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

export function requirePast(measuredAt: string, now: Date, path: string): void {
  if (Date.parse(measuredAt) <= now.getTime() + clockSlackMs) return;
  throw refused([{ path, message: 'This is in the future. Write when it was measured.' }]);
}

/**
 * A zero that was measured before the plate was last taken out is void, whoever writes it down later. Of a first seat
 * nothing is asked: a plate may have stood in its mount for years before it came into the cabinet.
 */
export async function requireInSeat(
  transaction: Transaction,
  plate: StoredPlate,
  measuredAt: string,
): Promise<void> {
  const out = await lastTakenOut(transaction, { labId: plate.labId, plateId: plate.id });
  if (out === null || Date.parse(measuredAt) >= out.getTime() - clockSlackMs) return;
  throw refused([
    {
      path: 'measuredAt',
      message: `${plate.name} was taken out of its mount after this, so what was measured then is void. Write when it was measured in its present seat.`,
    },
  ]);
}

/** As the database keeps it, so that this answer and the next are the same text. */
export function toMilliseconds(timestamp: string): string {
  return new Date(timestamp).toISOString();
}

/** A new plate, with the mount it comes in, its seat and what was measured, as far as there is any. */
export async function addPlate(
  transaction: Transaction,
  place: CabinetPlace,
  { seat, ...plate }: CreatePlate,
  id = newId(),
): Promise<string> {
  if (seat.kind !== 'none' && seat.calibration !== null) {
    requirePast(seat.calibration.measuredAt, place.now, 'seat.calibration.measuredAt');
    requireNothingToSettle(seat.calibration.settlesId, 'seat.calibration.settlesId');
  }
  await insertPlate(transaction, place, plate, id);
  if (seat.kind === 'none') return id;
  const mountId =
    seat.kind === 'new-mount'
      ? await insertMount(transaction, place, seat.mount)
      : (await emptyMount(transaction, { labId: place.labId, mountId: seat.mountId }, 'seat.mountId')).id;
  const seatId = await insertSeat(transaction, place, { plateId: id, mountId });
  if (seat.calibration !== null) await insertCalibration(transaction, place, seatId, seat.calibration);
  return id;
}

/**
 * Puts a plate into a mount. Where it sits already, that seat ends: its zero is void from then on, even if the mount is
 * the same, since nobody puts a plate back to a tenth of a degree by eye.
 */
export async function seatPlate(
  transaction: Transaction,
  place: CabinetPlace,
  plate: StoredPlate,
  { mountId, why }: SeatPlate,
): Promise<string> {
  if (plate.retiredAt !== null) {
    throw conflict(
      'plate-retired',
      `${plate.name} is retired. Return it to the cabinet before it is seated.`,
    );
  }
  const key = { labId: place.labId, mountId };
  if (plate.seat !== null) {
    if (why === '') {
      throw refused([
        { path: 'why', message: `${plate.name} sits in ${plate.seat.mount.name}. Write why that seat ends.` },
      ]);
    }
    await endSeat(transaction, { labId: place.labId, seatId: plate.seat.id }, { at: place.now, why });
  }
  const mount = await emptyMount(transaction, key, 'mountId');
  return insertSeat(transaction, place, { plateId: plate.id, mountId: mount.id });
}

/** Ends a plate's seat, and with it the zero that was measured in it. @returns what the record says of it. */
export async function takeOutPlate(
  transaction: Transaction,
  place: Pick<CabinetPlace, 'labId' | 'now'>,
  plate: StoredPlate,
  why: string,
): Promise<{ readonly seatId: string; readonly mountId: string; readonly why: string }> {
  if (plate.seat === null) throw conflict('not-seated', `${plate.name} sits in no mount.`);
  await endSeat(transaction, { labId: place.labId, seatId: plate.seat.id }, { at: place.now, why });
  return { seatId: plate.seat.id, mountId: plate.seat.mountId, why };
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
