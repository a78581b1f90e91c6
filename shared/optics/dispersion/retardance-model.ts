import { exp } from '../elementary';
import { wrap } from '../units';
import { birefringenceDispersion } from './birefringence';
import type { Material, MaterialId } from './material';
import { materialOf } from './materials';
import { outOfRange } from './refractive-index';

export type PlateConstruction =
  'true-zero-order' | 'compound-zero-order' | 'multi-order' | 'achromatic' | 'unknown';

export const FULL_TURN_DEG = 360;

/** What of a plate decides how its retardance follows the wavelength and the temperature. */
export interface ModelledPlate {
  readonly construction: PlateConstruction;
  readonly material: MaterialId | null;
  /** Whole waves beyond the zeroth, counted where the retardance beside it was measured (or is stated, for a nominal one). */
  readonly order: number;
}

export interface MeasuredRetardance {
  /** In [0, 360), fast axis as labelled. */
  readonly retardanceDeg: number;
  readonly wavelengthNm: number;
  readonly temperatureC: number | null;
}

export interface Surroundings {
  readonly wavelengthNm: number;
  readonly temperatureC: number | null;
}

export interface UsedRetardance {
  /** In [0, 360), as used. */
  readonly retardanceDeg: number;
  /** Used − measured, signed and not folded: a multi-order plate far off its wavelength may move by whole turns. */
  readonly shiftDeg: number;
  /**
   * `calibration`: measured where it is used. `model`: moved by dispersion or temperature. `no-model`: measured elsewhere
   * and used as it is for want of a model.
   */
  readonly source: 'calibration' | 'model' | 'no-model';
  /** d(whole retardance)/dλ at the bench; 0 without a model. */
  readonly perNmDeg: number;
  /** d(whole retardance)/dT at the bench; 0 without a published coefficient. */
  readonly perKelvinDeg: number;
  /** Why there is no model, or what it leaves out; or null. */
  readonly reason: string | null;
}

/** Without a model a calibration still counts as made here when the wavelengths lie this close. */
const SAME_WAVELENGTH_NM = 0.05;
/** Without a model a calibration still counts as made here when the temperatures lie this close. */
const SAME_TEMPERATURE_K = 1;

/** The whole retardance δ + 360° · order. @throws RangeError unless the order is a whole number from 0. */
export function wholeRetardanceDeg(retardanceDeg: number, order: number): number {
  if (!(Number.isInteger(order) && order >= 0))
    throw new RangeError(`an order is a whole number, not ${order}`);
  return retardanceDeg + FULL_TURN_DEG * order;
}

type MaterialOrReason = { readonly material: Material } | { readonly reason: string };

/** The crystal that the whole retardance follows at all these wavelengths, or why there is none. */
export function modelOf(plate: ModelledPlate, wavelengthsNm: readonly number[]): MaterialOrReason {
  switch (plate.construction) {
    case 'achromatic':
      return { reason: 'an achromatic plate follows no single material, only what is measured' };
    case 'unknown':
      return { reason: 'the construction of the plate is not known' };
    // Two crossed plates of one crystal (compound) act as one of their difference in thickness, so by the same law.
    case 'true-zero-order':
    case 'compound-zero-order':
    case 'multi-order':
  }
  if (plate.material === null) return { reason: 'the material of the plate is not known' };
  const material = materialOf(plate.material);
  for (const wavelengthNm of wavelengthsNm) {
    const reason = outOfRange(material, wavelengthNm);
    if (reason !== null) return { reason };
  }
  return { material };
}

function temperatureStepK(calibration: MeasuredRetardance, bench: Surroundings): number {
  if (calibration.temperatureC === null || bench.temperatureC === null) return 0;
  return bench.temperatureC - calibration.temperatureC;
}

function asMeasured(
  calibration: MeasuredRetardance,
  bench: Surroundings,
  reason: string | null,
): UsedRetardance {
  const here =
    Math.abs(bench.wavelengthNm - calibration.wavelengthNm) <= SAME_WAVELENGTH_NM &&
    Math.abs(temperatureStepK(calibration, bench)) <= SAME_TEMPERATURE_K;
  return {
    retardanceDeg: wrap(calibration.retardanceDeg, FULL_TURN_DEG),
    shiftDeg: 0,
    source: here ? 'calibration' : 'no-model',
    perNmDeg: 0,
    perKelvinDeg: 0,
    reason,
  };
}

/**
 * The retardance of a plate at the bench, from what was measured at the calibration's wavelength and temperature:
 * whole(λ', T') = whole(λ, T) · [Δn(λ')/λ'] / [Δn(λ)/λ] · exp(γ (T' − T)).
 *
 * The exponential is exact for a constant γ = (1/Γ) dΓ/dT, which is what Etzel, Rose and Wang (2000) measured, expansion
 * included (24 to 80 °C, 633 to 1539 nm; carried beyond those here). A temperature that either side doesn't tell is taken
 * as unchanged. A model moves the value however small the step is: the tolerances are for plates without one.
 * @throws RangeError unless the order is a whole number from 0.
 */
export function retardanceAt(
  plate: ModelledPlate,
  calibration: MeasuredRetardance,
  bench: Surroundings,
): UsedRetardance {
  const measuredDeg = wholeRetardanceDeg(calibration.retardanceDeg, plate.order);
  const model = modelOf(plate, [calibration.wavelengthNm, bench.wavelengthNm]);
  if ('reason' in model) return asMeasured(calibration, bench, model.reason);

  const { id, temperature, crystal } = model.material;
  const there = birefringenceDispersion(id, bench.wavelengthNm);
  const stepK = temperatureStepK(calibration, bench);
  const warmth = temperature === null || stepK === 0 ? 1 : exp(temperature.perKelvin * stepK);
  // Not 1 up to rounding: a calibration made here must come through in its own bits.
  const dispersion =
    bench.wavelengthNm === calibration.wavelengthNm
      ? 1
      : (there.value * calibration.wavelengthNm) /
        (birefringenceDispersion(id, calibration.wavelengthNm).value * bench.wavelengthNm);
  const factor = dispersion * warmth;
  const wholeDeg = measuredDeg * factor;
  return {
    retardanceDeg:
      factor === 1 ? wrap(calibration.retardanceDeg, FULL_TURN_DEG) : wrap(wholeDeg, FULL_TURN_DEG),
    shiftDeg: wholeDeg - measuredDeg,
    source: factor === 1 ? 'calibration' : 'model',
    perNmDeg: wholeDeg * (there.slopePerNm / there.value - 1 / bench.wavelengthNm),
    perKelvinDeg: temperature === null ? 0 : wholeDeg * temperature.perKelvin,
    reason:
      temperature === null && stepK !== 0
        ? `no published temperature coefficient of the retardance of ${crystal} is at hand: the temperature is left out`
        : null,
  };
}
