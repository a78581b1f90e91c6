import type { Convention } from '../convention';
import { atan2 } from '../elementary';
import { unitaryShortfall } from '../goal';
import type { Quaternion } from '../quaternion';
import { conjugated, gate } from './gates';
import { polar } from './operator';
import { withFixedSign } from './read-unitary';
import type { GateName } from './tree';

const NAMED: readonly GateName[] = ['identity', 'X', 'Y', 'Z', 'hadamard', 'S', 'T', 'sqrtX', 'sqrtY'];

// sin²(ε/2) below which a unitary is called by its name: a turn of 4e-13 rad.
const SAME_UNITARY = 4e-26;

// A part of an axis this small beside the largest is rounding: 1e-13 rad.
const NO_PART = 1e-13;

/**
 * A unitary, canonical, as a short expression in the lab's convention: its name, dagger of one, or rotate(axis, angle) in degrees.
 * Reads back to the same unitary, up to sign, within 1e-12 rad on the sphere.
 */
export function formatUnitary(quaternion: Quaternion, convention: Convention): string {
  const written = withFixedSign(conjugated(quaternion, convention));
  for (const name of NAMED) {
    const turn = polar(gate(name))?.turn;
    if (turn === undefined) continue;
    if (unitaryShortfall(written, turn) < SAME_UNITARY) return name;
    const back = { w: turn.w, x: -turn.x, y: -turn.y, z: -turn.z };
    if (unitaryShortfall(written, back) < SAME_UNITARY) return `dagger(${name})`;
  }
  const { w, x, y, z } = written;
  const largest = Math.max(Math.abs(x), Math.abs(y), Math.abs(z));
  const parts = [x, y, z].map((part) =>
    Math.abs(part) < NO_PART * largest ? 0 : rounded(part / largest, 15),
  );
  const angleDeg = (2 * atan2(Math.sqrt(x * x + y * y + z * z), w) * 180) / Math.PI;
  const axis = ['x', 'y', 'z'].find((_, k) => parts.every((part, other) => (other === k) === (part !== 0)));
  if (axis === undefined) return `rotate([${parts.join(', ')}], ${rounded(angleDeg, 13)}deg)`;
  const sign = parts.includes(-1) ? -1 : 1;
  return `rotate(${axis}, ${rounded(sign * angleDeg, 13)}deg)`;
}

function rounded(value: number, decimals: number): number {
  return Number(value.toFixed(decimals)) + 0;
}
