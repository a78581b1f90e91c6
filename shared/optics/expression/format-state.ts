import { type Convention, letterOf, showEllipse } from '../convention';
import type { JonesVector } from '../jones';
import { infidelityBetween, jonesToStokes, type Stokes } from '../stokes';
import { type Radians, toDegrees } from '../units';

const NAMED: readonly (readonly [name: string, stokes: Stokes])[] = [
  ['H', [1, 0, 0]],
  ['V', [-1, 0, 0]],
  ['D', [0, 1, 0]],
  ['A', [0, -1, 0]],
];

// 1 − F below which a state is called by its name: 1e-12 rad on the sphere.
const SAME_STATE = 2.5e-25;

/**
 * A state as a short expression in the lab's convention: its name, linear(…) or ellipse(…) in degrees.
 * Reads back to the same state within 1e-12 rad on the sphere. @throws RangeError for the zero vector.
 */
export function formatState(jones: JonesVector, convention: Convention): string {
  const stokes = jonesToStokes(jones);
  const named = NAMED.find(([, state]) => infidelityBetween(state, stokes) < SAME_STATE);
  if (named !== undefined) return named[0];
  const letter = letterOf(stokes, convention);
  if (letter !== null && infidelityBetween([0, 0, Math.sign(stokes[2])], stokes) < SAME_STATE) return letter;
  const { azimuthRad, shownEllipticityRad } = showEllipse(stokes, convention);
  if (Math.abs(stokes[2]) < 1e-13) return `linear(${inDegrees(azimuthRad)})`;
  return `ellipse(${inDegrees(azimuthRad)}, ${inDegrees(shownEllipticityRad)})`;
}

function inDegrees(angleRad: Radians): string {
  // 13 decimals of a degree are 2e-15 rad; adding 0 turns −0 into 0.
  return `${Number(toDegrees(angleRad).toFixed(13)) + 0}deg`;
}
