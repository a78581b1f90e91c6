import { type Convention, namedStateStokes } from '../../../../shared/optics/convention';
import { type Quaternion, rotate } from '../../../../shared/optics/quaternion';
import { statesBehind } from '../../../../shared/optics/solve-target';
import { blochToStokes, type Stokes, stokesToBloch } from '../../../../shared/optics/stokes';
import { degrees, toRadians } from '../../../../shared/optics/units';
import type { SphereInput, SpherePlate } from '../../../sphere';
import { followedLights } from './view-store';

export { namedStateStokes as lightOf };

/** Where a unitary takes a state. */
export function imageOf(unitary: Quaternion, state: Stokes): Stokes {
  return blochToStokes(rotate(unitary, stokesToBloch(state)));
}

/** Where the six states ought to go, and where these plates take them. */
export function sixImages(
  unitary: Quaternion,
  plates: readonly SpherePlate[],
  convention: Convention,
): NonNullable<SphereInput['images']> {
  const retarders = plates.map(({ retardanceDeg, fastAxisDeg }) => ({
    retardanceRad: toRadians(degrees(retardanceDeg)),
    fastAxisRad: toRadians(degrees(fastAxisDeg)),
  }));
  return followedLights.map((label) => {
    const from = namedStateStokes(label, convention);
    return {
      label,
      from,
      wanted: imageOf(unitary, from),
      reached: statesBehind(from, retarders).at(-1) ?? from,
    };
  });
}
