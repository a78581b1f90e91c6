import { circularState, type Convention, readStokes, translateJones } from '../convention';
import { sincos } from '../elementary';
import { ellipseToStokes } from '../ellipse';
import type { JonesVector } from '../jones';
import { normaliseStokes, type Stokes, stokesLength, stokesToJones } from '../stokes';
import { radians } from '../units';
import { ExpressionError, type Span } from './span';
import type { KetLabel, StateName } from './tree';

// √½ rounded to the nearest double.
const HALF_ROOT = 0.7071067811865476;

/** How far from 1 a typed Stokes vector may be before it counts as partly polarised: three decimals in each part. */
const STOKES_LENGTH_TOLERANCE = 1e-3;

/** A named state as a Jones vector in the phase convention of the text; L and R by the lab's letters. */
export function namedState(name: StateName, convention: Convention): JonesVector {
  switch (name) {
    case 'H':
      return { aRe: 1, aIm: 0, bRe: 0, bIm: 0 };
    case 'V':
      return { aRe: 0, aIm: 0, bRe: 1, bIm: 0 };
    case 'D':
      return { aRe: HALF_ROOT, aIm: 0, bRe: HALF_ROOT, bIm: 0 };
    case 'A':
      return { aRe: HALF_ROOT, aIm: 0, bRe: -HALF_ROOT, bIm: 0 };
    case 'L':
    case 'R': {
      const counterClockwise = circularState(name, convention)[2] > 0;
      return translateJones(
        { aRe: HALF_ROOT, aIm: 0, bRe: 0, bIm: counterClockwise ? HALF_ROOT : -HALF_ROOT },
        convention,
      );
    }
  }
}

/** A ket; |±i⟩ is (H ± iV)/√2 as written, so which way it turns depends on the phase convention. */
export function ketState(label: KetLabel, convention: Convention): JonesVector {
  switch (label) {
    case '0':
      return namedState('H', convention);
    case '1':
      return namedState('V', convention);
    case '+':
      return namedState('D', convention);
    case '-':
      return namedState('A', convention);
    case '+i':
      return { aRe: HALF_ROOT, aIm: 0, bRe: 0, bIm: HALF_ROOT };
    case '-i':
      return { aRe: HALF_ROOT, aIm: 0, bRe: 0, bIm: -HALF_ROOT };
    default:
      return namedState(label, convention);
  }
}

/**
 * linear(angle), bloch(θ, φ), ellipse(azimuth, ellipticity) in radians, or stokes(s1, s2, s3).
 * bloch is cos θ/2 H + e^{iφ} sin θ/2 V as written, so φ follows the phase flag; the last of stokes and ellipse
 * carries the lab's sign of S3.
 * @throws ExpressionError for a Stokes vector that is no pure state, and an ellipticity beyond ±45°.
 */
export function calledState(
  name: 'linear' | 'bloch' | 'ellipse' | 'stokes',
  args: readonly number[],
  span: Span,
  convention: Convention,
): JonesVector {
  const [first = 0, second = 0, third = 0] = args;
  switch (name) {
    case 'linear': {
      const { sin, cos } = sincos(first);
      return { aRe: cos, aIm: 0, bRe: sin, bIm: 0 };
    }
    case 'bloch': {
      const half = sincos(first / 2);
      const turn = sincos(second);
      return { aRe: half.cos, aIm: 0, bRe: half.sin * turn.cos, bIm: half.sin * turn.sin };
    }
    case 'ellipse': {
      if (Math.abs(second) > Math.PI / 4 + 1e-12) {
        throw new ExpressionError(
          span,
          'The second angle of ellipse, the ellipticity, reaches from −45° to 45° (circular).',
        );
      }
      const [s1, s2, s3] = ellipseToStokes({ azimuthRad: radians(first), ellipticityRad: radians(second) });
      return writtenFromStokes(s1, s2, s3, convention);
    }
    case 'stokes':
      return fromTypedStokes(first, second, third, span, convention);
  }
}

function fromTypedStokes(
  s1: number,
  s2: number,
  s3: number,
  span: Span,
  convention: Convention,
): JonesVector {
  const length = stokesLength([s1, s2, s3]);
  if (length < 1e-150) {
    throw new ExpressionError(
      span,
      'This Stokes vector is zero: unpolarised light. A target must be fully polarised.',
    );
  }
  if (length < 1 - STOKES_LENGTH_TOLERANCE) {
    throw new ExpressionError(
      span,
      `This is partly polarised, degree of polarisation ${Number(length.toFixed(4))}. Plates keep that degree, so a target must be fully polarised, of length 1.`,
      scaledToOne([s1, s2, s3]),
    );
  }
  const problem = tooLong([s1, s2, s3], length, span);
  if (problem !== null) throw problem;
  const unit = writtenFromStokes(s1, s2, s3, convention);
  // An intensity of `length` is an amplitude of its root; the norm that is shown is that of the vector as typed.
  const size = Math.sqrt(length);
  return { aRe: unit.aRe * size, aIm: unit.aIm * size, bRe: unit.bRe * size, bIm: unit.bIm * size };
}

/** What is wrong with a Stokes vector as typed that is longer than light can be, or null. */
export function tooLong(typed: Stokes, length: number, span: Span): ExpressionError | null {
  if (!Number.isFinite(length)) {
    return new ExpressionError(span, 'This Stokes vector is too large to compute with.');
  }
  if (length <= 1 + STOKES_LENGTH_TOLERANCE) return null;
  return new ExpressionError(
    span,
    `This Stokes vector is ${Number(length.toPrecision(5))} long; light has at most 1. Divide each part by its length.`,
    scaledToOne(typed),
  );
}

function scaledToOne(typed: Stokes): string {
  return `stokes(${normaliseStokes(typed).map(short).join(', ')})`;
}

function short(value: number): string {
  return String(Number(value.toFixed(6)) + 0);
}

function writtenFromStokes(s1: number, s2: number, s3: number, convention: Convention): JonesVector {
  return translateJones(stokesToJones(readStokes({ s1, s2, s3 }, convention)), convention);
}
