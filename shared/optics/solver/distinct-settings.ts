import { atan2 } from '../elementary';
import { type Radians, radians, wrap } from '../units';
import type { Setting } from './setting';
import type { CirclePoint } from './trig-quadratic';

/** 1 − F below which a setting makes its target: 1e-12 rad on the sphere. */
export const EXACT_INFIDELITY = 2.5e-25;
// Two solutions closer than this in every angle are one: a tenth of a microdegree.
const SAME_ANGLE_RAD = 2e-9;

/** The plate's angle in [0, π) from the doubled one; a hair below π is a hair below 0, and is 0. */
export function halfAngle({ cos, sin }: CirclePoint): Radians {
  const angle = wrap(atan2(sin, cos) / 2, Math.PI);
  return radians(Math.PI - angle < 1e-14 ? 0 : angle);
}

/** How far a plate is turned from one angle to another, mod π: in [0, π/2]. */
export function turnBetween(one: Radians, other: Radians): Radians {
  const apart = wrap(one - other, Math.PI);
  return radians(Math.min(apart, Math.PI - apart));
}

/** The largest turn of any plate between two settings. */
export function settingsApart(one: readonly Radians[], other: readonly Radians[]): Radians {
  let largest = radians(0);
  for (const [plate, angle] of one.entries()) {
    const apart = turnBetween(angle, other[plate] ?? angle);
    if (apart > largest) largest = apart;
  }
  return largest;
}

/** Sorted by angles in beam order, and of settings closer than `sameRad` only the best. */
export function distinctSettings(
  found: readonly Setting[],
  sameRad: number = SAME_ANGLE_RAD,
): readonly Setting[] {
  const kept: Setting[] = [];
  for (const setting of [...found].sort(byAngles)) {
    const twin = kept.findIndex((other) => settingsApart(other.fastAxesRad, setting.fastAxesRad) < sameRad);
    const held = kept[twin];
    if (held === undefined) kept.push(setting);
    else if (setting.infidelity < held.infidelity) kept[twin] = setting;
  }
  return kept;
}

/** Best first, then by angles. */
export function bestFirst(settings: readonly Setting[]): readonly Setting[] {
  return [...settings].sort((a, b) => comparedInfidelity(a, b) || byAngles(a, b));
}

// Optima that are equal by symmetry differ in the last bits; their order is then that of their angles.
function comparedInfidelity(a: Setting, b: Setting): number {
  const difference = a.infidelity - b.infidelity;
  return Math.abs(difference) <= 1e-12 * Math.max(a.infidelity, b.infidelity) ? 0 : difference;
}

function byAngles(a: Setting, b: Setting): number {
  for (const [plate, angle] of a.fastAxesRad.entries()) {
    const difference = angle - (b.fastAxesRad[plate] ?? angle);
    if (Math.abs(difference) > SAME_ANGLE_RAD) return difference;
  }
  return 0;
}
