import { type Convention, letterOf, showStokes } from '../../shared/optics/convention';
import { ellipseOf } from '../../shared/optics/ellipse';
import type { Stokes } from '../../shared/optics/stokes';
import { toDegrees } from '../../shared/optics/units';
import { formatAngle } from '../lib/format';
import { basisStates } from './scene';
import { angleBetweenDeg } from './vec';

/** A state nearer than this, in degrees of the sphere, is called by the basis state's letter. */
export const NAMED_WITHIN_DEG = 0.1;
/** An ellipse flatter than this is said to be linear. */
export const LINEAR_WITHIN_DEG = 0.05;

export interface StateWords {
  readonly text: string;
  /** Stokes parameters as the lab shows them. */
  readonly shown: readonly [number, number, number];
}

/** A state in words: `H`, `linear at −37.8°`, `ellipse at −62.6°, ellipticity 27.4°, counter-clockwise to the receiver (L)`. */
export function stateInWords(state: Stokes, convention: Convention): string {
  const named = basisStates(convention).find(
    (basis) => angleBetweenDeg(basis.state, state) < NAMED_WITHIN_DEG,
  );
  if (named !== undefined) return named.letter;
  const { azimuthRad, ellipticityRad } = ellipseOf(state);
  const azimuth = formatAngle(toDegrees(azimuthRad));
  const ellipticityDeg = toDegrees(ellipticityRad);
  if (Math.abs(ellipticityDeg) < LINEAR_WITHIN_DEG) return `linear at ${azimuth}`;
  const hand = `${ellipticityDeg > 0 ? 'counter-clockwise' : 'clockwise'} to the receiver`;
  const letter = letterOf(state, convention);
  const withLetter = letter === null ? hand : `${hand} (${letter})`;
  return `ellipse at ${azimuth}, ellipticity ${formatAngle(Math.abs(ellipticityDeg))}, ${withLetter}`;
}

/** A state with its Stokes parameters, both as the lab writes them. */
export function stateWords(state: Stokes, convention: Convention): StateWords {
  const { s1, s2, s3 } = showStokes(state, convention);
  return { text: stateInWords(state, convention), shown: [s1, s2, s3] };
}
