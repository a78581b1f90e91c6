import { blindNearDeg } from '../../../../shared/optics/calibration';
import type { CabinetPlate } from '../../../../shared/schemas/cabinet';
import type { Calibration, OpenQuestion } from '../../../../shared/schemas/calibrations';
import { formatUncertain } from '../../../lib/format';
import { twoReadings } from './settle';

/** One open question of a plate: what it is, and what it would do. */
export interface QuestionWords {
  readonly head: string;
  readonly meaning: string;
}

const angle = (degrees: number, sigmaDeg: number): string => `${formatUncertain(degrees, sigmaDeg)}°`;

/** `sinceSeat`: nothing before this calibration was measured in the same seat. */
export function openQuestionWords(
  plate: Pick<CabinetPlate, 'kind'>,
  calibration: Calibration,
  question: OpenQuestion,
  sinceSeat: boolean,
): QuestionWords {
  const since = sinceSeat ? ' since the new seat' : '';
  const { retardanceDeg, retardanceSigmaDeg, offsetSigmaDeg } = calibration;
  const other = twoReadings(calibration, 'branch').swappedDeg;
  switch (question) {
    case 'axis': {
      const swapped = angle(twoReadings(calibration, 'axis').swappedDeg, offsetSigmaDeg);
      const effect =
        plate.kind === 'half'
          ? `it acts as ${angle(other, retardanceSigmaDeg)} about the axis that is taken for the fast one, not as ${angle(retardanceDeg, retardanceSigmaDeg)}.`
          : 'every circular state comes out with the other hand.';
      return {
        head: `Fast or slow? Not settled${since}`,
        meaning: `A scan between polarisers reads the same for both axes. If ${swapped} is the fast one, ${effect}`,
      };
    }
    case 'branch':
      return {
        head: `${angle(retardanceDeg, retardanceSigmaDeg)} or ${angle(other, retardanceSigmaDeg)}? Not settled${since}`,
        meaning:
          'Between polarisers a retardance and 360° less it read the same. If it is the other one, every circular state comes out with the other hand.',
      };
    case 'blind':
      return {
        head: `Near ${blindNearDeg(retardanceDeg)}° the retardance is hardly felt`,
        meaning: `The power changes with the square of what is missing to ${blindNearDeg(retardanceDeg)}°, so ${angle(retardanceDeg, retardanceSigmaDeg)} may be off by more than its σ says, to either side.`,
      };
  }
}
