import type { Stokes } from '../stokes';

/** Tr ρ² of light of this Stokes vector (unit intensity, length at most 1): ½ for unpolarised, 1 for fully polarised. */
export function purity([s1, s2, s3]: Stokes): number {
  return (1 + s1 * s1 + s2 * s2 + s3 * s3) / 2;
}

/** ⟨t|ρ|t⟩ = (1 + S·t)/2, the fidelity of any state to a pure target of length 1. */
export function fidelityToPure(stokes: Stokes, target: Stokes): number {
  return (1 + stokes[0] * target[0] + stokes[1] * target[1] + stokes[2] * target[2]) / 2;
}
