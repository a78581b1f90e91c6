import { type Convention, sameConvention } from '../optics/convention';
import { formatState, formatUnitary, parseState, parseUnitary } from '../optics/expression';
import { unitaryShortfall } from '../optics/goal';
import { infidelityBetween } from '../optics/stokes';
import type { ProtocolKind } from '../schemas/protocols';

/** Two readings closer than this are one state, or one unitary, that a convention does not touch. */
const sameThing = 1e-24;

/** The same light, or the same unitary, in the words of another convention; what cannot be read stays as it was typed. */
export function translateExpression(
  expression: string,
  kind: ProtocolKind,
  from: Convention,
  to: Convention,
): string {
  if (sameConvention(from, to)) return expression;
  return kind === 'apply' ? translateUnitary(expression, from, to) : translateState(expression, from, to);
}

function translateState(expression: string, from: Convention, to: Convention): string {
  const before = parseState(expression, from);
  if (!before.ok) return expression;
  const after = parseState(expression, to);
  if (after.ok && infidelityBetween(before.stokes, after.stokes) < sameThing) return expression;
  return formatState(before.jones, to);
}

function translateUnitary(expression: string, from: Convention, to: Convention): string {
  const before = parseUnitary(expression, from);
  if (!before.ok) return expression;
  const after = parseUnitary(expression, to);
  if (after.ok && unitaryShortfall(after.quaternion, before.quaternion) < sameThing) return expression;
  return formatUnitary(before.quaternion, to);
}
