import { cos, LARGEST_ANGLE_RAD, sin } from '../elementary';
import { jonesNorm } from '../jones';
import { exponential, squareRoot } from './complex';
import { blochOf, exponentialOf, plate, rotateAbout, zyz } from './gates';
import { ExpressionError } from './span';
import { calledState } from './states';
import type { FunctionName, Node } from './tree';
import {
  angleOf,
  capital,
  kindOf,
  number,
  numberOf,
  operator,
  real,
  realOf,
  type Scope,
  state,
  tooManyTurns,
  unitMissing,
  type Value,
} from './values';
import type { Bloch } from '../stokes';
import { operatorNorm } from './operator';

/** An argument with what it evaluates to. */
export interface Argument {
  readonly node: Node;
  readonly value: Value;
}

/** What a function of the grammar makes of its arguments, whose number the reader has checked. */
export function call(name: FunctionName, args: readonly Argument[], span: Node['span'], scope: Scope): Value {
  const [first] = args;
  if (first === undefined) throw new ExpressionError(span, `${name} needs an argument.`);
  const angles = (from: readonly Argument[]): number[] =>
    from.map(({ value, node }) => angleOf(value, node, scope));
  switch (name) {
    case 'sqrt':
      return root(first);
    case 'cos':
      return real(cos(angleOf(first.value, first.node, scope)));
    case 'sin':
      return real(sin(angleOf(first.value, first.node, scope)));
    case 'exp':
      return exponentiate(first, scope);
    case 'linear':
    case 'bloch':
    case 'ellipse':
      return state(calledState(name, angles(args), span, scope.convention));
    case 'stokes': {
      const parts = args.map(({ value, node }) => realOf(value, node.span));
      return state(calledState('stokes', parts, span, scope.convention));
    }
    case 'rotate': {
      const [angle = 0] = angles(args.slice(1));
      return operator(rotateAbout(axisOf(first), angle));
    }
    case 'zyz': {
      const [a = 0, b = 0, c = 0] = angles(args);
      return operator(zyz(a, b, c));
    }
    case 'qwp':
    case 'hwp':
    case 'plate':
      return operator(plate(name, angles(args), scope.convention));
  }
}

function root({ node, value }: Argument): Value {
  if (value.kind === 'operator') {
    throw new ExpressionError(
      node.span,
      'A unitary has more than one root. The gates with named ones are sqrtX, sqrtY and sqrtZ.',
    );
  }
  const found = numberOf(value, node.span);
  if (found.unit === 'angle') throw new ExpressionError(node.span, 'An angle has no square root here.');
  return number(squareRoot(found.value));
}

/** e to a number, to i times an angle, or to i times an angle times a real sum of Pauli matrices. */
export function exponentiate({ node, value: exponent }: Argument, scope: Scope): Value {
  if (exponent.kind === 'operator') {
    if (exponent.unit === 'none') {
      throw new ExpressionError(
        node.span,
        'By what angle does this turn? Write it with its unit, such as exp(-i 45deg X) or exp(-i pi/4 X).',
      );
    }
    if (operatorNorm(exponent.written) > LARGEST_ANGLE_RAD) throw tooManyTurns(node.span);
    return operator(exponentialOf(exponent.written, node.span));
  }
  const { value, unit } = numberOf(exponent, node.span);
  if (value.im !== 0 && unit === 'none') throw unitMissing(node, scope);
  if (value.re !== 0 && unit === 'angle') {
    throw new ExpressionError(node.span, 'e to an angle needs the i: write e^(i 45deg).');
  }
  if (Math.abs(value.im) > LARGEST_ANGLE_RAD) throw tooManyTurns(node.span);
  return number(exponential(value));
}

function axisOf({ node, value }: Argument): Bloch {
  if (value.kind === 'axis') return value.bloch;
  if (value.kind === 'state') {
    if (jonesNorm(value.written) > 0) return blochOf(value.written);
    throw new ExpressionError(node.span, 'Nothing is left of this state, so it is no axis.');
  }
  throw new ExpressionError(
    node.span,
    `${capital(kindOf(value))} is no axis. Write x, y, z, a Bloch vector such as [1, 0, 1], or a state such as D.`,
  );
}
