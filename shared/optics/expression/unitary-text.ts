import { entriesOf, fromQuaternion, type Operator, type Polar, scale } from './operator';
import type { Complex } from './complex';
import { ExpressionError, type Span } from './span';
import { polar } from './operator';

/**
 * How far an operator, brought to size 1, may be from the nearest unitary and still be read as it: rounding of six typed
 * digits. Fewer digits are an error that offers the nearest unitary, so that nothing is changed unseen.
 */
const UNITARY_TOLERANCE = 1e-6;

/** The polar decomposition of what is a unitary up to a factor. @throws ExpressionError with the nearest one offered. */
export function unitaryPart(operator: Operator, span: Span, what: string): Polar {
  const found = polar(operator);
  if (found === null) {
    throw new ExpressionError(span, `${what} is zero: nothing is left of it. Write a unitary, such as X.`);
  }
  if (found.distance <= UNITARY_TOLERANCE) return found;
  const nearest = matrixText(scale(fromQuaternion(found.turn), found.phase));
  const distance = Number(found.distance.toPrecision(3));
  throw new ExpressionError(
    span,
    `${what} is not unitary, not even up to a factor: it is ${distance} away from ${
      found.isSingle
        ? 'the nearest unitary, which can be put in its place.'
        : 'the nearest unitaries. Its determinant is 0, so that many are as near; one of them can be put in its place.'
    }`,
    nearest,
    { distanceFromUnitary: found.distance, nearestUnitary: nearest },
  );
}

/** An operator as matrix [[…], […]] with twelve decimals. */
export function matrixText(operator: Operator): string {
  const [a, b, c, d] = entriesOf(operator).map(complexText);
  return `matrix [[${String(a)}, ${String(b)}], [${String(c)}, ${String(d)}]]`;
}

function complexText({ re, im }: Complex): string {
  const [realPart, imaginary] = [rounded(re), rounded(im)];
  if (imaginary === 0) return String(realPart);
  const size = Math.abs(imaginary) === 1 ? 'i' : `${Math.abs(imaginary)}i`;
  if (realPart === 0) return imaginary < 0 ? `-${size}` : size;
  return `${realPart} ${imaginary < 0 ? '-' : '+'} ${size}`;
}

function rounded(value: number): number {
  // Adding 0 turns −0 into 0.
  return Number(value.toFixed(12)) + 0;
}
