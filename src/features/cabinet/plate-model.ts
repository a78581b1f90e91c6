import { compareWithModel, NOMINAL_DEG } from '../../../shared/optics/dispersion';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import type { Calibration } from '../../../shared/schemas/calibrations';
import { materialNames } from './plate-words';

type ModelPlate = Pick<CabinetPlate, 'kind' | 'construction' | 'material' | 'order' | 'designWavelengthNm'>;

/** A measured retardance beside what the material's published dispersion gives for the same wavelength and temperature. */
export interface BesideModel {
  readonly material: string;
  readonly modelledDeg: number;
  /** Measured − modelled. */
  readonly deviationDeg: number;
  /** |deviation| in σ of the measurement; null where its σ is 0. */
  readonly sigmas: number | null;
}

/** From here on a plate is worth a look: chance alone hardly puts a measurement so far off. */
export const farInSigmas = 5;

/** Null where there is no model: another kind of plate, or a construction or material that nobody knows. */
export function besideModel(
  plate: ModelPlate,
  calibration: Pick<Calibration, 'retardanceDeg' | 'retardanceSigmaDeg' | 'wavelengthNm' | 'temperatureC'>,
): BesideModel | null {
  if (plate.kind === 'other' || plate.material === null) return null;
  const compared = compareWithModel(plate, plate.designWavelengthNm, NOMINAL_DEG[plate.kind], calibration);
  if (compared === null) return null;
  const { modelledDeg, deviationDeg } = compared;
  const { retardanceSigmaDeg } = calibration;
  return {
    material: materialNames[plate.material] ?? plate.material,
    modelledDeg,
    deviationDeg,
    sigmas: retardanceSigmaDeg === 0 ? null : Math.abs(deviationDeg) / retardanceSigmaDeg,
  };
}

/** "2.9° below quartz, 7σ: is it tilted?" */
export function besideModelWords({ material, deviationDeg, sigmas }: BesideModel): string {
  const size = Math.abs(deviationDeg).toFixed(1);
  const where =
    size === '0.0' ? `as ${material} has it` : `${size}° ${deviationDeg < 0 ? 'below' : 'above'} ${material}`;
  if (sigmas === null) return where;
  const words = `${where}, ${sigmas < 3 ? sigmas.toFixed(1) : sigmas.toFixed(0)}σ`;
  return sigmas >= farInSigmas ? `${words}: is it tilted?` : words;
}
