import { stokesToJones } from '../../shared/optics/stokes';
import type { Stokes } from '../../shared/optics/stokes';
import { formatAngle } from '../lib/format';

/** The field of a state at z = 0: E_H = h cos ωt and E_V = v cos(ωt − lag); the light's own, in any convention. */
export interface FieldParts {
  /** Amplitudes in units of the whole. */
  readonly h: number;
  readonly v: number;
  /** How far E_V follows E_H, in (−180, 180]; undefined where one of them is nothing. */
  readonly lagDeg: number | undefined;
}

/** Below this amplitude a trace is a straight line on the page. */
const NOTHING = 0.005;
/** A lag this near to 0° or 180° is a straight line's. */
const STRAIGHT_WITHIN_DEG = 0.05;

export function fieldParts(state: Stokes): FieldParts {
  // a is real and not negative, so that the phase of b is the lag itself.
  const { aRe, bRe, bIm } = stokesToJones(state);
  const v = Math.hypot(bRe, bIm);
  const lagDeg = aRe < NOTHING || v < NOTHING ? undefined : (Math.atan2(bIm, bRe) * 180) / Math.PI;
  return { h: aRe, v, lagDeg };
}

/** The two traces in words: `E_V follows E_H by 44.1°; counter-clockwise to the receiver`. */
export function fieldInWords(state: Stokes): string {
  const { h, lagDeg } = fieldParts(state);
  if (lagDeg === undefined)
    return h > 0.5 ? 'E_V is nothing: the field stays along H' : 'E_H is nothing: the field stays along V';
  const size = Math.abs(lagDeg);
  if (size < STRAIGHT_WITHIN_DEG) return 'E_V and E_H rise and fall together; the field keeps to a line';
  if (180 - size < STRAIGHT_WITHIN_DEG) return 'E_V falls as E_H rises; the field keeps to a line';
  return lagDeg > 0
    ? `E_V follows E_H by ${formatAngle(size)}; counter-clockwise to the receiver`
    : `E_V leads E_H by ${formatAngle(size)}; clockwise to the receiver`;
}
