import { wrapSigned } from '../../../../shared/optics/units';
import type { CabinetPlate, PlateDetail, SeatedCalibration } from '../../../../shared/schemas/cabinet';
import type { Seat } from '../../../../shared/schemas/mounts';
import { besideModel } from '../plate-model';

/** One seat of a plate with what was measured in it. */
export interface SeatHistory {
  readonly seat: Seat;
  /** 1 for the plate's first seat. */
  readonly position: number;
  /** Newest first. */
  readonly calibrations: readonly SeatedCalibration[];
}

/** A plate's whole history, newest seat first. */
export function seatHistories({
  seats,
  calibrations,
}: Pick<PlateDetail, 'seats' | 'calibrations'>): readonly SeatHistory[] {
  return seats.map((seat, index) => ({
    seat,
    position: seats.length - index,
    calibrations: calibrations.filter(({ seatId }) => seatId === seat.id),
  }));
}

/** A measured value at its moment; σ in the value's own unit. */
export interface HistoryPoint {
  readonly at: number;
  readonly value: number;
  readonly sigma: number;
}

/** What of a plate's history a plot draws, oldest first. Angles in degrees, moments in milliseconds. */
export interface HistoryPoints {
  readonly retardances: readonly HistoryPoint[];
  /**
   * Each zero as its change since the first of its seat, the short way round the dial; by quarter turns where one of the
   * two left fast and slow open, since either may then be the other axis's.
   */
  readonly zeros: readonly HistoryPoint[];
  /** What the material's dispersion gives where each was measured; null where there is no model. */
  readonly predicted: readonly { readonly at: number; readonly value: number }[] | null;
  /** When it was taken out and, in the same step or later, seated anew. */
  readonly moves: readonly { readonly at: number; readonly what: 'new-seat' | 'taken-out' }[];
}

export function historyPoints(
  plate: CabinetPlate,
  detail: Pick<PlateDetail, 'seats' | 'calibrations'>,
): HistoryPoints {
  const oldestFirst = detail.calibrations.toReversed();
  const firstOf = new Map<string, SeatedCalibration>();
  for (const calibration of oldestFirst) {
    if (!firstOf.has(calibration.seatId)) firstOf.set(calibration.seatId, calibration);
  }
  const at = ({ measuredAt }: SeatedCalibration) => Date.parse(measuredAt);
  const predicted = oldestFirst.flatMap((calibration) => {
    const beside = besideModel(plate, calibration);
    return beside === null ? [] : [{ at: at(calibration), value: beside.modelledDeg }];
  });
  return {
    retardances: oldestFirst.map((calibration) => ({
      at: at(calibration),
      value: calibration.retardanceDeg,
      sigma: calibration.retardanceSigmaDeg,
    })),
    zeros: oldestFirst.map((calibration) => ({
      at: at(calibration),
      value: changeSince(firstOf.get(calibration.seatId) ?? calibration, calibration),
      sigma: calibration.offsetSigmaDeg,
    })),
    predicted: predicted.length === 0 ? null : predicted,
    moves: movesOf(detail.seats),
  };
}

/** A plate is the same half a turn on, and a quarter turn on while nobody knows which axis is the fast one. */
function changeSince(first: SeatedCalibration, calibration: SeatedCalibration): number {
  const axisOpen = [first, calibration].some(({ openQuestions }) => openQuestions.includes('axis'));
  return wrapSigned(calibration.offsetDeg - first.offsetDeg, axisOpen ? 90 : 180);
}

function movesOf(seats: readonly Seat[]): HistoryPoints['moves'] {
  const [newest, ...older] = seats;
  if (newest === undefined) return [];
  // The first seat is where the history begins, no move.
  const anew = seats
    .slice(0, older.length)
    .map(({ seatedAt }) => ({ at: Date.parse(seatedAt), what: 'new-seat' as const }));
  const out = newest.leftAt === null ? [] : [{ at: Date.parse(newest.leftAt), what: 'taken-out' as const }];
  return [...anew.toReversed(), ...out];
}
