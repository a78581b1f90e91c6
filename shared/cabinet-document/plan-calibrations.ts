import { clockSlackMs, later, utcWords } from '../moments';
import { calibrationsOf, type DocumentCalibration } from './document';
import type { ImportChange, ImportRefusal } from './import-plan';
import type { PlannedPlate, PlannedSeat } from './plan-seats';

type Added = Extract<ImportChange, { kind: 'calibration-added' }>;

/** What became of a calibration of the file: one that is stored here, one to add, or none. */
type Settled = Added['settles'];

interface Planned {
  readonly changes: readonly Added[];
  readonly refused: readonly ImportRefusal[];
  readonly unchanged: number;
}

/** Finds each calibration of a plate among the stored ones of its seat, of which none is ever changed, or adds it. */
export function planCalibrations(plate: PlannedPlate): Planned {
  const refused: ImportRefusal[] = [];
  const refuse = (reason: string): void => {
    refused.push({ what: 'calibration', name: plate.wanted.name, reason });
  };
  const stored = new Map(
    (plate.known === null ? [] : calibrationsOf(plate.known)).map((one, index) => [one, index + 1]),
  );
  // By position in the file: where each one is now. One that is not taken is absent.
  const places = new Map<number, NonNullable<Settled>>();
  const added: {
    readonly seat: PlannedSeat;
    readonly position: number;
    readonly calibration: DocumentCalibration;
  }[] = [];
  let position = 0;
  let unchanged = 0;
  for (const seat of plate.seats) {
    const left = byMoment(seat.known?.calibrations ?? []);
    if (seat.state === 'refused') {
      position += seat.wanted.calibrations.length;
      const count = seat.wanted.calibrations.length;
      const [fall, whose] = count === 1 ? ['calibration falls', 'its'] : ['calibrations fall', 'their'];
      if (count > 0) {
        refuse(
          `${count} of the file’s ${fall} with ${whose} seat of ${plate.wanted.name} in ${seat.wanted.mount.name}.`,
        );
      }
      continue;
    }
    for (const calibration of seat.wanted.calibrations) {
      position += 1;
      const sameMoment = left.get(calibration.measuredAt);
      const found = sameMoment?.findIndex((one) => sameMeasurement(one, calibration)) ?? -1;
      const [same] = found === -1 ? [] : (sameMoment?.splice(found, 1) ?? []);
      const storedAt = same === undefined ? undefined : stored.get(same);
      if (storedAt !== undefined) {
        unchanged += 1;
        places.set(position, { isStored: true, position: storedAt });
        continue;
      }
      const against = againstAdding(seat, calibration, plate.wanted.name, sameMoment !== undefined);
      if (against === null) {
        places.set(position, { isStored: false, position });
        added.push({ seat, position, calibration });
      } else refuse(against);
    }
  }
  const falls = fallsWith(calibrationsOf(plate.wanted), places);
  const changes: Added[] = [];
  for (const { seat, position: place, calibration } of added) {
    const { settles, ...rest } = calibration;
    if (falls(place)) {
      refuse(
        `${said(calibration, plate.wanted.name)} settles one that is not taken, so it is not taken either.`,
      );
      continue;
    }
    changes.push({
      kind: 'calibration-added',
      plate: plate.ref,
      seat: seat.ref,
      position: place,
      calibration: rest,
      settles: settles === null ? null : (places.get(settles) ?? null),
    });
  }
  return { changes, refused, unchanged };
}

/** Whether the way from a calibration to what it settles, and on, comes to one that is not taken. */
function fallsWith(
  all: readonly DocumentCalibration[],
  places: ReadonlyMap<number, NonNullable<Settled>>,
): (position: number) => boolean {
  const known = new Map<number, boolean>();
  return (start) => {
    const way: number[] = [];
    let at: number | null = start;
    let falls = false;
    while (at !== null) {
      const before = known.get(at);
      const place = places.get(at);
      falls = before ?? place === undefined;
      if (before !== undefined || place === undefined || place.isStored) break;
      way.push(at);
      at = all[at - 1]?.settles ?? null;
    }
    for (const position of way) known.set(position, falls);
    return falls;
  };
}

const said = ({ measuredAt }: DocumentCalibration, name: string): string =>
  `The calibration of ${name} of ${utcWords(measuredAt)}`;

/** Whether two are the same measurement. Who recorded it is a name, and a person may have changed theirs. */
function sameMeasurement(one: DocumentCalibration, other: DocumentCalibration): boolean {
  return (
    one.measuredAt === other.measuredAt &&
    one.wavelengthNm === other.wavelengthNm &&
    one.temperatureC === other.temperatureC &&
    one.retardanceDeg === other.retardanceDeg &&
    one.retardanceSigmaDeg === other.retardanceSigmaDeg &&
    one.offsetDeg === other.offsetDeg &&
    one.offsetSigmaDeg === other.offsetSigmaDeg &&
    one.method === other.method &&
    one.note === other.note &&
    one.openQuestions.join(' ') === other.openQuestions.join(' ')
  );
}

function byMoment(calibrations: readonly DocumentCalibration[]): Map<string, DocumentCalibration[]> {
  const moments = new Map<string, DocumentCalibration[]>();
  for (const calibration of calibrations) {
    const others = moments.get(calibration.measuredAt);
    if (others === undefined) moments.set(calibration.measuredAt, [calibration]);
    else others.push(calibration);
  }
  return moments;
}

function againstAdding(
  seat: PlannedSeat,
  calibration: DocumentCalibration,
  name: string,
  isMomentTaken: boolean,
): string | null {
  const { known } = seat;
  const what = said(calibration, name);
  if (isMomentTaken) {
    return `${what} differs from the one of that moment here. What was measured is never changed: record a new one.`;
  }
  if (known !== null && known.leftAt !== null && calibration.measuredAt > later(known.leftAt, clockSlackMs)) {
    return `${what} was measured after the seat in ${known.mount.name} ended here, at ${utcWords(known.leftAt)}.`;
  }
  return null;
}
