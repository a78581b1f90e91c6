import { openQuestions } from '../schemas';
import {
  type CabinetDocument,
  calibrationsOf,
  type DocumentPlate,
  type DocumentRef,
  type DocumentSeat,
  sameName,
} from './document';

/**
 * The same cabinet in the one order that a document has, whatever order it was written in: by name with numbers by value,
 * what is in use before what is retired, seats and calibrations oldest first. Calibrations of one moment keep their order,
 * since the later one counts.
 */
export function inOrder(document: CabinetDocument): CabinetDocument {
  return {
    format: document.format,
    mounts: document.mounts.toSorted(byRef),
    plates: document.plates.toSorted(byRef).map(orderedPlate),
  };
}

/** H-2 before H-10, without a locale: the order must be the same on every machine. */
const sortKey = (name: string): string =>
  sameName(name).replaceAll(/\d+/gu, (digits) => digits.padStart(20, '0'));

const compare = (one: string, other: string): number => (one < other ? -1 : one > other ? 1 : 0);

function byRef(one: DocumentRef, other: DocumentRef): number {
  return (
    compare(sortKey(one.name), sortKey(other.name)) ||
    compare(one.name, other.name) ||
    compare(one.retiredAt ?? '', other.retiredAt ?? '')
  );
}

/** A seat that has not ended comes last. */
const endOf = (seat: DocumentSeat): string => seat.leftAt ?? '~';

function orderedPlate(plate: DocumentPlate): DocumentPlate {
  const seats = plate.seats
    .toSorted((one, other) => compare(one.seatedAt, other.seatedAt) || compare(endOf(one), endOf(other)))
    .map((seat) => ({
      ...seat,
      calibrations: seat.calibrations.toSorted((one, other) => compare(one.measuredAt, other.measuredAt)),
    }));
  const before = calibrationsOf(plate);
  const after = new Map(
    calibrationsOf({ ...plate, seats }).map((calibration, index) => [calibration, index + 1]),
  );
  const moved = (settles: number | null): number | null => {
    const settled = settles === null ? undefined : before[settles - 1];
    return settled === undefined ? null : (after.get(settled) ?? null);
  };
  return {
    ...plate,
    seats: seats.map((seat) => ({
      ...seat,
      calibrations: seat.calibrations.map((calibration) => ({
        ...calibration,
        openQuestions: openQuestions.filter((question) => calibration.openQuestions.includes(question)),
        settles: moved(calibration.settles),
      })),
    })),
  };
}
