import { sincos } from './elementary';
import type { JonesVector } from './jones';
import { compose, IDENTITY, type Quaternion } from './quaternion';
import type { Stokes } from './stokes';
import { radians, type Radians } from './units';

/** A linear retarder: the slow part falls behind by `retardanceRad`; the fast axis is counter-clockwise from H. */
export interface Retarder {
  readonly retardanceRad: Radians;
  readonly fastAxisRad: Radians;
}

/** A 2 × 2 complex matrix, rows first, each entry as [real, imaginary]. */
export type JonesMatrix = readonly [
  readonly [readonly [number, number], readonly [number, number]],
  readonly [readonly [number, number], readonly [number, number]],
];

/** (cos δ/2, sin δ/2 · (sin 2θ, 0, cos 2θ)): a right-handed turn by δ about the linear state at azimuth θ. */
export function retarderQuaternion({ retardanceRad, fastAxisRad }: Retarder): Quaternion {
  const half = sincos(retardanceRad / 2);
  const axis = sincos(2 * fastAxisRad);
  return { w: half.cos, x: half.sin * axis.sin, y: 0, z: half.sin * axis.cos };
}

/** cos(δ/2)·1 − i sin(δ/2)(cos2θ σz + sin2θ σx), determinant 1, canonical phase. */
export function retarderMatrix(plate: Retarder): JonesMatrix {
  return quaternionMatrix(retarderQuaternion(plate));
}

export function quaternionMatrix({ w, x, y, z }: Quaternion): JonesMatrix {
  return [
    [
      [w, -z],
      [-y, -x],
    ],
    [
      [y, -x],
      [w, z],
    ],
  ];
}

/** The turn of a whole stack, plates in beam order. */
export function stackQuaternion(plates: readonly Retarder[]): Quaternion {
  return plates.reduce((turn, plate) => compose(retarderQuaternion(plate), turn), IDENTITY);
}

/** A Jones vector behind a plate, phase kept. */
export function retardJones(plate: Retarder, { aRe, aIm, bRe, bIm }: JonesVector): JonesVector {
  const { w, x, z } = retarderQuaternion(plate);
  return {
    aRe: w * aRe + z * aIm + x * bIm,
    aIm: w * aIm - z * aRe - x * bRe,
    bRe: w * bRe - z * bIm + x * aIm,
    bIm: w * bIm + z * bRe - x * aRe,
  };
}

/** p cos δ + (n × p) sin δ + n (n·p)(1 − cos δ). The cyclic order (S2, S3, S1) keeps a right-handed turn right-handed. */
export function retardStokes({ retardanceRad, fastAxisRad }: Retarder, [s1, s2, s3]: Stokes): Stokes {
  const { sin: s, cos: c } = sincos(retardanceRad);
  const { sin: n2, cos: n1 } = sincos(2 * fastAxisRad);
  const along = (1 - c) * (n1 * s1 + n2 * s2);
  return [
    c * s1 + s * n2 * s3 + along * n1,
    c * s2 - s * n1 * s3 + along * n2,
    c * s3 + s * (n1 * s2 - n2 * s1),
  ];
}

/** One plate's turn on the sphere, ready to draw. */
export interface Turn {
  /** The linear state about which the sphere turns, right-handed. */
  readonly axis: Stokes;
  /** Signed angle of the turn on the sphere. */
  readonly sweepRad: Radians;
  readonly from: Stokes;
  readonly to: Stokes;
  /** From `from` to `to` inclusive, evenly along the arc. */
  readonly points: readonly Stokes[];
}

/** The way of a state through plates in beam order: the state after each, and each turn's arc. */
export interface Path {
  readonly statesAfter: readonly Stokes[];
  readonly turns: readonly Turn[];
}

/** @param stepRad the longest turn between two points of an arc. @throws RangeError unless it is above 0. */
export function path(input: Stokes, plates: readonly Retarder[], stepRad: Radians): Path {
  if (!(stepRad > 0)) throw new RangeError('the step along an arc must be above 0');
  const turns: Turn[] = [];
  let state = input;
  for (const plate of plates) {
    const steps = Math.max(1, Math.ceil(Math.abs(plate.retardanceRad) / stepRad - 1e-9));
    const from = state;
    const points = Array.from({ length: steps + 1 }, (_, k) =>
      k === 0
        ? from
        : retardStokes(
            { fastAxisRad: plate.fastAxisRad, retardanceRad: radians((plate.retardanceRad * k) / steps) },
            from,
          ),
    );
    state = retardStokes(plate, from);
    const axis = sincos(2 * plate.fastAxisRad);
    turns.push({ axis: [axis.cos, axis.sin, 0], sweepRad: plate.retardanceRad, from, to: state, points });
  }
  return { statesAfter: turns.map((turn) => turn.to), turns };
}
