import { blochToStokes, type Convention, type Quaternion, shownS3Sign } from '../../../shared/optics';

/** A unitary as a right-handed turn of the sphere, its axis in the Stokes parameters that the lab shows. */
export interface ShownTurn {
  readonly axis: readonly [number, number, number];
  /** In [0, π]. */
  readonly angleRad: number;
}

// Below this a turn moves nothing that a page could show.
const NO_TURN = 1e-9;

/**
 * Null for the unitary that turns nothing. An axis is an axial vector: where S3 is shown with the other sign, the sphere is seen in
 * a mirror, and with F = diag(1, 1, −1) the turn R(n, α) is shown as F R(n, α) F = R(det F · F n, α) = R((−n1, −n2, n3), α).
 */
export function turnOf(unitary: Quaternion, convention: Convention): ShownTurn | null {
  const sign = unitary.w < 0 ? -1 : 1;
  const [w, x, y, z] = [sign * unitary.w, sign * unitary.x, sign * unitary.y, sign * unitary.z];
  const length = Math.hypot(x, y, z);
  if (length < NO_TURN) return null;
  const [n1, n2, n3] = blochToStokes([x / length, y / length, z / length]);
  const seen = shownS3Sign(convention);
  return { axis: [seen * n1, seen * n2, n3], angleRad: 2 * Math.atan2(length, w) };
}
