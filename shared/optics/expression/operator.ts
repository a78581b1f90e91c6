import { sincos } from '../elementary';
import type { JonesVector } from '../jones';
import type { Quaternion } from '../quaternion';
import { add, type Complex, divide, exponential, isFinite, multiply, negative, squareRoot } from './complex';

/**
 * Any 2 × 2 complex matrix on the way to a unitary, as w·1 − i(xσx + yσy + zσz) with complex parts. A unitary is a phase times
 * a real unit quaternion, so products, daggers and the polar decomposition are those of quaternions.
 */
export interface Operator {
  readonly w: Complex;
  readonly x: Complex;
  readonly y: Complex;
  readonly z: Complex;
}

const HALF: Complex = { re: 0.5, im: 0 };
const HALF_I: Complex = { re: 0, im: 0.5 };

export function fromQuaternion({ w, x, y, z }: Quaternion): Operator {
  return { w: { re: w, im: 0 }, x: { re: x, im: 0 }, y: { re: y, im: 0 }, z: { re: z, im: 0 } };
}

/** The matrix [[a, b], [c, d]]. */
export function fromEntries(a: Complex, b: Complex, c: Complex, d: Complex): Operator {
  return {
    w: multiply(HALF, add(a, d)),
    x: multiply(HALF_I, add(b, c)),
    y: multiply(HALF, add(c, negative(b))),
    z: multiply(HALF_I, add(a, negative(d))),
  };
}

/** The matrix's entries, rows first. */
export function entriesOf({ w, x, y, z }: Operator): readonly [Complex, Complex, Complex, Complex] {
  return [
    { re: w.re + z.im, im: w.im - z.re },
    { re: x.im - y.re, im: -x.re - y.im },
    { re: x.im + y.re, im: y.im - x.re },
    { re: w.re - z.im, im: w.im + z.re },
  ];
}

function each(a: Operator, part: (part: Complex) => Complex): Operator {
  return { w: part(a.w), x: part(a.x), y: part(a.y), z: part(a.z) };
}

export function scale(a: Operator, by: Complex): Operator {
  return each(a, (part) => multiply(part, by));
}

export function divideBy(a: Operator, by: Complex): Operator {
  return each(a, (part) => divide(part, by));
}

export function negate(a: Operator): Operator {
  return each(a, negative);
}

export function plus(a: Operator, b: Operator): Operator {
  return { w: add(a.w, b.w), x: add(a.x, b.x), y: add(a.y, b.y), z: add(a.z, b.z) };
}

function four(a: Complex, b: Complex, c: Complex, d: Complex): Complex {
  return { re: a.re + b.re + c.re + d.re, im: a.im + b.im + c.im + d.im };
}

/** The matrix product a·b: b acts first. */
export function times(a: Operator, b: Operator): Operator {
  const minus = (p: Complex, q: Complex): Complex => negative(multiply(p, q));
  return {
    w: four(multiply(a.w, b.w), minus(a.x, b.x), minus(a.y, b.y), minus(a.z, b.z)),
    x: four(multiply(a.w, b.x), multiply(a.x, b.w), multiply(a.y, b.z), minus(a.z, b.y)),
    y: four(multiply(a.w, b.y), minus(a.x, b.z), multiply(a.y, b.w), multiply(a.z, b.x)),
    z: four(multiply(a.w, b.z), multiply(a.x, b.y), minus(a.y, b.x), multiply(a.z, b.w)),
  };
}

export function adjoint({ w, x, y, z }: Operator): Operator {
  const opposite = ({ re, im }: Complex): Complex => ({ re: 0 - re, im });
  return { w: { re: w.re, im: 0 - w.im }, x: opposite(x), y: opposite(y), z: opposite(z) };
}

/** w² + x² + y² + z², which is the determinant. */
function determinant({ w, x, y, z }: Operator): Complex {
  return four(multiply(w, w), multiply(x, x), multiply(y, y), multiply(z, z));
}

/** By repeated squaring; negative exponents through the inverse. `exponent` is a whole number. */
export function wholeOperatorPower(base: Operator, exponent: number): Operator {
  let result: Operator = fromQuaternion({ w: 1, x: 0, y: 0, z: 0 });
  let square = base;
  for (let left = Math.abs(exponent); left > 0; left = Math.floor(left / 2)) {
    if (left % 2 === 1) result = times(result, square);
    if (left > 1) square = times(square, square);
  }
  if (exponent >= 0) return result;
  const adjugate = { w: result.w, x: negative(result.x), y: negative(result.y), z: negative(result.z) };
  return divideBy(adjugate, determinant(result));
}

export function applyTo(a: Operator, { aRe, aIm, bRe, bIm }: JonesVector): JonesVector {
  const [first, second, third, fourth] = entriesOf(a);
  const h = { re: aRe, im: aIm };
  const v = { re: bRe, im: bIm };
  const top = add(multiply(first, h), multiply(second, v));
  const bottom = add(multiply(third, h), multiply(fourth, v));
  return { aRe: top.re, aIm: top.im, bRe: bottom.re, bIm: bottom.im };
}

export function isFiniteOperator({ w, x, y, z }: Operator): boolean {
  return isFinite(w) && isFinite(x) && isFinite(y) && isFinite(z);
}

/** √½ of the Frobenius norm: 1 for a unitary. Scaled so that neither 1e-200 nor 1e200 is lost in the squares. */
export function operatorNorm({ w, x, y, z }: Operator): number {
  const parts = [w.re, w.im, x.re, x.im, y.re, y.im, z.re, z.im];
  const largest = parts.reduce((most, part) => Math.max(most, Math.abs(part)), 0);
  if (largest === 0 || !(largest < Infinity)) return largest;
  return largest * Math.sqrt(parts.reduce((sum, part) => sum + (part / largest) * (part / largest), 0));
}

/** The polar decomposition of an operator: it is `size` · e^{i·phase} · (the turn), but for `distance`. */
export interface Polar {
  /** The nearest unitary without its phase, a real unit quaternion in the phase convention as written. */
  readonly turn: Quaternion;
  /** e^{i·phase}. */
  readonly phase: Complex;
  readonly size: number;
  /** Frobenius norm of what is left between the operator divided by `size` and the nearest unitary; 0 for a unitary. */
  readonly distance: number;
  /** Whether no other unitary is as near: one is, where the determinant vanishes. */
  readonly isSingle: boolean;
}

/**
 * For M = U·√(M†M) the parts of U are those of M with the common phase √(det/|det|) taken out and their imaginary remainder
 * dropped, since M + (det/|det|) adj(M)† is along U. Where the determinant vanishes any phase serves. null for zero.
 */
export function polar(a: Operator): Polar | null {
  const size = operatorNorm(a);
  if (!(size > 0) || size === Infinity) return null;
  const unit = each(a, ({ re, im }) => ({ re: re / size, im: im / size }));
  const root = squareRoot(determinant(unit));
  const length = Math.sqrt(root.re * root.re + root.im * root.im);
  const isSingle = length >= 1e-8;
  const phase = !isSingle ? { re: 1, im: 0 } : { re: root.re / length, im: root.im / length };
  const turned = scale(unit, { re: phase.re, im: -phase.im });
  const { w, x, y, z } = turned;
  const real = Math.sqrt(w.re * w.re + x.re * x.re + y.re * y.re + z.re * z.re);
  const rest = w.im * w.im + x.im * x.im + y.im * y.im + z.im * z.im;
  return {
    turn: { w: w.re / real, x: x.re / real, y: y.re / real, z: z.re / real },
    phase,
    size,
    distance: Math.sqrt(2 * ((1 - real) * (1 - real) + rest)),
    isSingle,
  };
}

/** How far from imaginary the exponent of a unitary may be, beside its size: rounding of its sum. */
const IMAGINARY_ROUNDING = 1e-12;

/**
 * e to an operator that is i times a real combination of 1, X, Y and Z: e^{w}(cos v − i sin v n·σ).
 * null when it isn't one, so that its exponential would be no unitary. @throws RangeError beyond the reach of `sincos`.
 */
export function exponentialOperator(a: Operator): Operator | null {
  const { w, x, y, z } = a;
  const stray = Math.max(Math.abs(w.re), Math.abs(x.im), Math.abs(y.im), Math.abs(z.im));
  if (stray > IMAGINARY_ROUNDING * operatorNorm(a)) return null;
  const largest = Math.max(Math.abs(x.re), Math.abs(y.re), Math.abs(z.re));
  if (largest === 0)
    return scale(fromQuaternion({ w: 1, x: 0, y: 0, z: 0 }), exponential({ re: 0, im: w.im }));
  const [nx, ny, nz] = [x.re / largest, y.re / largest, z.re / largest];
  const length = Math.sqrt(nx * nx + ny * ny + nz * nz);
  const { sin, cos } = sincos(largest * length);
  const by = sin / length;
  return scale(
    fromQuaternion({ w: cos, x: by * nx, y: by * ny, z: by * nz }),
    exponential({ re: 0, im: w.im }),
  );
}
