import {
  blochToStokes,
  circularState,
  type Convention,
  rotate,
  type Stokes,
  stokesToBloch,
  toDegrees,
  radians,
} from '../../../shared/optics';
import type { SphereInput } from '../../sphere';
import type { Design } from './design';

export const followedLights = ['H', 'V', 'D', 'A', 'R', 'L'] as const;
export type FollowedLight = (typeof followedLights)[number];

/** One of the six states, its letter by the lab's convention. */
export function lightOf(name: FollowedLight, convention: Convention): Stokes {
  switch (name) {
    case 'H':
      return [1, 0, 0];
    case 'V':
      return [-1, 0, 0];
    case 'D':
      return [0, 1, 0];
    case 'A':
      return [0, -1, 0];
    default:
      return circularState(name, convention);
  }
}

/** The way of the light through a composite whose plates err by `error`, and where it should end. */
export function designSphere(
  { goal, plates, errorPerUnitRad, named }: Design,
  error: number,
  followed: FollowedLight,
  convention: Convention,
): SphereInput {
  const start = goal.kind === 'prepare' ? goal.input : lightOf(followed, convention);
  return {
    start,
    plates: plates.map(({ fastAxisRad, retardanceRad }, k) => ({
      name: named[k]?.name ?? `plate ${k + 1}`,
      fastAxisDeg: toDegrees(fastAxisRad),
      retardanceDeg: toDegrees(radians(retardanceRad + error * (errorPerUnitRad[k] ?? 0))),
    })),
    target: {
      label: goal.kind === 'prepare' ? 'goal' : `goal of ${followed}`,
      state: goal.kind === 'prepare' ? goal.target : blochToStokes(rotate(goal.target, stokesToBloch(start))),
    },
    convention,
  };
}
