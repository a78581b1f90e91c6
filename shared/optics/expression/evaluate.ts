import { translateJones } from '../convention';
import { jonesNorm, type JonesVector } from '../jones';
import { squareRoot, wholePower } from './complex';
import { call, exponentiate } from './evaluate-call';
import { evaluateProduct } from './evaluate-product';
import { evaluateSum } from './evaluate-sum';
import { axisVector, gate, shortestTurn } from './gates';
import { adjoint, fromEntries, type Polar, wholeOperatorPower } from './operator';
import { ExpressionError } from './span';
import { ketState, namedState } from './states';
import type { Node } from './tree';
import { unitaryPart } from './unitary-text';
import {
  capital,
  checkFinite,
  kindOf,
  number,
  operator,
  type OperatorValue,
  plainNumber,
  real,
  realOf,
  type Scope,
  state,
  textOf,
  type Value,
} from './values';

/**
 * The state that a tree describes, in the canonical frame, not normalised.
 * @throws ExpressionError at the part that is no state, has no unit, overflows or vanishes.
 */
export function evaluateState(tree: Node, scope: Scope): JonesVector {
  const value = evaluate(tree, scope);
  if (value.kind === 'operator') {
    const text = textOf(tree, scope);
    const acting = tree.kind === 'sum' || tree.kind === 'turn' ? `(${text}) H` : `${text} H`;
    throw new ExpressionError(
      tree.span,
      'This is a unitary, not a state. Write the state it acts on behind it, such as hadamard H.',
      acting,
    );
  }
  if (value.kind !== 'state') {
    throw new ExpressionError(
      tree.span,
      `This is ${kindOf(value)}, not a state. Write the state it belongs to, such as H or |+i>.`,
    );
  }
  const norm = jonesNorm(value.written);
  if (norm === 0) {
    throw new ExpressionError(tree.span, 'Nothing is left of this state: its parts cancel or are zero.');
  }
  return translateJones(value.written, scope.convention);
}

/**
 * The unitary that a tree describes, as written, with the factor that was taken out of it.
 * @throws ExpressionError at the part that is no unitary, has no unit or overflows.
 */
export function evaluateUnitary(tree: Node, scope: Scope): Polar {
  const value = evaluate(tree, scope);
  if (value.kind === 'operator') {
    if (value.unit === 'angle') {
      throw new ExpressionError(tree.span, 'An angle stands before this unitary. Write exp(-i …) of both.');
    }
    return unitaryPart(value.written, tree.span, tree.kind === 'matrix' ? 'This matrix' : 'This');
  }
  if (value.kind === 'state') throw notUnitary(tree, scope);
  throw new ExpressionError(
    tree.span,
    `This is ${kindOf(value)}, not a unitary. Write the gate it belongs to, such as X, identity or rotate(z, 45deg).`,
  );
}

function notUnitary(tree: Node, scope: Scope): ExpressionError {
  const text = textOf(tree, scope);
  if (tree.kind === 'state' && tree.name === 'H') {
    return new ExpressionError(
      tree.span,
      'H is horizontal light here, a state. The gate is written hadamard.',
      'hadamard',
    );
  }
  return new ExpressionError(
    tree.span,
    `This is a state, not a unitary. Write what turns the light, such as X, rotate(D, 90deg) or from H to D.`,
    `from H to ${text}`,
  );
}

export function evaluate(node: Node, scope: Scope): Value {
  const value = evaluateUnchecked(node, scope);
  checkFinite(value, node.span);
  return value;
}

function evaluateUnchecked(node: Node, scope: Scope): Value {
  switch (node.kind) {
    case 'number':
      return real(node.value);
    case 'constant':
      if (node.name === 'i') return number({ re: 0, im: 1 });
      if (node.name === 'pi') return number({ re: Math.PI, im: 0 }, 'pi');
      return real(Math.E);
    case 'unit':
      return number({ re: node.name === 'deg' ? Math.PI / 180 : 1, im: 0 }, 'angle');
    case 'state':
      return state(namedState(node.name, scope.convention));
    case 'ket':
      return state(ketState(node.label, scope.convention));
    case 'gate':
      return operator(gate(node.name));
    case 'sum':
      return evaluateSum(
        node.terms.map(({ negative, node: term }) => ({
          negative,
          node: term,
          value: evaluate(term, scope),
        })),
        scope,
      );
    case 'product':
      return evaluateProduct(
        // Literals rather than a spread, which was measured to take three times as long.
        node.factors.map(({ join, node: factor }) => ({
          join,
          node: factor,
          value: evaluate(factor, scope),
        })),
        scope,
      );
    case 'power':
      return evaluatePower(node.base, node.exponent, scope);
    case 'dagger':
      return operator(adjoint(plainOperator(evaluate(node.base, scope), node.base).written));
    case 'call': {
      const args = node.args.map((arg) => ({ node: arg, value: evaluate(arg, scope) }));
      return call(node.name, args, node.span, scope);
    }
    case 'column': {
      const [a, b] = node.entries.map((entry) => plainNumber(evaluate(entry, scope), entry.span).value);
      if (a === undefined || b === undefined) throw new ExpressionError(node.span, 'A column has two parts.');
      return state({ aRe: a.re, aIm: a.im, bRe: b.re, bIm: b.im });
    }
    case 'matrix':
      return evaluateMatrix(node, scope);
    case 'turn':
      return operator(
        shortestTurn(stateOf(node.from, scope), stateOf(node.to, scope), node.span, scope.convention),
      );
    case 'axis':
      return { kind: 'axis', bloch: axisVector(node.name) };
    case 'vector':
      return evaluateVector(node, scope);
  }
}

function evaluateMatrix(node: Node & { kind: 'matrix' }, scope: Scope): Value {
  const [a, b, c, d] = node.rows.flat().map((entry) => plainNumber(evaluate(entry, scope), entry.span).value);
  if (a === undefined || b === undefined || c === undefined || d === undefined) {
    throw new ExpressionError(node.span, 'A matrix has two rows of two parts.');
  }
  const written = fromEntries(a, b, c, d);
  checkFinite(operator(written), node.span);
  // Here rather than at the end, so that the error stands at the matrix and not at the product it is part of.
  unitaryPart(written, node.span, 'This matrix');
  return operator(written);
}

function evaluateVector(node: Node & { kind: 'vector' }, scope: Scope): Value {
  const [x = 0, y = 0, z = 0] = node.entries.map((entry) => realOf(evaluate(entry, scope), entry.span));
  const largest = Math.max(Math.abs(x), Math.abs(y), Math.abs(z));
  if (largest === 0) {
    throw new ExpressionError(
      node.span,
      'This vector is zero and points nowhere. Write an axis such as [1, 0, 1].',
    );
  }
  const [nx, ny, nz] = [x / largest, y / largest, z / largest];
  const length = Math.sqrt(nx * nx + ny * ny + nz * nz);
  return { kind: 'axis', bloch: [nx / length, ny / length, nz / length] };
}

/** A state that isn't zero, where only a state will do. */
function stateOf(node: Node, scope: Scope): JonesVector {
  const value = evaluate(node, scope);
  if (value.kind !== 'state') {
    throw new ExpressionError(
      node.span,
      `${capital(kindOf(value))} stands here where a state is wanted: from … to … takes two states, such as from H to D.`,
    );
  }
  if (jonesNorm(value.written) === 0) throw new ExpressionError(node.span, 'Nothing is left of this state.');
  return value.written;
}

function plainOperator(value: Value, node: Node): OperatorValue {
  if (value.kind !== 'operator') {
    throw new ExpressionError(
      node.span,
      `A dagger turns a unitary back, and this is ${kindOf(value)}. Write it behind a unitary, such as S†.`,
    );
  }
  if (value.unit !== 'angle') return value;
  throw new ExpressionError(node.span, 'An angle stands before this unitary. Write exp(-i …) of both.');
}

// Above this a power of anything but 1 overflows or vanishes.
const LARGEST_POWER = 1_000_000;

function evaluatePower(base: Node, exponent: Node, scope: Scope): Value {
  if (base.kind === 'constant' && base.name === 'e') {
    return exponentiate({ node: exponent, value: evaluate(exponent, scope) }, scope);
  }
  const based = evaluate(base, scope);
  const power = realOf(evaluate(exponent, scope), exponent.span);
  const whole = Number.isInteger(power) && Math.abs(power) <= LARGEST_POWER;
  if (based.kind === 'operator') {
    const { written } = plainOperator(based, base);
    if (whole) return operator(wholeOperatorPower(written, power));
    throw new ExpressionError(
      exponent.span,
      'Powers of a unitary are whole numbers here, such as 2 or −1; roots are sqrtX, sqrtY and sqrtZ.',
    );
  }
  const { value } = plainNumber(based, base.span);
  if (whole) return number(wholePower(value, power));
  if (Number.isInteger(2 * power) && Math.abs(power) <= LARGEST_POWER) {
    return number(wholePower(squareRoot(value), 2 * power));
  }
  throw new ExpressionError(
    exponent.span,
    'Powers are whole or half numbers here, such as 2, −1 or 1/2; of e they are any number.',
  );
}
