import { compose, conjugate, type Quaternion } from './quaternion';
import type { Stokes } from './stokes';

/**
 * What a stack of plates is asked to do, canonical frame. prepare: take one state to another. apply: be one unitary, up to
 * its sign. Analysing a state (pass it through a polariser, block its opposite) is preparing the polariser's own state from
 * it: `analyserGoal`.
 */
export type Goal =
  | { readonly kind: 'prepare'; readonly input: Stokes; readonly target: Stokes }
  | { readonly kind: 'apply'; readonly target: Quaternion };

/** The goal of a stack before a polariser that passes `polariser`, when `state` is to pass and its opposite to be blocked. */
export function analyserGoal(state: Stokes, polariser: Stokes): Goal {
  return { kind: 'prepare', input: state, target: polariser };
}

/** sin²(ε/2) of the turn by ε between two unit quaternions, the same for q and −q; a sum of squares, so that 1e-30 still means something. */
export function unitaryShortfall(achieved: Quaternion, wanted: Quaternion): number {
  const { x, y, z } = compose(achieved, conjugate(wanted));
  return Math.min(1, x * x + y * y + z * z);
}

/** Average gate infidelity ⅔ sin²(ε/2) of the turn by ε between them (Horodecki³ 1999; Nielsen 2002). */
export function unitaryInfidelity(achieved: Quaternion, wanted: Quaternion): number {
  return (2 / 3) * unitaryShortfall(achieved, wanted);
}
