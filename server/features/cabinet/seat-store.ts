import { z } from 'zod';
import type { Seat } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { rowsOf } from '../../db/rows';

const seatRow = z.object({
  id: z.string(),
  plate_id: z.string(),
  plate_name: z.string(),
  mount_id: z.string(),
  mount_name: z.string(),
  seated_at: z.date(),
  seated_by_name: z.string(),
  left_at: z.date().nullable(),
  left_why: z.string().nullable(),
});

const mostShown = 500;

function mapSeat(unread: unknown): Seat {
  const row = seatRow.parse(unread);
  return {
    id: row.id,
    plate: { id: row.plate_id, name: row.plate_name },
    mount: { id: row.mount_id, name: row.mount_name },
    seatedAt: row.seated_at.toISOString(),
    seatedBy: row.seated_by_name,
    leftAt: row.left_at?.toISOString() ?? null,
    leftWhy: row.left_why,
  };
}

/** The seats of a plate, or of a mount, newest first. */
export async function listSeats(
  transaction: Transaction,
  labId: string,
  of: { readonly plateId: string } | { readonly mountId: string },
): Promise<Seat[]> {
  const column = 'plateId' in of ? 's.plate_id' : 's.mount_id';
  const id = 'plateId' in of ? of.plateId : of.mountId;
  const found: unknown = await transaction.raw(
    `select s.id, s.plate_id, p.name as plate_name, s.mount_id, m.name as mount_name, s.seated_at, u.name as seated_by_name,
        s.left_at, s.left_why
      from seats s join plates p on p.lab_id = s.lab_id and p.id = s.plate_id
      join mounts m on m.lab_id = s.lab_id and m.id = s.mount_id join users u on u.id = s.seated_by
      where s.lab_id = ? and ${column} = ? order by s.seated_at desc, s.id desc limit ${mostShown}`,
    [labId, id],
  );
  return rowsOf(found).map(mapSeat);
}

const endedRow = z.object({ left_at: z.date(), plate_name: z.string(), mount_name: z.string() });

/** The seat that a plate last left, or that last left a mount empty; null where there was none. */
export async function lastSeatOf(
  transaction: Transaction,
  labId: string,
  of: { readonly plateId: string } | { readonly mountId: string },
): Promise<{ readonly leftAt: Date; readonly plateName: string; readonly mountName: string } | null> {
  const column = 'plateId' in of ? 's.plate_id' : 's.mount_id';
  const id = 'plateId' in of ? of.plateId : of.mountId;
  const found: unknown = await transaction.raw(
    `select s.left_at, p.name as plate_name, m.name as mount_name
      from seats s join plates p on p.lab_id = s.lab_id and p.id = s.plate_id
      join mounts m on m.lab_id = s.lab_id and m.id = s.mount_id
      where s.lab_id = ? and ${column} = ? and s.left_at is not null order by s.left_at desc limit 1`,
    [labId, id],
  );
  const [row] = rowsOf(found);
  if (row === undefined) return null;
  const { left_at: leftAt, plate_name: plateName, mount_name: mountName } = endedRow.parse(row);
  return { leftAt, plateName, mountName };
}

const momentRow = z.object({ moment: z.date().nullable() });

/** When a plate was last measured in a seat; null where it never was. */
export async function newestMeasured(
  transaction: Transaction,
  key: { readonly labId: string; readonly seatId: string },
): Promise<Date | null> {
  const found: unknown = await transaction('calibrations')
    .where({ lab_id: key.labId, seat_id: key.seatId })
    .max({ moment: 'measured_at' })
    .first();
  return momentRow.parse(found).moment;
}

const dialledRow = z.object({ number: z.number(), recorded_at: z.date() });

/** The newest reading of a plate's dial since a seat of it began, and in which run; null where nobody recorded one. */
export async function newestDialled(
  transaction: Transaction,
  key: { readonly labId: string; readonly plateId: string; readonly since: string },
): Promise<{ readonly runNumber: number; readonly at: Date } | null> {
  const found: unknown = await transaction.raw(
    `select r.number, d.recorded_at from version_plates vp
      join runs r on r.lab_id = vp.lab_id and r.version_id = vp.version_id
      join readings d on d.lab_id = r.lab_id and d.run_id = r.id
      where vp.lab_id = ? and vp.plate_id = ? and d.outcome = 'done' and d.recorded_at >= ?
      order by d.recorded_at desc limit 1`,
    [key.labId, key.plateId, key.since],
  );
  const [row] = rowsOf(found);
  if (row === undefined) return null;
  const { number: runNumber, recorded_at: at } = dialledRow.parse(row);
  return { runNumber, at };
}

export async function insertSeat(
  transaction: Transaction,
  place: { readonly labId: string; readonly userId: string },
  seat: { readonly plateId: string; readonly mountId: string; readonly seatedAt: Date },
): Promise<string> {
  const id = newId();
  await transaction('seats').insert({
    id,
    lab_id: place.labId,
    plate_id: seat.plateId,
    mount_id: seat.mountId,
    seated_at: seat.seatedAt,
    seated_by: place.userId,
  });
  return id;
}

/** Ends a seat, and with it the zero that was measured in it. */
export async function endSeat(
  transaction: Transaction,
  key: { readonly labId: string; readonly seatId: string },
  end: { readonly at: Date; readonly why: string },
): Promise<void> {
  await transaction('seats')
    .where({ lab_id: key.labId, id: key.seatId })
    .update({ left_at: end.at, left_why: end.why });
}
