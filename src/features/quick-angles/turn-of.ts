import { blochToStokes, type Convention, type Quaternion, showStokes } from '../../../shared/optics';

/** A unitary as a turn of the sphere, its axis as the lab shows Stokes parameters. */
export interface ShownTurn {
  readonly axis: readonly [number, number, number];
  /** In [0, π]. */
  readonly angleRad: number;
}

// Below this a turn moves nothing that a page could show.
const NO_TURN = 1e-9;

/** Null for the unitary that turns nothing. Where S3 is shown with the other sign, the turn is still the same motion of light. */
export function turnOf(unitary: Quaternion, convention: Convention): ShownTurn | null {
  const sign = unitary.w < 0 ? -1 : 1;
  const [w, x, y, z] = [sign * unitary.w, sign * unitary.x, sign * unitary.y, sign * unitary.z];
  const length = Math.hypot(x, y, z);
  if (length < NO_TURN) return null;
  const { s1, s2, s3 } = showStokes(blochToStokes([x / length, y / length, z / length]), convention);
  return { axis: [s1, s2, s3], angleRad: 2 * Math.atan2(length, w) };
}
