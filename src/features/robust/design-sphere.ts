import {
  blochToStokes,
  type Convention,
  type NamedState,
  namedStateStokes,
  rotate,
  stokesToBloch,
  toDegrees,
  radians,
} from '../../../shared/optics';
import type { SphereInput } from '../../sphere';
import type { Design } from './design';

/** The way of the light through a composite whose plates err by `error`, and where it should end. */
export function designSphere(
  { goal, plates, errorPerUnitRad, named }: Design,
  error: number,
  followed: NamedState,
  convention: Convention,
): SphereInput {
  const start = goal.kind === 'prepare' ? goal.input : namedStateStokes(followed, convention);
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
