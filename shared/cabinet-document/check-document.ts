import { clockSlackMs, later, measuringFault, utcWords } from '../moments';
import {
  type CabinetDocument,
  calibrationsOf,
  type DocumentPlate,
  type DocumentRef,
  type DocumentSeatHead,
  refKey,
} from './document';
import type { PartPath } from './faults';
import type { Report } from './read-parts';

/** Reports what no single part shows: names twice, seats at one time, calibrations outside their seats, times to come. */
export function checkDocument(document: CabinetDocument, now: Date, report: Report): void {
  const latest = later(now.toISOString(), clockSlackMs);
  const seatsOfMount = new Map<string, PlacedSeat[]>();
  checkNames(document.mounts, 'mounts', 'mount', report);
  checkNames(document.plates, 'plates', 'plate', report);
  for (const [index, mount] of document.mounts.entries()) {
    checkPast(mount.retiredAt, latest, ['mounts', index, 'retiredAt'], report);
    seatsOfMount.set(refKey(mount), []);
  }
  for (const [index, plate] of document.plates.entries()) {
    const path = ['plates', index];
    checkPast(plate.retiredAt, latest, [...path, 'retiredAt'], report);
    const seats = plate.seats.map((seat, place) => ({ plate, seat, path: [...path, 'seats', place] }));
    for (const placed of seats) {
      checkSeatTimes(placed, latest, report);
      const inMount = seatsOfMount.get(refKey(placed.seat.mount));
      if (inMount !== undefined) inMount.push(placed);
      else
        report(
          [...placed.path, 'mount', 'name'],
          `There is no mount ${placed.seat.mount.name} in this file.`,
        );
    }
    checkOneAtATime(seats, 'sits in two mounts at one time', report);
    checkCalibrationTimes(plate, path, now, report);
    checkSettled(plate, path, report);
  }
  for (const seats of seatsOfMount.values()) checkOneAtATime(seats, 'holds two plates at one time', report);
}

interface PlacedSeat {
  readonly plate: DocumentPlate;
  readonly seat: DocumentPlate['seats'][number];
  readonly path: PartPath;
}

function checkNames(parts: readonly DocumentRef[], list: string, what: string, report: Report): void {
  const seen = new Set<string>();
  for (const [index, part] of parts.entries()) {
    const key = refKey(part);
    if (seen.has(key)) {
      const when = part.retiredAt === null ? 'in use' : 'retired at that moment';
      report(
        [list, index, 'name'],
        `There are two ${what}s called ${part.name}, both ${when}. Rename one of them.`,
      );
    }
    seen.add(key);
  }
}

const futureWords = (moment: string): string => `${moment} is in the future. Write when it was.`;

function checkPast(moment: string | null, latest: string, path: PartPath, report: Report): void {
  if (moment !== null && moment > latest) report(path, futureWords(moment));
}

function checkSeatTimes({ seat, path }: PlacedSeat, latest: string, report: Report): void {
  checkPast(seat.seatedAt, latest, [...path, 'seatedAt'], report);
  checkPast(seat.leftAt, latest, [...path, 'leftAt'], report);
  if (seat.leftAt === null && seat.mount.retiredAt !== null) {
    report(
      [...path, 'leftAt'],
      `${seat.mount.name} is retired, so no plate sits in it now. Say when this seat ended.`,
    );
  }
}

/** From when to when, as the file itself writes it. */
function spanWords({ seatedAt, leftAt }: Pick<DocumentSeatHead, 'seatedAt' | 'leftAt'>): string {
  return leftAt === null ? `since ${seatedAt}` : `from ${seatedAt} to ${leftAt}`;
}

export function saidSpan({ seatedAt, leftAt }: Pick<DocumentSeatHead, 'seatedAt' | 'leftAt'>): string {
  return leftAt === null
    ? `since ${utcWords(seatedAt)}`
    : `from ${utcWords(seatedAt)} to ${utcWords(leftAt)}`;
}

function checkOneAtATime(seats: readonly PlacedSeat[], what: string, report: Report): void {
  let before: PlacedSeat | null = null;
  for (const placed of seats.toSorted(byTime)) {
    const { seat, plate, path } = placed;
    if (before !== null && overlaps(before.seat, seat)) {
      const subject = before.plate === plate ? plate.name : seat.mount.name;
      const [one, other] =
        before.plate === plate ? [before.seat.mount.name, seat.mount.name] : [before.plate.name, plate.name];
      report(
        [...path, 'seatedAt'],
        `${subject} ${what}: ${one} ${spanWords(before.seat)}, and ${other} ${spanWords(seat)}.`,
      );
    }
    if (before === null || endsLater(seat, before.seat)) before = placed;
  }
}

function byTime(one: PlacedSeat, other: PlacedSeat): number {
  if (one.seat.seatedAt !== other.seat.seatedAt) return one.seat.seatedAt < other.seat.seatedAt ? -1 : 1;
  return endsLater(one.seat, other.seat) ? 1 : -1;
}

function endsLater(one: DocumentSeatHead, other: DocumentSeatHead): boolean {
  if (other.leftAt === null) return false;
  return one.leftAt === null || one.leftAt >= other.leftAt;
}

/** Of two seats, the earlier first. One that ends when the next begins is well; two that begin together in one mount are not. */
function overlaps(earlier: DocumentSeatHead, seat: DocumentSeatHead): boolean {
  if (earlier.leftAt === null || earlier.leftAt > seat.seatedAt) return true;
  return earlier.seatedAt === seat.seatedAt && refKey(earlier.mount) === refKey(seat.mount);
}

/** What was measured in a seat was measured after it began and before it ended. */
function checkCalibrationTimes(plate: DocumentPlate, path: PartPath, now: Date, report: Report): void {
  for (const [place, seat] of plate.seats.entries()) {
    for (const [nth, { measuredAt }] of seat.calibrations.entries()) {
      const at = [...path, 'seats', place, 'calibrations', nth, 'measuredAt'];
      const fault = measuringFault(measuredAt, seat.seatedAt, now);
      if (fault === 'future') report(at, futureWords(measuredAt));
      if (fault === 'before-seat') {
        report(at, `This was measured before the seat in ${seat.mount.name} began at ${seat.seatedAt}.`);
      }
      if (seat.leftAt !== null && measuredAt > later(seat.leftAt, clockSlackMs)) {
        report(at, `This was measured after the seat in ${seat.mount.name} ended at ${seat.leftAt}.`);
      }
    }
  }
}

function checkSettled(plate: DocumentPlate, path: PartPath, report: Report): void {
  const all = calibrationsOf(plate);
  let position = 0;
  for (const [place, seat] of plate.seats.entries()) {
    for (const [nth, { settles }] of seat.calibrations.entries()) {
      position += 1;
      if (settles === null) continue;
      const at = [...path, 'seats', place, 'calibrations', nth, 'settles'];
      const settled = all[settles - 1];
      if (settled === undefined) report(at, `${plate.name} has no calibration ${settles}.`);
      else if (settled.openQuestions.length === 0) {
        report(at, `Calibration ${settles} of ${plate.name} left nothing open, so nothing of it is settled.`);
      } else if (settlesItself(all, position)) {
        report(
          at,
          `Calibrations of ${plate.name} settle each other in a circle. A later one settles an earlier one.`,
        );
      }
    }
  }
}

/** Whether the way from one calibration to what it settles, and on, comes back to it. */
function settlesItself(all: readonly { readonly settles: number | null }[], start: number): boolean {
  let at = all[start - 1]?.settles ?? null;
  for (let step = 0; at !== null && step < all.length; step += 1) {
    if (at === start) return true;
    at = all[at - 1]?.settles ?? null;
  }
  return false;
}
