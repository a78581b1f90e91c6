import type { Stokes } from '../../shared/optics/stokes';
import { degrees, toRadians } from '../../shared/optics/units';

/** A point or direction in canonical Stokes space, (S1, S2, S3). */
export type Vec3 = Stokes;

export function dot(a: Vec3, b: Vec3): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

export function cross(a: Vec3, b: Vec3): Vec3 {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

export function add(a: Vec3, b: Vec3): Vec3 {
  return [a[0] + b[0], a[1] + b[1], a[2] + b[2]];
}

export function scale(a: Vec3, factor: number): Vec3 {
  return [a[0] * factor, a[1] * factor, a[2] * factor];
}

/** The direction of `a`, or undefined where it is too short to have one. */
export function direction(a: Vec3): Vec3 | undefined {
  const length = Math.hypot(a[0], a[1], a[2]);
  return length < 1e-9 ? undefined : scale(a, 1 / length);
}

/** `a` turned right-handed by `angleRad` about the unit vector `axis`. */
export function turnAbout(a: Vec3, axis: Vec3, angleRad: number): Vec3 {
  const [sin, cos] = [Math.sin(angleRad), Math.cos(angleRad)];
  return add(add(scale(a, cos), scale(cross(axis, a), sin)), scale(axis, dot(axis, a) * (1 - cos)));
}

/** The angle between two directions in degrees; atan2, so that small angles keep their digits. */
export function angleBetweenDeg(a: Vec3, b: Vec3): number {
  const normal = cross(a, b);
  return (Math.atan2(Math.hypot(normal[0], normal[1], normal[2]), dot(a, b)) * 180) / Math.PI;
}

/** The unit vector at `longitudeDeg` along the equator from H (sphere degrees) and `latitudeDeg` towards +S3. */
export function spherePoint(longitudeDeg: number, latitudeDeg: number): Vec3 {
  const longitude = toRadians(degrees(longitudeDeg));
  const latitude = toRadians(degrees(latitudeDeg));
  const cos = Math.cos(latitude);
  return [cos * Math.cos(longitude), cos * Math.sin(longitude), Math.sin(latitude)];
}

/** The point of linear light at a table angle: twice the angle along the equator from H. */
export function linearPoint(tableDeg: number): Vec3 {
  return spherePoint(2 * tableDeg, 0);
}
