import { describe, expect, test } from 'vitest';
import {
  compose,
  conjugate,
  type Convention,
  DEFAULT_CONVENTION,
  formatUnitary,
  IDENTITY,
  infidelityBetween,
  parseState,
  parseStokes,
  parseUnitary,
  type Quaternion,
  radians,
  rotate,
  stackQuaternion,
  blochToStokes,
  stokesToBloch,
  type UnitaryReading,
} from '../../shared/optics';
import { unitaryShortfall } from '../../shared/optics/goal';
import { angleText, stateText, unitaryText } from './expression-generator';
import { randomStream } from './independent';

type Read = Extract<UnitaryReading, { ok: true }>;

const OTHER_PHASE: Convention = { ...DEFAULT_CONVENTION, phase: 'wt-kz' };
const DEGREE = Math.PI / 180;

function read(source: string, convention = DEFAULT_CONVENTION): Read {
  const reading = parseUnitary(source, convention);
  if (!reading.ok) throw new Error(`${source}: column ${reading.error.column}: ${reading.error.message}`);
  return reading;
}

function stokes(source: string, convention = DEFAULT_CONVENTION): readonly [number, number, number] {
  const reading = parseState(source, convention);
  if (!reading.ok) throw new Error(`${source}: column ${reading.error.column}: ${reading.error.message}`);
  return reading.stokes;
}

function complaint(source: string): string {
  const reading = parseUnitary(source, DEFAULT_CONVENTION);
  if (reading.ok) throw new Error(`${source} was read as ${reading.canonical}`);
  const { column, message, suggestion } = reading.error;
  return `${column}: ${message}${suggestion === undefined ? '' : ` ⇒ ${suggestion}`}`;
}

function same(one: Quaternion, other: Quaternion, why: string): void {
  expect(unitaryShortfall(one, other), why).toBeLessThan(1e-28);
}

describe('ways of writing', () => {
  test.each([
    [
      'X',
      '√X √X',
      'sqrt(X)^2',
      'matrix [[0, 1], [1, 0]]',
      'rotate(x, 180deg)',
      'hwp(45deg)',
      '-3i X',
      'X^-1',
      'exp(i 90° X)',
    ],
    ['Y', 'i X Z', 'rotate(|+i>, π)', 'matrix [[0, -i], [i, 0]]', 'exp(-i pi/2 Y)', 'X·Z', '√Y^2'],
    [
      'Z',
      'S^2',
      'T^4',
      'hwp(0deg)',
      'hadamard X hadamard',
      'rotate(H, 180deg)',
      'sqrtZ sqrtZ',
      'zyz(pi, 0deg, 0deg)',
    ],
    ['S', 'T T', 'qwp(0deg)', 'e^(-i 45deg Z)', 'S^5', 'S†^3', 'matrix [[1, 0], [0, i]]'],
    [
      'dagger(S)',
      'S†',
      'S dagger',
      'S^dagger',
      'S^†',
      'S^-1',
      'S^3',
      'S†††',
      'qwp(90deg)',
      'rotate(z, -90deg)',
    ],
    [
      'hadamard',
      '(X + Z)/√2',
      'hwp(22.5deg)',
      'rotate([1, 0, 1], 180deg)',
      'exp(-i 90deg/√2 (X + Z))',
      'matrix [[5, 5], [5, -5]]',
    ],
    [
      'sqrtX',
      'qwp(45deg)',
      'rotate(D, 90deg)',
      'from |+i> to H',
      '(identity - i X)/sqrt(2)',
      'dagger(sqrtX^3)',
    ],
    ['rotate(y, 90deg)', 'from H to D', 'from D to V', 'sqrtY', 'zyz(0deg, 90deg, 0deg)', 'rotate(-y, -90°)'],
    [
      'rotate([0, 0, 2], 30deg)',
      'rotate(z, 30deg)',
      'rotate(|0>, 30deg)',
      'rotate(−z, −30deg)',
      'plate(30deg, 0deg)',
    ],
  ])('%s', (...ways) => {
    const [first = '', ...others] = ways;
    for (const other of others) same(read(first).quaternion, read(other).quaternion, `${first} = ${other}`);
  });
});

test('the right one of a matrix product acts first, the left plate of a list', () => {
  expect(stokes('hadamard S D')).toEqual(stokes('hadamard (S D)'));
  const [q, h] = ['qwp(20deg)', 'hwp(35deg)'];
  same(read(`${q} ${h}`).quaternion, read(`${h}*${q}`).quaternion, 'a list is a product the other way round');
  const plates = [
    { retardanceRad: radians(Math.PI / 2), fastAxisRad: radians(20 * DEGREE) },
    { retardanceRad: radians(Math.PI), fastAxisRad: radians(35 * DEGREE) },
    { retardanceRad: radians(100 * DEGREE), fastAxisRad: radians(70 * DEGREE) },
  ];
  same(
    read(`${q} ${h} plate(100deg, 70deg)`).quaternion,
    stackQuaternion(plates),
    'the stack of the library',
  );
  same(
    read(`i ${q} ${h}`).quaternion,
    read(`(${q} ${h}) (2)`).quaternion,
    'numbers beside a list only scale it',
  );
  expect(infidelityBetween(stokes(`${q} ${h} V`), stokes(`${h} · (${q} V)`))).toBeLessThan(1e-30);
});

test('a product, a dagger, a power and the action on light are those of the turn of the sphere', () => {
  const random = randomStream(11);
  for (let k = 0; k < 2000; k += 1) {
    const lab = k % 2 === 0 ? DEFAULT_CONVENTION : OTHER_PHASE;
    const [a, b] = [unitaryText(random, 2), unitaryText(random, 2)];
    const [one, other] = [parseUnitary(a, lab), parseUnitary(b, lab)];
    if (!one.ok || !other.ok) continue;
    const [p, q] = [one.quaternion, other.quaternion];
    same(read(`(${a})·(${b})`, lab).quaternion, compose(p, q), `${a} times ${b}`);
    same(read(`dagger(${a})`, lab).quaternion, conjugate(p), `${a} back`);
    same(read(`(${a})^3`, lab).quaternion, compose(p, compose(p, p)), `${a} thrice`);
    same(read(`(${a})^-1·(${a})`, lab).quaternion, IDENTITY, `${a} and back`);
    const light = stateText(random, 0);
    const moved = stokes(`(${a}) (${light})`, lab);
    const turned = blochToStokes(rotate(p, stokesToBloch(stokes(light, lab))));
    expect(infidelityBetween(moved, turned), `${a} on ${light}`).toBeLessThan(1e-26);
  }
});

test('plates and shortest turns are the same light’s in each convention; gates and axes follow the phase as written', () => {
  const random = randomStream(12);
  for (let k = 0; k < 300; k += 1) {
    const plates = `plate(${angleText(random)}, ${angleText(random)}) qwp(${angleText(random)})`;
    same(read(plates).quaternion, read(plates, OTHER_PHASE).quaternion, plates);
  }
  for (const physical of ['from H to linear(20deg)', 'from L to D', 'from ellipse(10deg, 20deg) to R']) {
    same(read(physical).quaternion, read(physical, OTHER_PHASE).quaternion, physical);
  }
  for (const written of [
    'S',
    'T',
    'sqrtX',
    'rotate(x, 30deg)',
    'zyz(20deg, 30deg, 40deg)',
    'rotate(D, 40deg)',
  ]) {
    const { w, x, y, z } = read(written).quaternion;
    same(read(written, OTHER_PHASE).quaternion, { w, x: -x, y, z: -z }, `${written}, conjugated`);
  }
  // The axis of a state is that light: it stays where it is, under either phase.
  for (const lab of [DEFAULT_CONVENTION, OTHER_PHASE]) {
    for (const axis of ['L', 'D', 'ellipse(20deg, 30deg)', '|+i>']) {
      expect(
        infidelityBetween(stokes(`rotate(${axis}, 70deg) (${axis})`, lab), stokes(axis, lab)),
      ).toBeLessThan(1e-30);
    }
  }
  expect(read('S', OTHER_PHASE).matrix).toEqual(read('S').matrix);
});

test('the matrix is as written with determinant 1, the quaternion begins with a positive part', () => {
  const [re, im] = read('S').matrix[0][0];
  expect(re).toBeCloseTo(Math.SQRT1_2, 15);
  expect(im).toBeCloseTo(-Math.SQRT1_2, 15);
  for (const source of [
    'X',
    'Y',
    '-Z',
    '-identity',
    'i hadamard',
    'rotate(x, 359deg)',
    'rotate(z, 540deg)',
  ]) {
    const { w, x, y, z } = read(source).quaternion;
    const first = [w, x, y, z].find((part) => Math.abs(part) > 1e-9);
    expect(first, source).toBeGreaterThan(0);
    expect(Math.hypot(w, x, y, z)).toBeCloseTo(1, 15);
  }
  expect(Object.is(read('-X').quaternion.w, -0)).toBe(false);
});

test('a factor is taken out and shown', () => {
  expect(read('matrix [[1, 1], [1, -1]]')).toMatchObject({
    normalised: true,
    canonical: 'matrix [[1, 1], [1, -1]]',
  });
  expect(read('matrix [[1, 1], [1, -1]]').scale).toBeCloseTo(Math.SQRT2, 15);
  expect(read('-0.5i X').scale).toBe(0.5);
  expect(read('1e-200 X').scale).toBeCloseTo(1e-200, 212);
  expect(read('e^(i 20deg) X')).toMatchObject({ normalised: false });
  expect(read('(X + Z)/sqrt(2)').normalised).toBe(false);
});

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

test('a gate is called by its name, another turn by its axis and angle', () => {
  const text = (source: string): string => formatUnitary(read(source).quaternion, DEFAULT_CONVENTION);
  expect(
    ['T T T T', 'S^3', 'hwp(22.5deg)', 'T^-1', 'rotate(y, 90deg)', 'zyz(0deg, 0deg, 0deg)'].map(text),
  ).toEqual(['Z', 'dagger(S)', 'hadamard', 'dagger(T)', 'sqrtY', 'identity']);
  expect(text('rotate([2, 2, -2], 40deg)')).toBe('rotate([1, 1, -1], 40deg)');
  expect(text('rotate(x, 350deg)')).toBe('rotate(x, -10deg)');
});

test('partly polarised light is read for comparison, in the lab’s sign of S3, and is never longer than 1', () => {
  expect(parseStokes('stokes(0.3, 0, 0.4)', DEFAULT_CONVENTION)).toMatchObject({
    ok: true,
    stokes: [0.3, 0, 0.4],
  });
  const plusIsR: Convention = { ...DEFAULT_CONVENTION, s3Sign: 'R' };
  expect(parseStokes('stokes(0.3, 0, 0.4)', plusIsR)).toMatchObject({ ok: true, stokes: [0.3, 0, -0.4] });
  expect(parseStokes('stokes(0, 0, 0)', DEFAULT_CONVENTION)).toMatchObject({ ok: true, stokes: [0, 0, 0] });
  const rounded = parseStokes('stokes(0.5774, 0.5774, 0.5774)', DEFAULT_CONVENTION);
  expect(rounded.ok && Math.hypot(...rounded.stokes)).toBeCloseTo(1, 15);
  expect(parseStokes('stokes(1, 1, 0)', DEFAULT_CONVENTION)).toMatchObject({
    ok: false,
    error: { column: 1 },
  });
  expect(parseStokes('stokes(1, 1, 1)', plusIsR)).toMatchObject({
    ok: false,
    error: { suggestion: 'stokes(0.57735, 0.57735, 0.57735)' },
  });
  expect(parseStokes('hadamard H', DEFAULT_CONVENTION)).toMatchObject({ ok: true });
  expect(parseStokes('stokes(i, 0, 0)', DEFAULT_CONVENTION)).toMatchObject({
    ok: false,
    error: { column: 8 },
  });
  expect(parseStokes('X', DEFAULT_CONVENTION)).toMatchObject({ ok: false });
});
