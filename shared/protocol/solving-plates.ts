import { type DialScale } from '../optics/dial';
import { compareWithModel, NOMINAL_DEG, retardanceAt, type UsedRetardance } from '../optics/dispersion';
import type { TargetPlate } from '../optics/solve-target';
import type { Plate } from '../schemas/cabinet';
import type { Calibration } from '../schemas/calibrations';

/** What a dial's scale needs of a plate. */
export interface DialledPlate {
  readonly mount: Pick<Plate['mount'], 'direction' | 'resolutionDeg' | 'rangeDeg'>;
  readonly calibration: Pick<Calibration, 'offsetDeg'>;
}

/** What a solver needs of a plate: how it is built, its calibration and its mount. */
export interface SolvingPlate extends Pick<
  Plate,
  'kind' | 'designWavelengthNm' | 'construction' | 'material' | 'order'
> {
  readonly mount: Omit<Plate['mount'], 'name'>;
  readonly calibration: Pick<
    Calibration,
    'wavelengthNm' | 'temperatureC' | 'retardanceDeg' | 'retardanceSigmaDeg' | 'offsetDeg' | 'offsetSigmaDeg'
  >;
}

/** Where plates stand: at another wavelength or temperature than their calibration they retard differently. */
export interface PlateSurroundings {
  readonly wavelengthNm: number;
  readonly temperatureC: number | null;
}

/** How a plate's dial is engraved: its zero as calibrated, its sense, its finest step and how far it turns. */
export function dialScaleOf({ mount, calibration }: DialledPlate): DialScale {
  return {
    offsetDeg: calibration.offsetDeg,
    direction: mount.direction,
    resolutionDeg: mount.resolutionDeg,
    rangeDeg: mount.rangeDeg,
  };
}

/**
 * The retardance that a plate has at a bench, and how it came from what was measured. The order is its maker's, at the
 * wavelength that it was made for; where it was measured, it may be in the next one or the one before.
 */
export function usedRetardance(plate: SolvingPlate, surroundings: PlateSurroundings): UsedRetardance {
  return retardanceAt({ ...plate, order: orderAtCalibration(plate) }, plate.calibration, surroundings);
}

/** As stated where there is no model, or where nobody says what the plate was made to retard. */
function orderAtCalibration(plate: SolvingPlate): number {
  if (plate.kind === 'other') return plate.order;
  const nominalDeg = NOMINAL_DEG[plate.kind];
  const compared = compareWithModel(plate, plate.designWavelengthNm, nominalDeg, plate.calibration);
  return compared?.orderThere ?? plate.order;
}

/** A plate as the solver takes it, with the retardance that holds where it stands. */
export function targetPlate(
  plate: SolvingPlate,
  used: Pick<UsedRetardance, 'retardanceDeg' | 'perNmDeg' | 'perKelvinDeg'>,
): TargetPlate {
  const { mount, calibration } = plate;
  return {
    retardanceDeg: used.retardanceDeg,
    retardanceSigmaDeg: calibration.retardanceSigmaDeg,
    perNmDeg: used.perNmDeg,
    perKelvinDeg: used.perKelvinDeg,
    offsetSigmaDeg: calibration.offsetSigmaDeg,
    repeatabilityDeg: mount.repeatabilityDeg,
    scale: dialScaleOf(plate),
    motion: { speedDegPerS: mount.speedDegPerS, backlashDeg: mount.backlashDeg, approach: mount.approach },
  };
}

/** Plates as the solver takes them, in beam order. */
export function targetPlates(
  plates: readonly SolvingPlate[],
  surroundings: PlateSurroundings,
): TargetPlate[] {
  return plates.map((plate) => targetPlate(plate, usedRetardance(plate, surroundings)));
}
