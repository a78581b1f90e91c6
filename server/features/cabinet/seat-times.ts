import { clockSlackMs } from '../../../shared/clock-slack';
import type { Transaction } from '../../db/database';
import { refused } from '../../errors';
import type { StoredPlate } from './plate-rows';
import { lastLeft, newestMeasured } from './seat-store';

type StoredSeat = NonNullable<StoredPlate['seat']>;

/** As the database keeps it, so that this answer and the next are the same text. */
export function toMilliseconds(timestamp: string): string {
  return new Date(timestamp).toISOString();
}

/** A moment as a message says it to a person of any time zone. */
const said = (moment: Date): string => `${moment.toISOString().slice(0, 16).replace('T', ' ')} UTC`;

export function requirePast(moment: string, now: Date, path: string, what = 'it was measured'): void {
  if (Date.parse(moment) <= now.getTime() + clockSlackMs) return;
  throw refused([{ path, message: `This is in the future. Write when ${what}.` }]);
}

/** What was measured before the plate was seated as it is now says nothing of its zero, whoever writes it down later. */
export function requireInSeat(plate: StoredPlate, seat: StoredSeat, measuredAt: string): void {
  const seatedAt = new Date(seat.seatedAt);
  if (Date.parse(measuredAt) >= seatedAt.getTime() - clockSlackMs) return;
  throw refused([
    {
      path: 'measuredAt',
      message: `${plate.name} sits in ${seat.mount.name} since ${said(seatedAt)}, and this is before that: its zero was another one. Write when it was measured in this seat.`,
    },
  ]);
}

/**
 * A moment that a person wrote, or now. Fields of dates take whole minutes: one a little before `bound` is `bound`.
 * @throws ProblemError 422 where it is earlier, or in the future.
 */
function momentFrom(
  written: string | null,
  now: Date,
  path: string,
  what: string,
  bounds: readonly { readonly moment: Date | null; readonly because: (moment: string) => string }[],
): Date {
  const asked = written === null ? now : new Date(written);
  if (written !== null) requirePast(written, now, path, what);
  let moment = asked > now ? now : asked;
  for (const { moment: bound, because } of bounds) {
    if (bound === null || bound <= moment) continue;
    if (bound.getTime() - moment.getTime() > clockSlackMs) {
      throw refused([{ path, message: because(said(bound)) }]);
    }
    moment = bound;
  }
  return moment;
}

/** When a seat ended: not before it began, nor before what was measured in it. */
export async function whenLeft(
  transaction: Transaction,
  plate: StoredPlate,
  seat: StoredSeat,
  leaving: { readonly at: string | null; readonly now: Date },
): Promise<Date> {
  const measured = await newestMeasured(transaction, { labId: plate.labId, seatId: seat.id });
  return momentFrom(leaving.at, leaving.now, 'at', 'it was taken out', [
    {
      moment: new Date(seat.seatedAt),
      because: (moment) =>
        `${plate.name} was seated in ${seat.mount.name} at ${moment}, after this. Write a later time.`,
    },
    {
      moment: measured,
      because: (moment) =>
        `${plate.name} was measured in ${seat.mount.name} at ${moment}, so it still sat there. Write a later time.`,
    },
  ]);
}

/** When a seat began: not before the plate left its last one, nor before the mount was empty. */
export async function whenSeated(
  transaction: Transaction,
  seat: { readonly labId: string; readonly plateId: string; readonly mountId: string },
  seating: { readonly at: string | null; readonly now: Date; readonly path: string },
): Promise<Date> {
  const { labId, plateId, mountId } = seat;
  return momentFrom(seating.at, seating.now, seating.path, 'it was seated', [
    {
      moment: await lastLeft(transaction, labId, { plateId }),
      because: (moment) => `It sat in its last mount until ${moment}, by its history. Write a later time.`,
    },
    {
      moment: await lastLeft(transaction, labId, { mountId }),
      because: (moment) => `Another plate sat in this mount until ${moment}. Write a later time.`,
    },
  ]);
}
