import { describe, expect, test } from 'vitest';
import {
  compose,
  conjugate,
  type Convention,
  DEFAULT_CONVENTION,
  formatUnitary,
  IDENTITY,
  infidelityBetween,
  parseStokes,
  parseUnitary,
  type Quaternion,
  radians,
  rotate,
  stackQuaternion,
  blochToStokes,
  stokesToBloch,
} from '../../shared/optics';
import { unitaryShortfall } from '../../shared/optics/goal';
import { angleText, stateText, unitaryText } from './expression-generator';
import { randomStream } from './independent';
import { read, stokes } from './unitary-reading';

const OTHER_PHASE: Convention = { ...DEFAULT_CONVENTION, phase: 'wt-kz' };
const DEGREE = Math.PI / 180;

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
