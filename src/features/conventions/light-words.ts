import {
  blochToStokes,
  ellipseOf,
  type Quaternion,
  radians,
  type Stokes,
  stokesLength,
  toDegrees,
} from '../../../shared/optics';
import { formatAngle } from '../../lib/format';
import { UNPOLARISED } from './written-parts';

// An ellipse flatter than this, in degrees, is said to be a line; nearer to a circle than this, a circle.
const LINE_WITHIN_DEG = 0.05;
const CIRCLE_WITHIN_DEG = 0.05;

export type Sense = 'counter-clockwise' | 'clockwise' | 'none';

/** How the field really turns, as the receiver sees it: no convention has a say in this. */
export function senseOf(stokes: Stokes): Sense {
  const chiDeg = toDegrees(ellipseOf(stokes).ellipticityRad);
  if (stokesLength(stokes) < UNPOLARISED || Math.abs(chiDeg) < LINE_WITHIN_DEG) return 'none';
  return chiDeg > 0 ? 'counter-clockwise' : 'clockwise';
}

/** A state in words that mean the same to everyone: no letter but H, V, D, A stands in them. */
export function lightInWords(stokes: Stokes): string {
  const sense = senseOf(stokes);
  const { azimuthRad, ellipticityRad } = ellipseOf(stokes);
  if (sense === 'none') return `a line at ${formatAngle(toDegrees(azimuthRad))}`;
  const turns = `${sense} for the receiver`;
  const chiDeg = Math.abs(toDegrees(ellipticityRad));
  if (45 - chiDeg < CIRCLE_WITHIN_DEG) return `a circle, ${turns}`;
  return `an ellipse at ${formatAngle(toDegrees(azimuthRad))}, ellipticity ${formatAngle(chiDeg)}, ${turns}`;
}

/** The sentence that everyone agrees on: how the field of a state goes. */
export function anchorSentence(stokes: Stokes): string {
  if (stokesLength(stokes) < UNPOLARISED) return 'This light is unpolarised: its field goes no one way.';
  const sense = senseOf(stokes);
  if (sense === 'none') {
    return `The field keeps to a line at ${formatAngle(toDegrees(ellipseOf(stokes).azimuthRad))}, counter-clockwise from H for the receiver.`;
  }
  return `The field turns ${sense} for the receiver.`;
}

/** A unitary as one plate: the state that it passes first, and by how much the opposite state falls behind. */
export interface AsPlate {
  readonly fast: Stokes;
  /** In [0, 180]. */
  readonly retardanceDeg: number;
}

// Below this a turn moves nothing that a page could show.
const NO_TURN = 1e-9;

/** Null for a unitary that leaves every state as it is. */
export function asPlate({ w, x, y, z }: Quaternion): AsPlate | null {
  const length = Math.hypot(x, y, z);
  if (length < NO_TURN) return null;
  const sign = w < 0 ? -1 : 1;
  const share = sign / length;
  return {
    fast: blochToStokes([x * share, y * share, z * share]),
    retardanceDeg: toDegrees(radians(2 * Math.atan2(length, Math.abs(w)))),
  };
}
