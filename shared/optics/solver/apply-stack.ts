import { sincos } from '../elementary';
import { compose, conjugate, type Quaternion } from '../quaternion';
import type { Radians } from '../units';
import { EXACT_INFIDELITY, halfAngle } from './distinct-settings';
import type { Setting } from './setting';
import type { CirclePoint } from './trig-quadratic';

/**
 * A plate as the cosine and sine of half its retardance, sin ≥ 0: a whole turn more changes a stack's sign only, and a
 * unitary is wanted up to its phase.
 */
export interface Half {
  readonly cos: number;
  readonly sin: number;
}

/** Plates turned so that u = 2θ of each, beam order, is the point of the circle; with sin²(ε/2) of the turn ε then left. */
export interface Candidate {
  readonly points: readonly CirclePoint[];
  readonly miss: number;
}

/** sin²(ε/2) below which a setting makes its target; the infidelity is ⅔ of it. */
export const EXACT_MISS = 1.5 * EXACT_INFIDELITY;

/** @throws RangeError for a retardance that isn't finite or beyond elementary.ts. */
export function halfOf(retardanceRad: Radians): Half {
  const { cos, sin } = sincos(retardanceRad / 2);
  return sin < 0 ? { cos: -cos, sin: -sin } : { cos, sin };
}

/**
 * J_n … J_1. With α = w + iy and β = z + ix the product of quaternions is (α₁α₂ − β₁β̄₂, α₁β₂ + β₁ᾱ₂), and a plate is
 * (C, S e^{iu}).
 */
export function stackAt(halves: readonly Half[], points: readonly CirclePoint[]): Quaternion {
  let [w, x, y, z] = [1, 0, 0, 0];
  for (let k = 0; k < halves.length; k += 1) {
    const plate = halves[k];
    const point = points[k];
    if (plate === undefined || point === undefined) throw new RangeError('an angle is needed for each plate');
    const c = plate.cos;
    const p = plate.sin * point.cos;
    const q = plate.sin * point.sin;
    const nextW = c * w - p * z - q * x;
    const nextY = c * y - q * z + p * x;
    const nextZ = c * z + p * w + q * y;
    x = c * x + q * w - p * y;
    w = nextW;
    y = nextY;
    z = nextZ;
  }
  return { w, x, y, z };
}

/** The turn from the wanted unitary to the achieved one, achieved · wanted⁻¹, with the sign that makes w ≥ 0. */
export function leftOver(
  halves: readonly Half[],
  points: readonly CirclePoint[],
  target: Quaternion,
): Quaternion {
  const turn = compose(stackAt(halves, points), conjugate(target));
  return turn.w < 0 ? { w: -turn.w, x: -turn.x, y: -turn.y, z: -turn.z } : turn;
}

/** sin²(ε/2) as a sum of squares, so that 1e-30 still means something. */
export function missOf({ x, y, z }: Quaternion): number {
  return Math.min(1, x * x + y * y + z * z);
}

export function candidateAt(
  halves: readonly Half[],
  points: readonly CirclePoint[],
  target: Quaternion,
): Candidate {
  return { points, miss: missOf(leftOver(halves, points, target)) };
}

export function pointOf(fastAxisRad: Radians): CirclePoint {
  return sincos(2 * fastAxisRad);
}

export function settingOf({ points, miss }: Candidate): Setting {
  return { fastAxesRad: points.map(halfAngle), infidelity: (2 / 3) * miss };
}

/** What a window of plates has to make when the plates before and behind it stand at the given points. */
export function targetWithin(
  target: Quaternion,
  before: readonly [readonly Half[], readonly CirclePoint[]],
  behind: readonly [readonly Half[], readonly CirclePoint[]],
): Quaternion {
  return compose(compose(conjugate(stackAt(...behind)), target), conjugate(stackAt(...before)));
}
