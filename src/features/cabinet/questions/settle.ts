import { wrap } from '../../../../shared/optics/units';
import type { Calibration, CalibrationInput } from '../../../../shared/schemas/calibrations';

/** What a person can settle by looking: which axis is fast, or which of two retardances it is. */
export type SettledQuestion = 'axis' | 'branch';

/** The two readings that a calibration left open, the recorded one first. */
export interface TwoReadings {
  readonly keptDeg: number;
  readonly swappedDeg: number;
}

/** In ten-thousandths: a sum of two decimals is to read as a person would write it. */
const tidy = (degrees: number): number => Math.round(degrees * 1e4) / 1e4;

export function twoReadings(calibration: Calibration, question: SettledQuestion): TwoReadings {
  return question === 'axis'
    ? { keptDeg: calibration.offsetDeg, swappedDeg: tidy(wrap(calibration.offsetDeg + 90, 360)) % 360 }
    : { keptDeg: calibration.retardanceDeg, swappedDeg: tidy(360 - calibration.retardanceDeg) };
}

/** What a person who settled a question says of it. */
export interface Settlement {
  readonly question: SettledQuestion;
  readonly reading: 'kept' | 'swapped';
  /** How it is known. */
  readonly method: string;
  readonly note: string;
}

/**
 * The calibration that answers a question: the same measurement, at the same moment, with the reading that was found to be
 * the right one. Its age does not begin anew, since nothing was measured again.
 */
export function settledCalibration(calibration: Calibration, settlement: Settlement): CalibrationInput {
  const { question, reading, method, note } = settlement;
  const { keptDeg, swappedDeg } = twoReadings(calibration, question);
  const valueDeg = reading === 'kept' ? keptDeg : swappedDeg;
  return {
    wavelengthNm: calibration.wavelengthNm,
    temperatureC: calibration.temperatureC,
    retardanceDeg: question === 'branch' ? valueDeg : calibration.retardanceDeg,
    retardanceSigmaDeg: calibration.retardanceSigmaDeg,
    offsetDeg: question === 'axis' ? valueDeg : calibration.offsetDeg,
    offsetSigmaDeg: calibration.offsetSigmaDeg,
    method,
    note,
    openQuestions: calibration.openQuestions.filter((open) => open !== question),
    settlesId: calibration.id,
    measuredAt: calibration.measuredAt,
  };
}
