import { clockSlackMs, later, utcWords } from '../moments';
import { saidSpan } from './check-document';
import {
  type CabinetDocument,
  type DocumentPlate,
  type DocumentRef,
  type DocumentSeat,
  refKey,
} from './document';

/** A plate of a file that the lab knows or is to have. */
export interface PlannedPlate {
  /** What it is called in the lab; of a new one, in the file. */
  readonly ref: DocumentRef;
  readonly wanted: DocumentPlate;
  readonly known: DocumentPlate | null;
  readonly seats: readonly PlannedSeat[];
}

export interface PlannedSeat {
  readonly wanted: DocumentSeat;
  readonly known: DocumentSeat | null;
  readonly ref: { readonly mount: DocumentRef; readonly seatedAt: string };
  state: 'known' | 'added' | 'refused';
  /** How a seat that goes on here ends by the file. */
  readonly end: { readonly leftAt: string; readonly leftWhy: string } | null;
  /** Why the seat, or its end, is not taken; null where all of it is. */
  reason: string | null;
}

const seatKey = (mount: DocumentRef, seatedAt: string): string => `${seatedAt} ${refKey(mount)}`;

/** Looks at each seat that a file gives a plate: one that both know, one that comes later, or one that can't be taken. */
export function planSeats(
  known: DocumentPlate | null,
  wanted: DocumentPlate,
  mountHere: ReadonlyMap<string, DocumentRef>,
): PlannedSeat[] {
  const here = new Map((known?.seats ?? []).map((seat) => [seatKey(seat.mount, seat.seatedAt), seat]));
  const open = known?.seats.find(({ leftAt }) => leftAt === null) ?? null;
  const seats = wanted.seats.map((seat): PlannedSeat => {
    const mount = mountHere.get(refKey(seat.mount)) ?? seat.mount;
    const ref = { mount, seatedAt: seat.seatedAt };
    const same = here.get(seatKey(mount, seat.seatedAt)) ?? null;
    if (same === null) return { wanted: seat, known: null, ref, state: 'added', end: null, reason: null };
    return { wanted: seat, known: same, ref, state: 'known', ...endOf(same, seat, wanted.name) };
  });
  const ended = seats.find(({ known: same, end }) => same === open && end !== null)?.end?.leftAt ?? null;
  const lastEnd = (known?.seats ?? []).reduce((last, { leftAt }) => {
    const end = leftAt ?? ended ?? '';
    return end > last ? end : last;
  }, '');
  for (const seat of seats) {
    if (seat.state !== 'added') continue;
    seat.reason = againstAdding(seat, wanted.name, { open: ended === null ? open : null, lastEnd });
    if (seat.reason !== null) seat.state = 'refused';
  }
  return seats;
}

function endOf(
  here: DocumentSeat,
  { leftAt, leftWhy }: DocumentSeat,
  name: string,
): Pick<PlannedSeat, 'end' | 'reason'> {
  if (here.leftAt === leftAt && here.leftWhy === leftWhy) return { end: null, reason: null };
  const seat = `The seat of ${name} in ${here.mount.name}`;
  if (here.leftAt !== null || leftAt === null || leftWhy === null) {
    const ends =
      here.leftAt === null ? 'goes on' : `ended at ${utcWords(here.leftAt)} (${here.leftWhy ?? ''})`;
    const other = leftAt === null ? 'goes on' : `ended at ${utcWords(leftAt)} (${leftWhy ?? ''})`;
    return {
      end: null,
      reason: `${seat} from ${utcWords(here.seatedAt)} ${ends} here and ${other} in the file. How a seat ended is never changed.`,
    };
  }
  const newest = here.calibrations.reduce(
    (last, { measuredAt }) => (measuredAt > last ? measuredAt : last),
    '',
  );
  if (newest > later(leftAt, clockSlackMs)) {
    return {
      end: null,
      reason: `${seat} ended at ${utcWords(leftAt)} in the file, but it was measured there at ${utcWords(newest)} here.`,
    };
  }
  return { end: { leftAt, leftWhy }, reason: null };
}

function againstAdding(
  { wanted: seat, ref }: PlannedSeat,
  name: string,
  { open, lastEnd }: { readonly open: DocumentSeat | null; readonly lastEnd: string },
): string | null {
  const what = `The seat of ${name} in ${seat.mount.name} ${saidSpan(seat)} stays out`;
  if (seat.seatedAt < lastEnd || (open !== null && seat.seatedAt < open.seatedAt)) {
    return `${what}: it is an earlier one that this lab does not have, and only later seats are added.`;
  }
  if (open !== null) {
    return `${what}: here it sits in ${open.mount.name} since ${utcWords(open.seatedAt)}, and the file does not say when that ended.`;
  }
  if (seat.leftAt === null && ref.mount.retiredAt !== null) {
    return `${what}: ${seat.mount.name} is retired here. Return it to the cabinet first.`;
  }
  return null;
}

interface Interval {
  readonly plate: string;
  readonly seatedAt: string;
  readonly leftAt: string | null;
}

/** Refuses the seats that would put two plates into one mount at one time. */
export function refuseTakenMounts(present: CabinetDocument, planned: readonly PlannedPlate[]): void {
  const ends = new Map<DocumentSeat, string>();
  for (const { known, end } of planned.flatMap(({ seats }) => seats)) {
    if (known !== null && end !== null) ends.set(known, end.leftAt);
  }
  const taken = new Map<string, Interval[]>();
  const intervalsOf = (mount: DocumentRef): Interval[] => {
    const key = refKey(mount);
    const intervals = taken.get(key) ?? [];
    taken.set(key, intervals);
    return intervals;
  };
  for (const plate of present.plates) {
    for (const seat of plate.seats) {
      const leftAt = seat.leftAt ?? ends.get(seat) ?? null;
      intervalsOf(seat.mount).push({ plate: plate.name, seatedAt: seat.seatedAt, leftAt });
    }
  }
  for (const { wanted: plate, seats } of planned) {
    for (const seat of seats) {
      if (seat.state !== 'added') continue;
      const { seatedAt, leftAt } = seat.wanted;
      const intervals = intervalsOf(seat.ref.mount);
      const other = intervals.find((interval) => meets(interval, { seatedAt, leftAt }));
      if (other === undefined) {
        intervals.push({ plate: plate.name, seatedAt, leftAt });
        continue;
      }
      seat.state = 'refused';
      seat.reason = `The seat of ${plate.name} in ${seat.wanted.mount.name} ${saidSpan(seat.wanted)} stays out: ${other.plate} sits there ${saidSpan(other)}.`;
    }
  }
}

function meets(one: Omit<Interval, 'plate'>, other: Omit<Interval, 'plate'>): boolean {
  return (
    (one.leftAt === null || one.leftAt > other.seatedAt) &&
    (other.leftAt === null || other.leftAt > one.seatedAt)
  );
}
