import { divide, multiply } from './complex';
import { applyTo, divideBy, scale, times } from './operator';
import { ExpressionError, type Span } from './span';
import { type Factor, isPlate, type Node } from './tree';
import { unitaryPart } from './unitary-text';
import {
  capital,
  checkFinite,
  kindOf,
  number,
  operator,
  type OperatorValue,
  productUnit,
  type Scope,
  state,
  type StateValue,
  type Value,
  weight,
} from './values';
import type { JonesVector } from '../jones';
import type { Complex } from './complex';

/** A factor with what it evaluates to. */
export interface Multiplied extends Factor {
  readonly value: Value;
}

/**
 * A product from left to right: numbers, a matrix product (the right one acts first), a state at its end. Plates that only
 * stand side by side are a list in beam order instead, the left one first.
 * @throws ExpressionError where a list and a product would have to be told apart.
 */
export function evaluateProduct(factors: readonly Multiplied[], scope: Scope): Value {
  const order = new Order(scope);
  let total: Value | null = null;
  let before: Span = { start: 0, end: 1 };
  for (const { join, node, value } of factors) {
    const isList = order.next(join, node, value);
    if (total === null) {
      total = value;
      before = node.span;
    } else if (isList && total.kind === 'operator' && value.kind === 'operator') {
      total = multiplied(value, total, node.span);
    } else if (total.kind === 'operator' && value.kind === 'state' && join !== '/') {
      total = applied(total, value, before);
    } else total = joined(total, value, join === '/', node.span);
    checkFinite(total, node.span);
    before = { start: before.start, end: node.span.end };
  }
  if (total === null) throw new ExpressionError({ start: 0, end: 1 }, 'An empty product has no value.');
  return total;
}

/** Which way round the unitaries of one product are multiplied, decided by how they are joined. */
class Order {
  private first: Node | null = null;
  private last: Node | null = null;
  private way: 'list' | 'product' | null = null;
  private dotted = false;

  constructor(private readonly scope: Scope) {}

  /** Whether this factor is the next plate of a list. */
  next(join: Factor['join'], node: Node, value: Value): boolean {
    if (join === '*') this.dotted = true;
    if (value.kind !== 'operator') return false;
    const before = this.last;
    const dotted = this.dotted;
    this.last = node;
    this.dotted = false;
    if (before === null) {
      this.first = node;
      return false;
    }
    const plates = [before, node].filter(isPlate).length;
    const way = dotted || plates === 0 ? 'product' : 'list';
    if (plates === 1 && !dotted) throw this.mixed(before, node);
    if (this.way !== null && this.way !== way) throw this.mixed(before, node);
    this.way = way;
    return way === 'list';
  }

  private mixed(before: Node, node: Node): ExpressionError {
    const start = (this.way === 'list' ? this.first : before)?.span.start ?? before.span.start;
    const left = this.scope.source.slice(start, before.span.end);
    const right = this.scope.source.slice(node.span.start, node.span.end);
    const text = this.way === 'list' ? `(${left})*${right}` : `${left}*${right}`;
    return new ExpressionError(
      { start, end: node.span.end },
      `Plates side by side are a list in beam order, the left one first; of · and of gates the right one acts first. Put brackets around the list, or · between the parts, as in ${text}.`,
      text,
    );
  }
}

function joined(left: Value, right: Value, over: boolean, span: Span): Value {
  if (left.kind === 'axis' || right.kind === 'axis') {
    throw new ExpressionError(span, 'An axis can’t be multiplied. Only its direction counts in rotate.');
  }
  if (left.kind === 'number' && right.kind === 'number') {
    const value = over ? divide(left.value, right.value) : multiply(left.value, right.value);
    return number(value, productUnit(left.unit, right.unit, over, span));
  }
  if (over && right.kind !== 'number') {
    const instead =
      right.kind === 'state' ? 'Put it in front of the /.' : 'Write the unitary that turns back, such as S†.';
    throw new ExpressionError(span, `${capital(kindOf(right))} can’t be divided by. ${instead}`);
  }
  if (left.kind === 'number') {
    if (right.kind === 'state') return state(scaled(right.written, weight(left, span)));
    if (right.kind === 'operator') {
      return operator(scale(right.written, left.value), productUnit(left.unit, right.unit, false, span));
    }
  }
  if (right.kind === 'number') {
    if (left.kind === 'state') {
      const by = weight(right, span);
      return state(over ? dividedBy(left.written, by) : scaled(left.written, by));
    }
    if (left.kind === 'operator') {
      const unit = productUnit(left.unit, right.unit, over, span);
      return operator(over ? divideBy(left.written, right.value) : scale(left.written, right.value), unit);
    }
  }
  if (left.kind === 'operator' && right.kind === 'operator') return multiplied(left, right, span);
  if (left.kind === 'state' && right.kind === 'operator') {
    throw new ExpressionError(
      span,
      'A unitary acts on the state behind it. Write it in front, such as hadamard H.',
    );
  }
  throw new ExpressionError(span, 'Two states can’t be multiplied. Put + or − between them.');
}

function multiplied(left: OperatorValue, right: OperatorValue, span: Span): OperatorValue {
  return operator(times(left.written, right.written), productUnit(left.unit, right.unit, false, span));
}

function applied(left: OperatorValue, right: StateValue, span: Span): StateValue {
  if (left.unit === 'angle') {
    throw new ExpressionError(span, 'An angle stands before this unitary. Write exp(-i …) of both.');
  }
  unitaryPart(left.written, span, 'What acts on this state');
  return state(applyTo(left.written, right.written));
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
