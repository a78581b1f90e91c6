import { type JonesVector, normaliseJones } from './jones';

/**
 * A canonical Stokes vector of unit intensity, (S1, S2, S3): H is (1, 0, 0), D is (0, 1, 0), and S3 = +1 turns
 * counter-clockwise as the receiver sees it. What a lab is shown is a `ShownStokes` (convention.ts), never this.
 */
export type Stokes = readonly [s1: number, s2: number, s3: number];

/** Bloch coordinates (x, y, z) = (S2, S3, S1), with H = |0⟩ at +z. */
export type Bloch = readonly [x: number, y: number, z: number];

export const STOKES_H: Stokes = [1, 0, 0];

/** Any length and global phase in; a unit Stokes vector out. @throws RangeError for the zero vector. */
export function jonesToStokes(jones: JonesVector): Stokes {
  const { aRe, aIm, bRe, bIm } = normaliseJones(jones);
  return [
    aRe * aRe + aIm * aIm - bRe * bRe - bIm * bIm,
    2 * (aRe * bRe + aIm * bIm),
    2 * (aRe * bIm - aIm * bRe),
  ];
}

/** The direction only is used; the global phase is fixed as in `normaliseJones`. @throws RangeError for length 0. */
export function stokesToJones(stokes: Stokes): JonesVector {
  const [s1, s2, s3] = normaliseStokes(stokes);
  // Divide by the larger amplitude: the smaller one is a difference of nearly equal numbers.
  if (s1 >= 0) {
    const a = Math.sqrt((1 + s1) / 2);
    return normaliseJones({ aRe: a, aIm: 0, bRe: s2 / (2 * a), bIm: s3 / (2 * a) });
  }
  const b = Math.sqrt((1 - s1) / 2);
  return normaliseJones({ aRe: s2 / (2 * b), aIm: -s3 / (2 * b), bRe: b, bIm: 0 });
}

/** The degree of polarisation of a unit-intensity Stokes vector. */
export function stokesLength([s1, s2, s3]: Stokes): number {
  return Math.sqrt(s1 * s1 + s2 * s2 + s3 * s3);
}

/** @throws RangeError for length 0 and for parts that aren't finite. */
export function normaliseStokes(stokes: Stokes): Stokes {
  const length = stokesLength(stokes);
  if (!(length > 0) || length === Infinity)
    throw new RangeError('a Stokes vector of length 0 has no direction');
  return [stokes[0] / length, stokes[1] / length, stokes[2] / length];
}

export function stokesToBloch([s1, s2, s3]: Stokes): Bloch {
  return [s2, s3, s1];
}

export function blochToStokes([x, y, z]: Bloch): Stokes {
  return [z, x, y];
}

/**
 * 1 − F between two pure states, |⟨t⊥|ψ⟩|² = ¼|p − t|². The difference of the vectors keeps its digits where 1 − F
 * itself would drown in the 1: values of 1e-30 still mean something.
 */
export function infidelityBetween(state: Stokes, target: Stokes): number {
  const d1 = state[0] - target[0];
  const d2 = state[1] - target[1];
  const d3 = state[2] - target[2];
  return Math.min(1, (d1 * d1 + d2 * d2 + d3 * d3) / 4);
}
