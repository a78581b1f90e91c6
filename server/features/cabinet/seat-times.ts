import { clockSlackMs, measuringFault, utcWords } from '../../../shared/moments';
import type { Transaction } from '../../db/database';
import { refused } from '../../errors';
import type { StoredPlate } from './plate-rows';
import { lastSeatOf, newestDialled, newestMeasured } from './seat-store';

type StoredSeat = NonNullable<StoredPlate['seat']>;

/** @throws ProblemError 422 where a plate can't have been measured then in the seat it has. */
export function requireMeasured(
  plate: Pick<StoredPlate, 'name'>,
  seat: { readonly seatedAt: string; readonly mount: { readonly name: string } } | null,
  measured: { readonly at: string; readonly now: Date; readonly path: string },
): void {
  const { at, now, path } = measured;
  switch (measuringFault(at, seat?.seatedAt ?? null, now)) {
    case 'future':
      throw refused([{ path, message: 'This is in the future. Write when it was measured.' }]);
    case 'before-seat': {
      const where = seat === null ? '' : ` in ${seat.mount.name} since ${utcWords(seat.seatedAt)}`;
      const message = `${plate.name} sits${where}, and this is before that: its zero was another one. Write when it was measured in this seat.`;
      throw refused([{ path, message }]);
    }
    case null:
      return;
  }
}

/** What a person says of when something was done; null is now. */
interface Done {
  readonly at: string | null;
  readonly now: Date;
  readonly path: string;
  /** "it was seated". */
  readonly what: string;
}

/** A moment that must have come before. */
interface Bound {
  readonly moment: Date | null;
  readonly because: (moment: string) => string;
}

/**
 * When something was done, not before any of the bounds. Fields of dates take whole minutes: a moment a little before a
 * bound is that bound.
 * @throws ProblemError 422 where it is earlier, or in the future.
 */
function whenDone({ at, now, path, what }: Done, bounds: readonly Bound[]): Date {
  const asked = at === null ? now : new Date(at);
  if (asked.getTime() > now.getTime() + clockSlackMs) {
    throw refused([{ path, message: `This is in the future. Write when ${what}.` }]);
  }
  const said = asked > now ? now : asked;
  let moment = said;
  for (const { moment: bound, because } of bounds) {
    if (bound === null || bound <= moment) continue;
    // Held against what was said: slack of one bound on top of another's would add up.
    if (bound.getTime() - said.getTime() > clockSlackMs) {
      throw refused([{ path, message: because(utcWords(bound.toISOString())) }]);
    }
    moment = bound;
  }
  return moment;
}

/** When a seat ended: after it began, and not before what was measured or dialled in it. */
export async function whenLeft(
  transaction: Transaction,
  plate: StoredPlate,
  seat: StoredSeat,
  leaving: { readonly at: string | null; readonly now: Date },
): Promise<Date> {
  const measured = await newestMeasured(transaction, { labId: plate.labId, seatId: seat.id });
  const dialled = await newestDialled(transaction, {
    labId: plate.labId,
    plateId: plate.id,
    since: seat.seatedAt,
  });
  return whenDone({ ...leaving, path: 'at', what: 'it was taken out' }, [
    {
      // A seat lasts: two that began in one mount at one moment could not be told apart.
      moment: new Date(Date.parse(seat.seatedAt) + 1),
      because: (moment) =>
        `${plate.name} was seated in ${seat.mount.name} at ${moment}, after this. Write a later time.`,
    },
    {
      moment: measured,
      because: (moment) =>
        `${plate.name} was measured in ${seat.mount.name} at ${moment}, so it still sat there. Write a later time.`,
    },
    {
      moment: dialled?.at ?? null,
      because: (moment) =>
        `A dial of ${plate.name} was recorded in run ${dialled?.runNumber ?? ''} at ${moment}, so it still sat there. Write a later time.`,
    },
  ]);
}

/** When a seat began: not before the plate left its last one, nor before the mount was empty. */
export async function whenSeated(
  transaction: Transaction,
  seat: { readonly labId: string; readonly plateId: string; readonly mountId: string },
  seating: Pick<Done, 'at' | 'now' | 'path'>,
): Promise<Date> {
  const { labId, plateId, mountId } = seat;
  const last = [
    await lastSeatOf(transaction, labId, { plateId }),
    await lastSeatOf(transaction, labId, { mountId }),
  ];
  return whenDone(
    { ...seating, what: 'it was seated' },
    last.map((before) => ({
      moment: before?.leftAt ?? null,
      because: (moment) =>
        `${before?.plateName ?? ''} sat in ${before?.mountName ?? ''} until ${moment}. Write a later time.`,
    })),
  );
}
