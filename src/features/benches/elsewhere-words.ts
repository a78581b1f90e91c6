import type { UsedRetardance } from '../../../shared/optics/dispersion';
import { formatChange } from '../../lib/format';

const gap = '\u202f';

/** Calibrated within this is calibrated at the bench's wavelength: a lab writes 810 for 809.6. */
const sameWavelengthNm = 0.5;

export function calibratedElsewhere(
  { calibration }: { readonly calibration: { readonly wavelengthNm: number } },
  benchNm: number,
): boolean {
  return Math.abs(calibration.wavelengthNm - benchNm) > sameWavelengthNm;
}

/** Where a plate was calibrated, what it is taken to retard at this bench, and why. */
export function elsewhereSentence(
  plate: {
    readonly name: string;
    readonly calibration: { readonly wavelengthNm: number; readonly retardanceDeg: number };
  },
  used: Pick<UsedRetardance, 'source' | 'retardanceDeg' | 'shiftDeg'>,
  benchNm: number,
): string {
  const { calibration } = plate;
  const where = `${plate.name} was calibrated at ${calibration.wavelengthNm}${gap}nm`;
  const here = `${benchNm}${gap}nm`;
  if (used.source === 'model') {
    return `${where}. At ${here} it is taken as ${used.retardanceDeg.toFixed(2)}°, ${formatChange(used.shiftDeg, 2)}° by the dispersion of its material.`;
  }
  return `${where}, and this bench runs at ${here}. How it follows the wavelength is not known, so its ${calibration.retardanceDeg}° are used as measured: calibrate it at ${here}.`;
}
