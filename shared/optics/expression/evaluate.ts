import { type Convention, translateJones } from '../convention';
import { LARGEST_ANGLE_RAD, cos, sin } from '../elementary';
import { jonesNorm, type JonesVector } from '../jones';
import {
  add,
  type Complex,
  divide,
  exponential,
  isFinite,
  multiply,
  negative,
  squareRoot,
  wholePower,
} from './complex';
import { ExpressionError, type Span } from './span';
import { calledState, ketState, namedState } from './states';
import type { Factor, Node, Term } from './tree';

/** A number on the way to a state. An angle has a unit; a multiple of pi counts as one, since pi names radians. */
export interface NumberValue {
  readonly kind: 'number';
  readonly value: Complex;
  readonly unit: 'none' | 'pi' | 'angle';
}

/** A state in the phase convention in which it is written, not normalised. */
export interface StateValue {
  readonly kind: 'state';
  readonly written: JonesVector;
}

export type Value = NumberValue | StateValue;

/** What evaluation needs besides the tree. */
export interface Scope {
  readonly source: string;
  readonly convention: Convention;
}

// A sum of states this small beside its largest term is what rounding leaves of nothing: H + V − H − V.
const CANCELLED = 1e-13;

/**
 * The state that a tree describes, in the canonical frame, not normalised.
 * @throws ExpressionError at the part that is no state, has no unit, overflows or vanishes.
 */
export function evaluateState(tree: Node, scope: Scope): JonesVector {
  const value = evaluate(tree, scope);
  if (value.kind === 'number') {
    const shown = value.unit === 'angle' ? 'an angle' : 'a number';
    throw new ExpressionError(
      tree.span,
      `This is ${shown}, not a state. Write the state it belongs to, such as H or |+i>.`,
    );
  }
  const norm = jonesNorm(value.written);
  if (norm === 0) {
    throw new ExpressionError(tree.span, 'Nothing is left of this state: its parts cancel or are zero.');
  }
  return translateJones(value.written, scope.convention);
}

export function evaluate(node: Node, scope: Scope): Value {
  const value = evaluateUnchecked(node, scope);
  const finite = value.kind === 'number' ? isFinite(value.value) : Number.isFinite(jonesNorm(value.written));
  if (!finite) throw new ExpressionError(node.span, 'This is too large to compute with, or divides by zero.');
  return value;
}

function evaluateUnchecked(node: Node, scope: Scope): Value {
  switch (node.kind) {
    case 'number':
      return { kind: 'number', value: { re: node.value, im: 0 }, unit: 'none' };
    case 'constant':
      if (node.name === 'i') return { kind: 'number', value: { re: 0, im: 1 }, unit: 'none' };
      if (node.name === 'pi') return { kind: 'number', value: { re: Math.PI, im: 0 }, unit: 'pi' };
      return { kind: 'number', value: { re: Math.E, im: 0 }, unit: 'none' };
    case 'unit':
      return { kind: 'number', value: { re: node.name === 'deg' ? Math.PI / 180 : 1, im: 0 }, unit: 'angle' };
    case 'state':
      return { kind: 'state', written: namedState(node.name, scope.convention) };
    case 'ket':
      return { kind: 'state', written: ketState(node.label, scope.convention) };
    case 'sum':
      return evaluateSum(node.terms, scope);
    case 'product':
      return evaluateProduct(node.factors, scope);
    case 'power':
      return evaluatePower(node.base, node.exponent, scope);
    case 'column': {
      const [a, b] = node.entries;
      const { re: aRe, im: aIm } = plainNumber(a, scope).value;
      const { re: bRe, im: bIm } = plainNumber(b, scope).value;
      return { kind: 'state', written: { aRe, aIm, bRe, bIm } };
    }
    case 'call':
      return evaluateCall(node, scope);
  }
}

function evaluateCall(node: Node & { kind: 'call' }, scope: Scope): Value {
  const [first] = node.args;
  if (first === undefined) throw new ExpressionError(node.span, `${node.name} needs an argument.`);
  switch (node.name) {
    case 'sqrt': {
      const { value, unit } = numberOf(first, scope);
      if (unit === 'angle') throw new ExpressionError(first.span, 'An angle has no square root here.');
      return { kind: 'number', value: squareRoot(value), unit: 'none' };
    }
    case 'cos':
      return { kind: 'number', value: { re: cos(angleOf(first, scope)), im: 0 }, unit: 'none' };
    case 'sin':
      return { kind: 'number', value: { re: sin(angleOf(first, scope)), im: 0 }, unit: 'none' };
    case 'exp':
      return exponentialOf(first, scope);
    case 'linear':
    case 'bloch':
    case 'ellipse': {
      const angles = node.args.map((arg) => angleOf(arg, scope));
      return { kind: 'state', written: calledState(node.name, angles, node.span, scope.convention) };
    }
    case 'stokes': {
      const parts = node.args.map((arg) => realOf(arg, scope));
      return { kind: 'state', written: calledState('stokes', parts, node.span, scope.convention) };
    }
  }
}

function evaluateSum(terms: readonly Term[], scope: Scope): Value {
  const [first, ...rest] = terms;
  if (first === undefined) throw new ExpressionError({ start: 0, end: 1 }, 'An empty sum has no value.');
  let total = signed(evaluate(first.node, scope), first.negative);
  let largest = total.kind === 'state' ? jonesNorm(total.written) : 0;
  for (const { node, negative: minus } of rest) {
    const next = signed(evaluate(node, scope), minus);
    if (next.kind === 'state' && total.kind === 'state') {
      largest = Math.max(largest, jonesNorm(next.written));
      total = { kind: 'state', written: addStates(total.written, next.written) };
    } else if (next.kind === 'number' && total.kind === 'number') {
      const unit = sumUnit(total, next, first.node, node, scope);
      total = { kind: 'number', value: add(total.value, next.value), unit };
    } else {
      const number = next.kind === 'number' ? node : first.node;
      throw new ExpressionError(
        number.span,
        'A number can’t be added to a state. Write which state it weighs, such as 0.5 H.',
      );
    }
  }
  if (total.kind === 'state' && jonesNorm(total.written) <= CANCELLED * largest) {
    return { kind: 'state', written: { aRe: 0, aIm: 0, bRe: 0, bIm: 0 } };
  }
  return total;
}

function sumUnit(a: NumberValue, b: NumberValue, left: Node, right: Node, scope: Scope): NumberValue['unit'] {
  if (a.unit === b.unit) return a.unit;
  const bare = a.unit === 'none' ? left : b.unit === 'none' ? right : null;
  if (bare === null) return 'angle';
  if (a.unit === 'angle' || b.unit === 'angle') throw unitMissing(bare, scope);
  return 'none';
}

function evaluateProduct(factors: readonly Factor[], scope: Scope): Value {
  let total: Value | null = null;
  for (const { join, node } of factors) {
    const next = evaluate(node, scope);
    total = total === null ? next : joined(total, next, join === '/', node.span);
    const finite =
      total.kind === 'number' ? isFinite(total.value) : Number.isFinite(jonesNorm(total.written));
    if (!finite)
      throw new ExpressionError(node.span, 'This is too large to compute with, or divides by zero.');
  }
  if (total === null) throw new ExpressionError({ start: 0, end: 1 }, 'An empty product has no value.');
  return total;
}

function joined(left: Value, right: Value, over: boolean, span: Span): Value {
  if (left.kind === 'number' && right.kind === 'number') {
    const value = over ? divide(left.value, right.value) : multiply(left.value, right.value);
    return { kind: 'number', value, unit: productUnit(left.unit, right.unit, over, span) };
  }
  if (right.kind === 'state') {
    if (over) throw new ExpressionError(span, 'A state can’t be divided by. Put it in front of the /.');
    if (left.kind === 'state') {
      throw new ExpressionError(span, 'Two states can’t be multiplied. Put + or − between them.');
    }
    return { kind: 'state', written: scaled(right.written, weight(left, span)) };
  }
  if (left.kind !== 'state') throw new ExpressionError(span, 'This product has no value.');
  const by = weight(right, span);
  return { kind: 'state', written: over ? dividedBy(left.written, by) : scaled(left.written, by) };
}

function weight(number: NumberValue, span: Span): Complex {
  if (number.unit === 'angle') {
    throw new ExpressionError(span, 'An angle can’t weigh a state. Write cos(…), sin(…) or e^(i …) of it.');
  }
  return number.value;
}

function productUnit(
  left: NumberValue['unit'],
  right: NumberValue['unit'],
  over: boolean,
  span: Span,
): NumberValue['unit'] {
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

// Above this a power of anything but 1 overflows or vanishes.
const LARGEST_POWER = 1_000_000;

function evaluatePower(base: Node, exponent: Node, scope: Scope): Value {
  if (base.kind === 'constant' && base.name === 'e') return exponentialOf(exponent, scope);
  const { value } = plainNumber(base, scope);
  const power = realOf(exponent, scope);
  if (Number.isInteger(power) && Math.abs(power) <= LARGEST_POWER) {
    return { kind: 'number', value: wholePower(value, power), unit: 'none' };
  }
  if (Number.isInteger(2 * power) && Math.abs(power) <= LARGEST_POWER) {
    return { kind: 'number', value: wholePower(squareRoot(value), 2 * power), unit: 'none' };
  }
  throw new ExpressionError(
    exponent.span,
    'Powers are whole or half numbers here, such as 2, −1 or 1/2; of e they are any number.',
  );
}

function exponentialOf(node: Node, scope: Scope): Value {
  const { value, unit } = numberOf(node, scope);
  if (value.im !== 0 && unit === 'none') throw unitMissing(node, scope);
  if (value.re !== 0 && unit === 'angle') {
    throw new ExpressionError(node.span, 'e to an angle needs the i: write e^(i 45deg).');
  }
  if (Math.abs(value.im) > LARGEST_ANGLE_RAD) throw tooManyTurns(node.span);
  return { kind: 'number', value: exponential(value), unit: 'none' };
}

function numberOf(node: Node, scope: Scope): NumberValue {
  const value = evaluate(node, scope);
  if (value.kind === 'number') return value;
  throw new ExpressionError(node.span, 'A state stands here where a number is wanted.');
}

function plainNumber(node: Node, scope: Scope): NumberValue {
  const number = numberOf(node, scope);
  if (number.unit !== 'angle') return number;
  throw new ExpressionError(
    node.span,
    'An angle stands here where a plain number is wanted. Write cos(…) or sin(…) of it.',
  );
}

function realOf(node: Node, scope: Scope): number {
  const { value } = plainNumber(node, scope);
  if (value.im === 0) return value.re;
  throw new ExpressionError(node.span, 'This must be a real number, without i.');
}

function angleOf(node: Node, scope: Scope): number {
  const { value, unit } = numberOf(node, scope);
  if (value.im !== 0) throw new ExpressionError(node.span, 'An angle must be real, without i.');
  if (unit === 'none') throw unitMissing(node, scope);
  if (Math.abs(value.re) > LARGEST_ANGLE_RAD) throw tooManyTurns(node.span);
  return value.re;
}

function tooManyTurns(span: Span): ExpressionError {
  return new ExpressionError(span, 'This angle is many thousand turns. Write it within one turn.');
}

function unitMissing(node: Node, scope: Scope): ExpressionError {
  const text = scope.source.slice(node.span.start, node.span.end);
  // Behind a letter the unit needs a space, and a sum needs brackets for the unit to hold all of it.
  const bracketed = node.kind === 'sum' && !text.startsWith('(') ? `(${text})` : text;
  const last = bracketed.charAt(bracketed.length - 1);
  const space = last.toLowerCase() === last.toUpperCase() ? '' : ' ';
  const inDegrees = `${bracketed}${space}deg`;
  const message = `${text} of what? Write ${inDegrees} or ${bracketed}${space}rad.`;
  return new ExpressionError(node.span, message, inDegrees);
}

function signed(value: Value, minus: boolean): Value {
  if (!minus) return value;
  if (value.kind === 'number') return { ...value, value: negative(value.value) };
  return { kind: 'state', written: scaled(value.written, { re: -1, im: 0 }) };
}

function addStates(a: JonesVector, b: JonesVector): JonesVector {
  return { aRe: a.aRe + b.aRe, aIm: a.aIm + b.aIm, bRe: a.bRe + b.bRe, bIm: a.bIm + b.bIm };
}

function scaled({ aRe, aIm, bRe, bIm }: JonesVector, by: Complex): JonesVector {
  const a = multiply({ re: aRe, im: aIm }, by);
  const b = multiply({ re: bRe, im: bIm }, by);
  return { aRe: a.re, aIm: a.im, bRe: b.re, bIm: b.im };
}

function dividedBy({ aRe, aIm, bRe, bIm }: JonesVector, by: Complex): JonesVector {
  const a = divide({ re: aRe, im: aIm }, by);
  const b = divide({ re: bRe, im: bIm }, by);
  return { aRe: a.re, aIm: a.im, bRe: b.re, bIm: b.im };
}
