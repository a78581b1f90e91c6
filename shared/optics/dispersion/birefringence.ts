import type { MaterialId } from './material';
import { materialOf } from './materials';
import { type Dispersion, evaluateFormula, indexDispersion, requireInRange } from './refractive-index';

/** Δn = n_e − n_o and its exact slope; negative for calcite and sapphire. @throws WavelengthRangeError */
export function birefringenceDispersion(material: MaterialId, wavelengthNm: number): Dispersion {
  const extraordinary = indexDispersion(material, 'e', wavelengthNm);
  const ordinary = indexDispersion(material, 'o', wavelengthNm);
  return {
    value: extraordinary.value - ordinary.value,
    slopePerNm: extraordinary.slopePerNm - ordinary.slopePerNm,
  };
}

/** n_e − n_o: positive where the extraordinary ray is the slow one. @throws WavelengthRangeError */
export function birefringence(material: MaterialId, wavelengthNm: number): number {
  return birefringenceDispersion(material, wavelengthNm).value;
}

/** Δn by the paper's own fit of the difference, or `null` where it has none. @throws WavelengthRangeError */
export function fittedBirefringence(id: MaterialId, wavelengthNm: number): number | null {
  const material = materialOf(id);
  requireInRange(material, wavelengthNm);
  if (material.fittedBirefringence === null) return null;
  return evaluateFormula(material.fittedBirefringence, wavelengthNm).value;
}
