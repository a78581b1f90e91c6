import { radians } from '../../shared/optics';
import { apply } from '../../shared/optics/solver/apply';
import type { Solved } from '../../shared/optics/solver/setting';

export const DEGREE = Math.PI / 180;
export type Three = readonly [number, number, number];
export type Four = readonly [number, number, number, number];

export function solve([w, x, y, z]: Four, retardancesDeg: readonly number[]): Solved {
  return apply({
    target: { w, x, y, z },
    retardancesRad: retardancesDeg.map((deg) => radians(deg * DEGREE)),
  });
}

/** The references write (left, middle, right) plates; light meets the right one first. */
export function beamOrder([left, middle, right]: Three): Three {
  return [right, middle, left];
}

function apartDeg(one: number, other: number): number {
  const apart = (((one - other) % 180) + 180) % 180;
  return Math.min(apart, 180 - apart);
}

/** Largest distance in degrees mod 180 from a published setting, beam order, to the nearest of the given ones. */
export function farthest(settings: Solved['solutions'], published: readonly Three[]): number {
  return Math.max(
    ...published.map((setting) =>
      Math.min(
        ...settings.map(({ fastAxesRad }) =>
          Math.max(...fastAxesRad.map((angle, k) => apartDeg(angle / DEGREE, setting[k] ?? NaN))),
        ),
      ),
    ),
  );
}
