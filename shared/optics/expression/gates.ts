import { type Convention, translateJones } from '../convention';
import { sincos } from '../elementary';
import { formatState } from './format-state';
import { type JonesVector } from '../jones';
import type { Quaternion } from '../quaternion';
import { retarderQuaternion } from '../retarder';
import {
  type Bloch,
  jonesToStokes,
  normaliseStokes,
  type Stokes,
  stokesToBloch,
  stokesToJones,
} from '../stokes';
import { radians } from '../units';
import type { Complex } from './complex';
import { exponentialOperator, fromQuaternion, type Operator, times } from './operator';
import { ExpressionError, type Span } from './span';
import type { AxisName, GateName, PlateName } from './tree';

// √½ rounded to the nearest double.
const HALF_ROOT = 0.7071067811865476;
const ZERO: Complex = { re: 0, im: 0 };
const I: Complex = { re: 0, im: 1 };

/**
 * The named gates as matrices (Nielsen and Chuang 2000, section 4.2), in Pauli parts: X = σx is −i(iσx). S, T and the roots are
 * (1 + p)/2 + (1 − p)/2 σ with p = i or e^{iπ/4}, a turn of the phase of the axis' second state.
 */
export function gate(name: GateName): Operator {
  switch (name) {
    case 'identity':
      return { w: { re: 1, im: 0 }, x: ZERO, y: ZERO, z: ZERO };
    case 'X':
      return { w: ZERO, x: I, y: ZERO, z: ZERO };
    case 'Y':
      return { w: ZERO, x: ZERO, y: I, z: ZERO };
    case 'Z':
      return { w: ZERO, x: ZERO, y: ZERO, z: I };
    case 'hadamard':
      return { w: ZERO, x: { re: 0, im: HALF_ROOT }, y: ZERO, z: { re: 0, im: HALF_ROOT } };
    case 'S':
      return phaseAbout('z', I);
    case 'T':
      return phaseAbout('z', { re: HALF_ROOT, im: HALF_ROOT });
    case 'sqrtX':
      return phaseAbout('x', I);
    case 'sqrtY':
      return phaseAbout('y', I);
    case 'sqrtZ':
      return phaseAbout('z', I);
  }
}

function phaseAbout(axis: AxisName, { re, im }: Complex): Operator {
  const w = { re: (1 + re) / 2, im: im / 2 };
  // i(1 − p)/2
  const part = { re: im / 2, im: (1 - re) / 2 };
  return {
    w,
    x: axis === 'x' ? part : ZERO,
    y: axis === 'y' ? part : ZERO,
    z: axis === 'z' ? part : ZERO,
  };
}

export function axisVector(name: AxisName): Bloch {
  return [name === 'x' ? 1 : 0, name === 'y' ? 1 : 0, name === 'z' ? 1 : 0];
}

/** The direction of a state on the sphere in Bloch coordinates as written: that light, under any phase convention. */
export function blochOf(written: JonesVector): Bloch {
  return stokesToBloch(jonesToStokes(written));
}

/** R_n(θ) = cos θ/2 − i sin θ/2 (n·σ) as written (Nielsen and Chuang 4.8). */
export function rotateAbout([x, y, z]: Bloch, angleRad: number): Operator {
  const half = sincos(angleRad / 2);
  return fromQuaternion({ w: half.cos, x: half.sin * x, y: half.sin * y, z: half.sin * z });
}

/** Rz(a) Ry(b) Rz(c) as written (Nielsen and Chuang, theorem 4.1). */
export function zyz(aRad: number, bRad: number, cRad: number): Operator {
  const [a, b, c] = [
    rotateAbout([0, 0, 1], aRad),
    rotateAbout([0, 1, 0], bRad),
    rotateAbout([0, 0, 1], cRad),
  ];
  return times(times(a, b), c);
}

/** A real plate: the same in every convention, so its matrix as written is conjugated under ωt − kz. */
export function plate(name: PlateName, args: readonly number[], convention: Convention): Operator {
  const [first = 0, second = 0] = args;
  const [retardanceRad, fastAxisRad] =
    name === 'plate' ? [first, second] : [name === 'qwp' ? Math.PI / 2 : Math.PI, first];
  const turn = retarderQuaternion({
    retardanceRad: radians(retardanceRad),
    fastAxisRad: radians(fastAxisRad),
  });
  return fromQuaternion(conjugated(turn, convention));
}

/** Canonical to written and back, the complex conjugate under ωt − kz: σy is imaginary, σx and σz are real. */
export function conjugated({ w, x, y, z }: Quaternion, convention: Convention): Quaternion {
  if (convention.phase === 'kz-wt') return { w, x, y, z };
  return { w, x: 0 - x, y, z: 0 - z };
}

/** Two states this close to opposite, in |a + b|, have no shortest turn that a computation can tell from its neighbours. */
const OPPOSITE = 1e-6;

/**
 * The shortest turn of the sphere from one state, as written, to another. It is the same light's turn in every convention.
 * @throws ExpressionError for opposite states, with a turn by half about one of the axes that serve.
 */
export function shortestTurn(
  from: JonesVector,
  to: JonesVector,
  span: Span,
  convention: Convention,
): Operator {
  const [ax, ay, az] = blochOf(from);
  const [bx, by, bz] = blochOf(to);
  const middle = Math.sqrt((ax + bx) * (ax + bx) + (ay + by) * (ay + by) + (az + bz) * (az + bz));
  if (middle < OPPOSITE) {
    const axis = formatState(
      stokesToJones(besides(jonesToStokes(translateJones(from, convention)))),
      convention,
    );
    throw new ExpressionError(
      span,
      `These two states are opposite, and the shortest turn between them is not unique. Write the axis, such as rotate(${axis}, 180deg).`,
      `rotate(${axis}, 180deg)`,
    );
  }
  // |a + b| is twice the cosine of half the angle, |a × b| its sine.
  const turn = {
    w: middle / 2,
    x: (ay * bz - az * by) / middle,
    y: (az * bx - ax * bz) / middle,
    z: (ax * by - ay * bx) / middle,
  };
  const length = Math.sqrt(turn.w * turn.w + turn.x * turn.x + turn.y * turn.y + turn.z * turn.z);
  return fromQuaternion({ w: turn.w / length, x: turn.x / length, y: turn.y / length, z: turn.z / length });
}

/** Linear light a quarter of the sphere away, so that one plate makes the turn; H for circular light. */
function besides([s1, s2]: Stokes): Stokes {
  return s1 * s1 + s2 * s2 < 1e-12 ? [1, 0, 0] : normaliseStokes([0 - s2, s1, 0]);
}

/** e to i times a real Pauli sum. @throws ExpressionError when it is none, RangeError never: the caller bounds the angle. */
export function exponentialOf(exponent: Operator, span: Span): Operator {
  const result = exponentialOperator(exponent);
  if (result !== null) return result;
  throw new ExpressionError(
    span,
    'This exponent is not i times a real sum of X, Y and Z, so e to it is no unitary. Write one such as exp(-i 45deg X).',
  );
}
