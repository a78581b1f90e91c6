import type { Retarder } from '../../shared/optics/retarder';
import { degrees, toRadians } from '../../shared/optics/units';
import type { SpherePlate } from './scene';

/** A plate of the drawing as the optics take it. */
export function plateRetarder({ retardanceDeg, fastAxisDeg }: SpherePlate): Retarder {
  return { retardanceRad: toRadians(degrees(retardanceDeg)), fastAxisRad: toRadians(degrees(fastAxisDeg)) };
}
