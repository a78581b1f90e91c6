import type { CabinetPlate } from '../../../../shared/schemas/cabinet';
import { formatUncertain } from '../../../lib/format';
import { waitingBenches } from '../plate-words';

/** What a hand does with a plate: out of its mount, back into the same one, or into another. */
export type SeatMove = 'out' | 'anew' | 'other';

/** The words of one move of one plate. */
export interface MoveWords {
  readonly question: string;
  readonly verb: string;
  /** What follows, each a sentence. */
  readonly consequences: readonly string[];
  /** Said when it is done. */
  readonly done: string;
}

/** A plate that sits nowhere can only be seated. */
export function possibleMove(plate: CabinetPlate, wished: SeatMove): SeatMove {
  return plate.seat === null ? 'other' : wished;
}

export function moveWords(plate: CabinetPlate, move: SeatMove, into: string | null): MoveWords {
  const { name, seat } = plate;
  const place = into ?? 'a mount';
  const unknown = `${name}’s zero is not known in ${into ?? 'its new seat'} until it is calibrated there: by a scan, or by hand.`;
  if (seat === null) {
    return {
      question: `Seat ${name}?`,
      verb: `Seat ${name} in ${place}`,
      consequences: [unknown, ...benchWords(plate)],
      done: `${name} is seated. Its zero is not known until it is calibrated.`,
    };
  }
  const from = seat.mount.name;
  const lost = [
    zeroIsVoid(plate),
    ...benchWords(plate),
    'What was measured stays in its history. This cannot be undone.',
  ];
  switch (move) {
    case 'out':
      return {
        question: `Take ${name} out of ${from}?`,
        verb: `Take ${name} out`,
        consequences: lost,
        done: `${name} is out of ${from}. Its zero is void.`,
      };
    case 'anew':
      return {
        question: `Take ${name} out of ${from} and seat it anew?`,
        verb: `Seat ${name} anew in ${from}`,
        consequences: lost,
        done: `${name} is seated anew in ${from}. Its zero is void until it is calibrated.`,
      };
    case 'other':
      return {
        question: `Take ${name} out of ${from} and seat it elsewhere?`,
        verb: `Seat ${name} in ${place}`,
        consequences: lost,
        done: `${name} is seated. Its zero is void until it is calibrated.`,
      };
  }
}

function zeroIsVoid({ name, calibration }: CabinetPlate): string {
  if (calibration === null) return `${name} has not been calibrated in this seat, so no zero is lost.`;
  const zero = formatUncertain(calibration.offsetDeg, calibration.offsetSigmaDeg);
  return `Its zero, ${zero}°, is void from now on, and with it every dial that was solved for it: nobody puts a plate back to a tenth of a degree by eye.`;
}

function benchWords({ name, benches }: CabinetPlate): string[] {
  const wait = waitingBenches(benches);
  return wait === null ? [] : [`${wait} until ${name} is seated and calibrated.`];
}
