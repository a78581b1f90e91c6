import { jonesNorm } from '../jones';
import { add, negative } from './complex';
import { negate, operatorNorm, plus } from './operator';
import { ExpressionError } from './span';
import type { Node, Term } from './tree';
import {
  capital,
  kindOf,
  number,
  operator,
  type Scope,
  state,
  sumUnit,
  textOf,
  type Unit,
  type Value,
} from './values';

/** A term with what it evaluates to. */
export interface Summed extends Term {
  readonly value: Value;
}

// A sum this small beside its largest term is what rounding leaves of nothing: H + V − H − V.
const CANCELLED = 1e-13;

function signed(value: Value, minus: boolean): Value {
  if (!minus) return value;
  switch (value.kind) {
    case 'number':
      return number(negative(value.value), value.unit);
    case 'state': {
      const { aRe, aIm, bRe, bIm } = value.written;
      return state({ aRe: 0 - aRe, aIm: 0 - aIm, bRe: 0 - bRe, bIm: 0 - bIm });
    }
    case 'operator':
      return operator(negate(value.written), value.unit);
    case 'axis': {
      const [x, y, z] = value.bloch;
      return { kind: 'axis', bloch: [0 - x, 0 - y, 0 - z] };
    }
  }
}

/** A sum from left to right of values of one kind. @throws ExpressionError where the kinds or the units differ. */
export function evaluateSum(terms: readonly Summed[], scope: Scope): Value {
  const [first, ...rest] = terms;
  if (first === undefined) throw new ExpressionError({ start: 0, end: 1 }, 'An empty sum has no value.');
  let total = signed(first.value, first.negative);
  let largest = sizeOf(total);
  for (const { node, negative: minus, value } of rest) {
    const next = signed(value, minus);
    largest = Math.max(largest, sizeOf(next));
    total = added(total, next, first.node, node, scope);
  }
  if (!(sizeOf(total) <= CANCELLED * largest)) return total;
  if (total.kind === 'state') return state({ aRe: 0, aIm: 0, bRe: 0, bIm: 0 });
  if (total.kind === 'operator') {
    const zero = { re: 0, im: 0 };
    return operator({ w: zero, x: zero, y: zero, z: zero }, total.unit);
  }
  return total;
}

function sizeOf(value: Value): number {
  if (value.kind === 'state') return jonesNorm(value.written);
  return value.kind === 'operator' ? operatorNorm(value.written) : 0;
}

function added(total: Value, next: Value, first: Node, node: Node, scope: Scope): Value {
  const unit = (a: Unit, b: Unit): Unit => sumUnit({ unit: a, node: first }, { unit: b, node }, scope);
  if (next.kind === 'state' && total.kind === 'state') {
    const [a, b] = [total.written, next.written];
    return state({ aRe: a.aRe + b.aRe, aIm: a.aIm + b.aIm, bRe: a.bRe + b.bRe, bIm: a.bIm + b.bIm });
  }
  if (next.kind === 'number' && total.kind === 'number') {
    return number(add(total.value, next.value), unit(total.unit, next.unit));
  }
  if (next.kind === 'operator' && total.kind === 'operator') {
    return operator(plus(total.written, next.written), unit(total.unit, next.unit));
  }
  throw unlike(total, next, first, node, scope);
}

function unlike(total: Value, next: Value, first: Node, node: Node, scope: Scope): ExpressionError {
  const weighed = next.kind === 'number' ? node : total.kind === 'number' ? first : null;
  const other = next.kind === 'number' ? total : next;
  if (weighed !== null && other.kind === 'operator') {
    const text = textOf(weighed, scope);
    return new ExpressionError(
      weighed.span,
      `A number can’t be added to a unitary. Write which one it weighs: ${text} identity.`,
      `${text} identity`,
    );
  }
  if (weighed !== null && other.kind === 'state') {
    return new ExpressionError(
      weighed.span,
      'A number can’t be added to a state. Write which state it weighs, such as 0.5 H.',
    );
  }
  if (total.kind === 'axis' || next.kind === 'axis') {
    return new ExpressionError(
      node.span,
      'Axes can’t be added. Write the axis as one Bloch vector, such as [1, 0, 1].',
    );
  }
  return new ExpressionError(
    node.span,
    `${capital(kindOf(next))} can’t be added to ${kindOf(total)}. Write the unitary before the state it acts on, such as hadamard H.`,
  );
}
