/** Ordinary or extraordinary ray of a uniaxial crystal. */
export type Ray = 'o' | 'e';

export const MATERIAL_IDS = [
  'quartz',
  'quartz-radhakrishnan',
  'magnesium-fluoride',
  'calcite',
  'calcite-handbook',
  'sapphire',
] as const;

/** The crystal and the paper whose formula stands for it: two papers on one crystal are two materials. */
export type MaterialId = (typeof MATERIAL_IDS)[number];

/** One resonance, adding strength · λ² / (λ² − poleSquaredUm2), λ in µm. */
export interface Resonance {
  readonly strength: number;
  readonly poleSquaredUm2: number;
}

/** constant + Σ resonances: n² of one ray, or Δn itself where a paper fits the difference. */
export interface DispersionFormula {
  readonly constant: number;
  readonly resonances: readonly Resonance[];
}

/** The share of the whole retardance gained per kelvin, thermal expansion included: γ = (1/Γ) dΓ/dT. */
export interface TemperatureCoefficient {
  readonly perKelvin: number;
  readonly sigmaPerKelvin: number;
  readonly source: string;
}

/** A uniaxial crystal as one paper describes it. */
export interface Material {
  readonly id: MaterialId;
  readonly name: string;
  readonly crystal: string;
  readonly ordinary: DispersionFormula;
  readonly extraordinary: DispersionFormula;
  /** The paper's own fit of n_e − n_o, where it gives one: close to the difference of its two indices, not equal. */
  readonly fittedBirefringence: DispersionFormula | null;
  /** Where the formula was fitted; no index is given outside. */
  readonly shortestNm: number;
  readonly longestNm: number;
  readonly source: string;
  /** How the coefficients got here: read in a public copy, or recalled and supported by their values only. */
  readonly checked: 'read' | 'from memory';
  /** `null` where no published coefficient of the retardance is at hand. */
  readonly temperature: TemperatureCoefficient | null;
}
