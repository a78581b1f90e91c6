import type { DispersionFormula, Material, MaterialId, Ray } from './material';
import { materialOf } from './materials';

const UM_PER_NM = 1e-3;

/** A wavelength at which a formula was never fitted. */
export class WavelengthRangeError extends RangeError {
  constructor(
    readonly material: MaterialId,
    readonly wavelengthNm: number,
    message: string,
  ) {
    super(message);
    this.name = 'WavelengthRangeError';
  }
}

/** Why this material has no index at this wavelength, with its range; `null` where it has one. */
export function outOfRange({ name, shortestNm, longestNm }: Material, wavelengthNm: number): string | null {
  // Written so that NaN is out of range too.
  if (wavelengthNm >= shortestNm && wavelengthNm <= longestNm) return null;
  return `${name} holds from ${shortestNm} to ${longestNm} nm, and ${wavelengthNm} nm is outside`;
}

/** @throws WavelengthRangeError outside the range of the material's formula. */
export function requireInRange(material: Material, wavelengthNm: number): void {
  const message = outOfRange(material, wavelengthNm);
  if (message !== null) throw new WavelengthRangeError(material.id, wavelengthNm, message);
}

/** A dispersion formula and its exact derivative by wavelength. */
export interface Dispersion {
  readonly value: number;
  readonly slopePerNm: number;
}

/** constant + Σ B λ²/(λ² − p) and Σ −2 B λ p/(λ² − p)². */
export function evaluateFormula(
  { constant, resonances }: DispersionFormula,
  wavelengthNm: number,
): Dispersion {
  const um = wavelengthNm * UM_PER_NM;
  const squared = um * um;
  let value = constant;
  let slopePerUm = 0;
  for (const { strength, poleSquaredUm2 } of resonances) {
    const distance = squared - poleSquaredUm2;
    value += (strength * squared) / distance;
    slopePerUm -= (2 * strength * um * poleSquaredUm2) / (distance * distance);
  }
  return { value, slopePerNm: slopePerUm * UM_PER_NM };
}

/** The index of one ray and dn/dλ, λ in vacuum or air as its paper has it. @throws WavelengthRangeError */
export function indexDispersion(id: MaterialId, ray: Ray, wavelengthNm: number): Dispersion {
  const material = materialOf(id);
  requireInRange(material, wavelengthNm);
  const squared = evaluateFormula(ray === 'o' ? material.ordinary : material.extraordinary, wavelengthNm);
  const index = Math.sqrt(squared.value);
  return { value: index, slopePerNm: squared.slopePerNm / (2 * index) };
}

/** The refractive index of the ordinary or extraordinary ray. @throws WavelengthRangeError outside the formula's range. */
export function refractiveIndex(material: MaterialId, ray: Ray, wavelengthNm: number): number {
  return indexDispersion(material, ray, wavelengthNm).value;
}
