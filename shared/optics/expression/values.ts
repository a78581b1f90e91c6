import type { Convention } from '../convention';
import { LARGEST_ANGLE_RAD } from '../elementary';
import { type JonesVector, jonesNorm } from '../jones';
import type { Bloch } from '../stokes';
import { type Complex, isFinite } from './complex';
import { isFiniteOperator, type Operator } from './operator';
import { ExpressionError, type Span } from './span';
import type { Node } from './tree';

/** An angle has a unit; a multiple of pi counts as one, since pi names radians. */
export type Unit = 'none' | 'pi' | 'angle';

export interface NumberValue {
  readonly kind: 'number';
  readonly value: Complex;
  readonly unit: Unit;
}

/** A state in the phase convention in which it is written, not normalised. */
export interface StateValue {
  readonly kind: 'state';
  readonly written: JonesVector;
}

/** A matrix in the phase convention in which it is written, not yet checked to be a unitary. With a unit it is an exponent. */
export interface OperatorValue {
  readonly kind: 'operator';
  readonly written: Operator;
  readonly unit: Unit;
}

/** A direction in Bloch coordinates as written, of length 1. Stands in rotate only. */
export interface AxisValue {
  readonly kind: 'axis';
  readonly bloch: Bloch;
}

export type Value = NumberValue | StateValue | OperatorValue | AxisValue;

/** What evaluation needs besides the tree. */
export interface Scope {
  readonly source: string;
  readonly convention: Convention;
}

export function number(value: Complex, unit: Unit = 'none'): NumberValue {
  return { kind: 'number', value, unit };
}

export function real(value: number): NumberValue {
  return number({ re: value, im: 0 });
}

export function state(written: JonesVector): StateValue {
  return { kind: 'state', written };
}

export function operator(written: Operator, unit: Unit = 'none'): OperatorValue {
  return { kind: 'operator', written, unit };
}

function isFiniteValue(value: Value): boolean {
  switch (value.kind) {
    case 'number':
      return isFinite(value.value);
    case 'state':
      return Number.isFinite(jonesNorm(value.written));
    case 'operator':
      return isFiniteOperator(value.written);
    case 'axis':
      return true;
  }
}

export function checkFinite(value: Value, span: Span): void {
  if (!isFiniteValue(value)) {
    throw new ExpressionError(span, 'This is too large to compute with, or divides by zero.');
  }
}

/** With its article: "a state". */
export function kindOf(value: Value): string {
  switch (value.kind) {
    case 'number':
      return value.unit === 'angle' ? 'an angle' : 'a number';
    case 'state':
      return 'a state';
    case 'operator':
      return 'a unitary';
    case 'axis':
      return 'an axis';
  }
}

export function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** What was typed for a node, as it stands in the source. */
export function textOf(node: Node, scope: Scope): string {
  return scope.source.slice(node.span.start, node.span.end);
}

export function numberOf(value: Value, span: Span): NumberValue {
  if (value.kind === 'number') return value;
  throw new ExpressionError(span, `${capital(kindOf(value))} stands here where a number is wanted.`);
}

export function plainNumber(value: Value, span: Span): NumberValue {
  const found = numberOf(value, span);
  if (found.unit !== 'angle') return found;
  throw new ExpressionError(
    span,
    'An angle stands here where a plain number is wanted. Write cos(…) or sin(…) of it.',
  );
}

export function realOf(value: Value, span: Span): number {
  const { value: found } = plainNumber(value, span);
  if (found.im === 0) return found.re;
  throw new ExpressionError(span, 'This must be a real number, without i.');
}

/** In radians. */
export function angleOf(value: Value, node: Node, scope: Scope): number {
  const { value: found, unit } = numberOf(value, node.span);
  if (found.im !== 0) throw new ExpressionError(node.span, 'An angle must be real, without i.');
  if (unit === 'none') throw unitMissing(node, scope);
  if (Math.abs(found.re) > LARGEST_ANGLE_RAD) throw tooManyTurns(node.span);
  return found.re;
}

/** A factor that weighs a state or a unitary. */
export function weight({ value, unit }: NumberValue, span: Span): Complex {
  if (unit === 'angle') {
    throw new ExpressionError(span, 'An angle can’t weigh a state. Write cos(…), sin(…) or e^(i …) of it.');
  }
  return value;
}

export function tooManyTurns(span: Span): ExpressionError {
  return new ExpressionError(span, 'This angle is many thousand turns. Write it within one turn.');
}

export function unitMissing(node: Node, scope: Scope): ExpressionError {
  const text = textOf(node, scope);
  // Behind a letter the unit needs a space, and a sum needs brackets for the unit to hold all of it.
  const bracketed = isOpenSum(node, text) ? `(${text})` : text;
  const last = bracketed.charAt(bracketed.length - 1);
  const space = last.toLowerCase() === last.toUpperCase() ? '' : ' ';
  const inDegrees = `${bracketed}${space}deg`;
  const message = `${text} of what? Write ${inDegrees} or ${bracketed}${space}rad.`;
  return new ExpressionError(node.span, message, inDegrees);
}

/** A sum of several terms that was typed without brackets around all of it: "(1) + (2)" too. */
function isOpenSum(node: Node, text: string): boolean {
  if (node.kind !== 'sum' || node.terms.length < 2) return false;
  return !text.startsWith('(') || node.terms[0]?.node.span.start === node.span.start;
}

interface Summand {
  readonly unit: Unit;
  readonly node: Node;
}

export function sumUnit(a: Summand, b: Summand, scope: Scope): Unit {
  if (a.unit === b.unit) return a.unit;
  const bare = a.unit === 'none' ? a : b.unit === 'none' ? b : null;
  if (bare === null) return 'angle';
  if (a.unit === 'angle' || b.unit === 'angle') throw unitMissing(bare.node, scope);
  return 'none';
}

export function productUnit(left: Unit, right: Unit, over: boolean, span: Span): Unit {
  if (left === 'angle' && right === 'angle') {
    if (over) return 'none';
    throw new ExpressionError(span, 'This angle has a unit twice. Remove one of the units.');
  }
  if (right === 'angle' && over) throw new ExpressionError(span, 'An angle can’t be divided by.');
  if (left === 'angle' || right === 'angle') return 'angle';
  if (left === 'pi' && right === 'pi') return 'none';
  if (over) return left === 'pi' ? 'pi' : 'none';
  return left === 'pi' || right === 'pi' ? 'pi' : 'none';
}
