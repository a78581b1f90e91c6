import type { Calibration } from '../../../shared/schemas/calibrations';
import { readTypedNumber } from '../../lib/forms';
import type { CalibrationValues } from './calibration-form-values';

/** Nearer than this, in degrees, two calibrations of one plate are not worth a question. */
const farDeg = 5;
/** In σ of both together. */
const farInSigmas = 5;

const gap = '\u202f';

/** The one part of a calibration that a slip of the hand shows in, with what a person should look at again before it stands. */
export interface CalibrationDoubts {
  readonly retardance: string | null;
  readonly retardanceSigma: string | null;
  readonly offsetSigma: string | null;
}

/** What is typed beside the last calibration of the plate, if there is one. Nothing is refused: it may be as it is typed. */
export function calibrationDoubts(
  typed: Partial<CalibrationValues>,
  last: Calibration | null,
): CalibrationDoubts {
  return {
    retardance: last === null ? null : farWords(typed, last),
    retardanceSigma: zeroWords(typed.retardanceSigmaDeg, 'retardance'),
    offsetSigma: zeroWords(typed.offsetSigmaDeg, 'zero'),
  };
}

function farWords(typed: Partial<CalibrationValues>, last: Calibration): string | null {
  const retardanceDeg = readTypedNumber(typed.retardanceDeg ?? '');
  const awayDeg = Math.abs(retardanceDeg - last.retardanceDeg);
  const typedSigmaDeg = readTypedNumber(typed.retardanceSigmaDeg ?? '');
  const sigmaDeg = Math.hypot(last.retardanceSigmaDeg, Number.isFinite(typedSigmaDeg) ? typedSigmaDeg : 0);
  if (!(awayDeg > farDeg && awayDeg > farInSigmas * sigmaDeg)) return null;
  const elsewhere =
    readTypedNumber(typed.wavelengthNm ?? '') === last.wavelengthNm
      ? ''
      : `, at ${last.wavelengthNm}${gap}nm`;
  return `${last.retardanceDeg}° last time${elsewhere}: this is ${Number(awayDeg.toFixed(2))}° away.`;
}

function zeroWords(text: string | undefined, name: string): string | null {
  return readTypedNumber(text ?? '') === 0
    ? `With a σ of 0 the ${name} counts as exact: nothing of it is in the budget.`
    : null;
}
