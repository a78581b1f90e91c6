import type { UsedRetardance } from '../../../shared/optics/dispersion';
import { formatChange, formatUncertain, withTrueMinus } from '../../lib/format';

const gap = '\u202f';

/** Half of what a plate is known to: less than that, a shift is part of its σ. */
const tellingShareOfSigma = 0.5;
/** Without a model a lab that writes 810 for 809.6 has still calibrated here. */
const sameWavelengthNm = 0.5;

interface CalibratedPlate {
  readonly name: string;
  readonly calibration: {
    readonly wavelengthNm: number;
    readonly temperatureC: number | null;
    readonly retardanceDeg: number;
    readonly retardanceSigmaDeg: number;
  };
}

interface Here {
  readonly wavelengthNm: number;
  readonly temperatureC: number | null;
}

type Used = Pick<UsedRetardance, 'source' | 'retardanceDeg' | 'shiftDeg'>;

/** Whether a plate is used so far from its calibration that a person should know. */
export function usedElsewhere({ calibration }: CalibratedPlate, used: Used, here: Here): boolean {
  if (Math.abs(used.shiftDeg) > tellingShareOfSigma * calibration.retardanceSigmaDeg) {
    return Math.abs(used.shiftDeg) > 0.005;
  }
  return (
    used.source === 'no-model' && Math.abs(calibration.wavelengthNm - here.wavelengthNm) > sameWavelengthNm
  );
}

/** "810 nm", or "810 nm and 21 °C" where that is what differs. */
function place({ wavelengthNm, temperatureC }: Here, withTemperature: boolean): string {
  const wavelength = `${wavelengthNm}${gap}nm`;
  return withTemperature && temperatureC !== null
    ? `${wavelength} and ${withTrueMinus(String(temperatureC))}${gap}°C`
    : wavelength;
}

/** Where a plate was calibrated, what it is taken to retard at this bench, and why. */
export function elsewhereSentence({ name, calibration }: CalibratedPlate, used: Used, bench: Here): string {
  const warmer =
    calibration.temperatureC !== null &&
    bench.temperatureC !== null &&
    calibration.temperatureC !== bench.temperatureC;
  const where = `${name} was calibrated at ${place(calibration, warmer)}`;
  const here = place(bench, warmer);
  if (used.source === 'model') {
    return `${where}. At ${here} it is taken as ${used.retardanceDeg.toFixed(2)}°, ${formatChange(used.shiftDeg, 2)}° by what is published of its material.`;
  }
  return `${where}, and this bench runs at ${here}. How it follows that is not known, so its ${formatUncertain(calibration.retardanceDeg, calibration.retardanceSigmaDeg)}° are used as measured: calibrate it at ${here}.`;
}
