import { wrap, wrapSigned } from '../units';
import { birefringence } from './birefringence';
import {
  FULL_TURN_DEG,
  type MeasuredRetardance,
  type ModelledPlate,
  modelOf,
  retardanceAt,
  type Surroundings,
  wholeRetardanceDeg,
} from './retardance-model';

export type PlateDesign = 'half' | 'quarter' | 'other';

/** ISO 1: the temperature at which a made thing's sizes are stated; taken for plates whose maker says nothing else. */
const DESIGN_TEMPERATURE_C = 20;

const NM_PER_UM = 1e3;

export const NOMINAL_DEG: Readonly<Record<Exclude<PlateDesign, 'other'>, number>> = {
  half: 180,
  quarter: 90,
};

export interface DesignedRetardance {
  /** In [0, 360). */
  readonly retardanceDeg: number;
  /** Whole turns of the order included. */
  readonly wholeDeg: number;
  /** Of the crystal, of a compound plate the difference of its two; null where material or index is unknown. */
  readonly thicknessUm: number | null;
}

/**
 * What a half- or quarter-wave plate was made for at its design wavelength, and the thickness λ · (waves) / |Δn| that
 * does it; null for a plate of another kind, whose retardance only its maker or a calibration can tell.
 * @throws RangeError unless the order is a whole number from 0.
 */
export function designRetardance(
  plate: ModelledPlate,
  kind: PlateDesign,
  designWavelengthNm: number,
): DesignedRetardance | null {
  if (kind === 'other') return null;
  const retardanceDeg = NOMINAL_DEG[kind];
  const wholeDeg = wholeRetardanceDeg(retardanceDeg, plate.order);
  const model = modelOf(plate, [designWavelengthNm]);
  if ('reason' in model) return { retardanceDeg, wholeDeg, thicknessUm: null };
  const birefringenceThere = Math.abs(birefringence(model.material.id, designWavelengthNm));
  const waves = wholeDeg / FULL_TURN_DEG;
  return {
    retardanceDeg,
    wholeDeg,
    thicknessUm: (waves * designWavelengthNm) / birefringenceThere / NM_PER_UM,
  };
}

export type ModelledRetardance =
  | { readonly ok: true; readonly retardanceDeg: number; readonly wholeDeg: number }
  | { readonly ok: false; readonly reason: string };

/**
 * What the material says a plate should have in these surroundings when it has exactly its nominal retardance (in
 * [0, 360), `plate.order` whole waves beyond it) at its design wavelength and 20 °C. A published model, no measurement.
 * @throws RangeError unless the order is a whole number from 0.
 */
export function modelRetardance(
  plate: ModelledPlate,
  designWavelengthNm: number,
  nominalRetardanceDeg: number,
  surroundings: Surroundings,
): ModelledRetardance {
  const model = modelOf(plate, [designWavelengthNm, surroundings.wavelengthNm]);
  if ('reason' in model) return { ok: false, reason: model.reason };
  const designed = {
    retardanceDeg: nominalRetardanceDeg,
    wavelengthNm: designWavelengthNm,
    temperatureC: DESIGN_TEMPERATURE_C,
  };
  const { shiftDeg } = retardanceAt(plate, designed, surroundings);
  const wholeDeg = wholeRetardanceDeg(nominalRetardanceDeg, plate.order) + shiftDeg;
  return { ok: true, retardanceDeg: wrap(wholeDeg, FULL_TURN_DEG), wholeDeg };
}

/** A calibration beside what the material says for its surroundings. */
export interface ModelComparison {
  readonly modelledDeg: number;
  /** Measured − modelled, in (−180, 180]. */
  readonly deviationDeg: number;
  /** Whole waves beyond the zeroth that the calibrated retardance has: what `retardanceAt` wants as the order. */
  readonly orderThere: number;
}

/**
 * How far a measurement lies from the model, and which order it has: the order that a maker states holds at the design
 * wavelength, and far from it a plate passes into the next. `null` where there is no model.
 * @throws RangeError unless the order is a whole number from 0.
 */
export function compareWithModel(
  plate: ModelledPlate,
  designWavelengthNm: number,
  nominalRetardanceDeg: number,
  calibration: MeasuredRetardance,
): ModelComparison | null {
  const modelled = modelRetardance(plate, designWavelengthNm, nominalRetardanceDeg, calibration);
  if (!modelled.ok) return null;
  const turns = (modelled.wholeDeg - calibration.retardanceDeg) / FULL_TURN_DEG;
  return {
    modelledDeg: modelled.retardanceDeg,
    deviationDeg: wrapSigned(calibration.retardanceDeg - modelled.retardanceDeg, FULL_TURN_DEG),
    orderThere: Math.max(0, Math.round(turns)),
  };
}
