import { expect, test } from 'vitest';
import { DEFAULT_CONVENTION, infidelityBetween, parseState, parseUnitary } from '../../shared/optics';
import { unitaryShortfall } from '../../shared/optics/goal';
import { read, stokes } from './unitary-reading';

function complaint(source: string): string {
  const reading = parseUnitary(source, DEFAULT_CONVENTION);
  if (reading.ok) throw new Error(`${source} was read as ${reading.canonical}`);
  const { column, message, suggestion } = reading.error;
  return `${column}: ${message}${suggestion === undefined ? '' : ` ⇒ ${suggestion}`}`;
}

test('what is not unitary is told its distance and offered the nearest unitary, which reads', () => {
  const reading = parseUnitary('X * matrix [[1, 0.1], [0, 1]]', DEFAULT_CONVENTION);
  if (reading.ok) throw new Error('read');
  const {
    column,
    length,
    distanceFromUnitary = NaN,
    nearestUnitary = '',
    suggestion,
    message,
  } = reading.error;
  expect([column, length]).toEqual([5, 25]);
  expect(suggestion).toBe(nearestUnitary);
  expect(message).toContain('0.0706 away');
  // M/size with singular values a > b, a² + b² = 2 and ab = 1/(1 + 0.1²/2).
  const [square, product] = [2, 1 / 1.005];
  const [sum, gap] = [Math.sqrt(square + 2 * product), Math.sqrt(square - 2 * product)];
  expect(distanceFromUnitary).toBeCloseTo(Math.hypot((sum + gap) / 2 - 1, (sum - gap) / 2 - 1), 14);
  expect(read(nearestUnitary).normalised).toBe(false);
  // [[1, s], [0, 1]] shears; its nearest rotation turns by −atan(s/2).
  const turned = Math.atan(0.05);
  const rotation = { w: Math.cos(turned), x: 0, y: -Math.sin(turned), z: 0 };
  expect(unitaryShortfall(read(nearestUnitary).quaternion, rotation)).toBeLessThan(1e-24);
});

test('of a matrix whose determinant is 0 one of many nearest unitaries is offered, and said to be', () => {
  for (const source of ['matrix [[1, 1], [1, 1]]', 'matrix [[i, i], [i, i]]', 'matrix [[0, i], [0, 0]]']) {
    const reading = parseUnitary(source, DEFAULT_CONVENTION);
    if (reading.ok) throw new Error(`${source} was read`);
    // A matrix of one singular value √2, and a unitary: the other is missing whole.
    expect(reading.error.distanceFromUnitary).toBeCloseTo(Math.hypot(Math.SQRT2 - 1, 1), 12);
    expect(reading.error.message).toContain('many are as near');
    expect(read(reading.error.nearestUnitary ?? '').normalised).toBe(false);
  }
  expect(complaint('matrix [[1, 0.1], [0, 1]]')).not.toContain('many are as near');
});

test('errors say what, where and what to write', () => {
  expect(complaint('')).toMatch(/^1: Nothing is written here\. Write a unitary/);
  expect(complaint('H')).toBe(
    '1: H is horizontal light here, a state. The gate is written hadamard. ⇒ hadamard',
  );
  expect(complaint('D + i A')).toMatch(/^1: This is a state, not a unitary\..* ⇒ from H to D \+ i A$/);
  expect(complaint('hadamard H')).toMatch(/a state, not a unitary/);
  expect(complaint('0.5')).toMatch(/a number, not a unitary/);
  expect(complaint('45deg')).toMatch(/an angle, not a unitary/);
  expect(complaint('45deg X')).toMatch(/An angle stands before this unitary/);
  expect(complaint('1 + i X')).toMatch(/^1: .*Write which one it weighs: 1 identity\. ⇒ 1 identity$/);
  expect(complaint('X - X')).toMatch(/^1: This is zero/);
  expect(complaint('X + i Y')).toMatch(/^1: This is not unitary.* ⇒ matrix \[\[/);
  expect(complaint('matrix [[0, 0], [0, 0]]')).toMatch(/^1: This matrix is zero/);
  expect(complaint('matrix [[1, 0], [0, 1e309]]')).toMatch(/^21: This number is too large/);
  expect(complaint('matrix [[1e300, 0], [0, 1e300]]^9')).toMatch(/too large to compute with/);
  expect(complaint('matrix [[1, 0, 0], [0, 1]]')).toMatch(/^14: A matrix has two rows of two/);
  expect(complaint('matrix [1, 0]')).toMatch(/^9: A matrix has two rows of two/);
  expect(complaint('[[1, 0], [0, 1]]')).toMatch(/^1: .*matrix \[\[1, 0\], \[0, i\]\]\. ⇒ matrix \[$/);
  expect(complaint('matrix [[H, 0], [0, 1]]')).toMatch(/^10: A state stands here where a number is wanted/);
  expect(complaint('qwp(45)')).toBe('5: 45 of what? Write 45deg or 45rad. ⇒ 45deg');
  expect(complaint('rotate(x, 0.5)')).toMatch(/^11: 0\.5 of what\?/);
  expect(complaint('rotate(X, 5deg)')).toMatch(/^8: A unitary is no axis/);
  expect(complaint('rotate([0, 0, 0], 5deg)')).toMatch(/^8: This vector is zero/);
  expect(complaint('rotate(H - H, 5deg)')).toMatch(/^8: Nothing is left of this state/);
  expect(complaint('rotate([1, 2, 3, 4], 5deg)')).toMatch(/^16: /);
  expect(complaint('rotate([1, 2, 3] + x, 5deg)')).toMatch(/^20: Axes can’t be added/);
  expect(complaint('rotate(2 x, 5deg)')).toMatch(/^10: An axis can’t be multiplied/);
  expect(complaint('rotate(x)')).toMatch(/rotate takes 2 arguments and has 1/);
  expect(complaint('x X')).toMatch(/^1: x is an axis and stands in rotate\(x, 90deg\)/);
  expect(complaint('exp(-i X)')).toMatch(/^5: By what angle does this turn\?/);
  expect(complaint('exp(45deg X)')).toMatch(/^5: This exponent is not i times a real sum/);
  expect(complaint('exp(-i 45deg (X + i Y))')).toMatch(/^5: This exponent is not i times a real sum/);
  expect(complaint('exp(-i 1e9deg X)')).toMatch(/^5: This angle is many thousand turns/);
  expect(complaint('from H to V')).toMatch(/^1: These two states are opposite.* ⇒ rotate\(D, 180deg\)$/);
  expect(complaint('from L to R')).toMatch(/ ⇒ rotate\(H, 180deg\)$/);
  expect(complaint('from ellipse(20deg, 10deg) to ellipse(110deg, -10deg)')).toMatch(
    / ⇒ rotate\(linear\(65deg\), 180deg\)$/,
  );
  expect(complaint('from X to H')).toMatch(/^6: A unitary stands here where a state is wanted/);
  expect(complaint('from H D')).toMatch(/^1: from is followed by/);
  expect(complaint('from H')).toMatch(/^1: from is followed by/);
  expect(complaint('X to H')).toMatch(/^3: "to" belongs behind from/);
  expect(complaint('†S')).toMatch(/^1: A dagger stands behind/);
  expect(complaint('S dagger (T)')).toMatch(
    /^3: Is this the dagger of what is before it or behind it\? .* ⇒ †$/,
  );
  expect(complaint('H†')).toMatch(/^1: A dagger turns a unitary back, and this is a state/);
  expect(complaint('X/Y')).toMatch(/^3: A unitary can’t be divided by/);
  expect(complaint('X^(1/2)')).toMatch(/^3: Powers of a unitary are whole numbers/);
  expect(complaint('sqrt(S)')).toMatch(/^6: A unitary has more than one root/);
  expect(complaint('hadamrad')).toBe('1: "hadamrad" is no name here. Write hadamard. ⇒ hadamard');
  expect(complaint('I')).toMatch(/ ⇒ identity$/);
  expect(complaint('Rx(30deg)')).toMatch(/^1: A turn about x is written rotate\(x, 30deg\)/);
  expect(complaint('QWP(45deg)')).toMatch(/ ⇒ qwp$/);
});

test('a list of plates mixed with a product says how to write either', () => {
  expect(complaint('qwp(1deg) hwp(2deg) X')).toMatch(
    /^1: Plates side by side are a list.* ⇒ \(qwp\(1deg\) hwp\(2deg\)\)\*X$/,
  );
  expect(complaint('X qwp(1deg)')).toMatch(/ ⇒ X\*qwp\(1deg\)$/);
  expect(complaint('qwp(1deg)*hwp(2deg) qwp(3deg)')).toMatch(/^11: /);
  expect(complaint('qwp(1deg) hwp(2deg) * qwp(3deg)')).toMatch(
    / ⇒ \(qwp\(1deg\) hwp\(2deg\)\)\*qwp\(3deg\)$/,
  );
  expect(complaint('qwp(1deg) hwp(2deg)^2')).toMatch(/^1: Plates side by side/);
  expect(read('(qwp(1deg) hwp(2deg))*X').ok).toBe(true);
  expect(read('2 qwp(1deg) * hwp(2deg) * X Y').ok).toBe(true);
});

test('every offer in place of a mistake reads', () => {
  for (const source of [
    'qwp(1deg) hwp(2deg) X',
    'X qwp(1deg)',
    'X + i Y',
    'X matrix [[1, 0.2], [0, 1]]',
    'H',
    'D',
    '1 identity + 2',
    'from D to A',
    'qwp(45)',
    'S dagger (T)',
    'hadamrd',
    'sqrtx',
    '[[1, 0], [0, 1]]',
  ]) {
    const reading = parseUnitary(source, DEFAULT_CONVENTION);
    if (reading.ok) throw new Error(`${source} was read`);
    const { column, length, suggestion } = reading.error;
    if (suggestion === undefined) throw new Error(`${source}: nothing offered`);
    const mended = source.slice(0, column - 1) + suggestion + source.slice(column - 1 + length);
    expect(parseUnitary(mended, DEFAULT_CONVENTION), mended).toMatchObject({ ok: true });
  }
});

test('where a state is wanted a unitary is told to act on one', () => {
  const reading = parseState('(X + Z)/sqrt(2)', DEFAULT_CONVENTION);
  expect(reading).toMatchObject({ ok: false, error: { column: 1, suggestion: '(X + Z)/sqrt(2) H' } });
  expect(infidelityBetween(stokes('(X + Z)/sqrt(2) H'), stokes('D'))).toBeLessThan(1e-30);
  expect(parseState('(X + i Y) H', DEFAULT_CONVENTION)).toMatchObject({
    ok: false,
    error: { column: 1, length: 9 },
  });
  expect(parseState('H X', DEFAULT_CONVENTION)).toMatchObject({ ok: false, error: { column: 3 } });
  expect(parseState('from H to D', DEFAULT_CONVENTION)).toMatchObject({
    ok: false,
    error: { suggestion: '(from H to D) H' },
  });
});
