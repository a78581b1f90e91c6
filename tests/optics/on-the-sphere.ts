import fc from 'fast-check';
import type { JonesVector } from '../../shared/optics/jones';
import type { Retarder } from '../../shared/optics/retarder';
import type { Stokes } from '../../shared/optics/stokes';
import { radians } from '../../shared/optics/units';

/* Points, plates and angles for tests of paths on the sphere. */

export const DEGREE = Math.PI / 180;
export const plate = (retardanceDeg: number, fastAxisDeg: number): Retarder => ({
  retardanceRad: radians(retardanceDeg * DEGREE),
  fastAxisRad: radians(fastAxisDeg * DEGREE),
});

export const H: Stokes = [1, 0, 0];
export const D: Stokes = [0, 1, 0];
// Canonical: clockwise for the receiver, (1, −i)/√2.
export const CLOCKWISE: Stokes = [0, 0, -1];

/** Distance of two angles modulo `period`. */
export function apart(one: number | null, other: number, period = 2 * Math.PI): number {
  if (one === null) return Infinity;
  const turns = (one - other) / period;
  return Math.abs(turns - Math.round(turns)) * period;
}

export const dot = (a: Stokes, b: Stokes) => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
export const cross = (a: Stokes, b: Stokes): Stokes => [
  a[1] * b[2] - a[2] * b[1],
  a[2] * b[0] - a[0] * b[2],
  a[0] * b[1] - a[1] * b[0],
];

// A. Van Oosterom, J. Strackee, IEEE Trans. Biomed. Eng. 30, 125 (1983): tan(Ω/2) = a·(b×c) / (1 + a·b + b·c + c·a).
export function triangle(a: Stokes, b: Stokes, c: Stokes): number {
  return 2 * Math.atan2(dot(a, cross(b, c)), 1 + dot(a, b) + dot(b, c) + dot(c, a));
}

/** The fan from the first point closes the path by the shortest great circle of itself. */
export function enclosed(points: readonly Stokes[]): number {
  const [first = H] = points;
  return points.slice(1).reduce((sum, point, k) => sum + triangle(first, points[k] ?? first, point), 0);
}

/** The chord between two points. */
export const chord = (a: Stokes, b: Stokes) => Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);

// Evenly spread, which fc.double isn't: it draws most of its numbers close to 0.
export const evenly = (min: number, max: number) =>
  fc.integer({ min: 0, max: 1_000_003 }).map((k) => min + ((max - min) * k) / 1_000_003);

export const direction: fc.Arbitrary<Stokes> = fc
  .tuple(evenly(-1, 1), evenly(-Math.PI, Math.PI))
  .map(([s3, angle]) => {
    const ring = Math.sqrt(1 - s3 * s3);
    return [ring * Math.cos(angle), ring * Math.sin(angle), s3];
  });
export const anyPlate = fc
  .tuple(evenly(-400, 400), evenly(-90, 90))
  .map(([retardanceDeg, axisDeg]) => plate(retardanceDeg, axisDeg));
export const stack = fc.array(anyPlate, { minLength: 1, maxLength: 4 });

export function phased({ aRe, aIm, bRe, bIm }: JonesVector, chi: number): JonesVector {
  const [c, s] = [Math.cos(chi), Math.sin(chi)];
  return { aRe: c * aRe - s * aIm, aIm: s * aRe + c * aIm, bRe: c * bRe - s * bIm, bIm: s * bRe + c * bIm };
}
