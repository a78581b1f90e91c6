import type { Stokes } from '../../shared/optics/stokes';

const SAME_STATE = 1e-6;

/** Whether two states are drawn at one place whatever the magnification. */
export function sameState(one: Stokes, other: Stokes): boolean {
  return Math.hypot(one[0] - other[0], one[1] - other[1], one[2] - other[2]) < SAME_STATE;
}
