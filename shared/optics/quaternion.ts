import type { Bloch } from './stokes';

/** A unit quaternion in Bloch axes; w + xi + yj + zk is the unitary w·1 − i(xσx + yσy + zσz). −q is a full turn away. */
export interface Quaternion {
  readonly w: number;
  readonly x: number;
  readonly y: number;
  readonly z: number;
}

export const IDENTITY: Quaternion = { w: 1, x: 0, y: 0, z: 0 };

/** The turn `first` followed by the turn `then` (light meets `first` first). */
export function compose(then: Quaternion, first: Quaternion): Quaternion {
  return {
    w: then.w * first.w - then.x * first.x - then.y * first.y - then.z * first.z,
    x: then.w * first.x + then.x * first.w + then.y * first.z - then.z * first.y,
    y: then.w * first.y - then.x * first.z + then.y * first.w + then.z * first.x,
    z: then.w * first.z + then.x * first.y - then.y * first.x + then.z * first.w,
  };
}

/** The turn back. */
export function conjugate({ w, x, y, z }: Quaternion): Quaternion {
  return { w, x: -x, y: -y, z: -z };
}

/** v + 2w(q × v) + 2 q × (q × v). */
export function rotate({ w, x, y, z }: Quaternion, [vx, vy, vz]: Bloch): Bloch {
  const tx = 2 * (y * vz - z * vy);
  const ty = 2 * (z * vx - x * vz);
  const tz = 2 * (x * vy - y * vx);
  return [vx + w * tx + y * tz - z * ty, vy + w * ty + z * tx - x * tz, vz + w * tz + x * ty - y * tx];
}
