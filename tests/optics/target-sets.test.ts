import { expect, test } from 'vitest';
import {
  type Convention,
  DEFAULT_CONVENTION,
  infidelityBetween,
  parseState,
  parseUnitary,
} from '../../shared/optics';
import { unitaryShortfall } from '../../shared/optics/goal';
import { compose, type Quaternion } from '../../shared/optics/quaternion';
import { seededStream } from '../../shared/optics/uniform-stream';
import {
  cliffordTurns,
  greatCircle,
  haarStates,
  haarUnitaries,
  pauliStates,
  type TargetRow,
  tetrahedron,
  twoConjugateBases,
} from '../../shared/optics/target-sets';

const OTHER: Convention = { phase: 'wt-kz', handedness: 'source', s3Sign: 'R' };
const LABS = [
  DEFAULT_CONVENTION,
  OTHER,
  { ...DEFAULT_CONVENTION, s3Sign: 'R' },
] satisfies readonly Convention[];

type Vector = readonly [number, number, number];

function vectors(rows: readonly TargetRow[], lab: Convention): Vector[] {
  return rows.map(({ expression, label }) => {
    expect(label).toMatch(/^.{1,24}$/u);
    const reading = parseState(expression, lab);
    if (!reading.ok) throw new Error(`${expression}: ${reading.error.message}`);
    return reading.stokes;
  });
}

function turns(rows: readonly TargetRow[], lab: Convention): Quaternion[] {
  return rows.map(({ expression }) => {
    const reading = parseUnitary(expression, lab);
    if (!reading.ok) throw new Error(`${expression}: ${reading.error.message}`);
    return reading.quaternion;
  });
}

const dot = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((sum, part, k) => sum + part * (b[k] ?? NaN), 0);

function circle(pole: string, startAzimuthDeg: number, count: number, lab: Convention): Vector[] {
  const set = greatCircle({ pole, startAzimuthDeg, count }, lab);
  if (!set.ok) throw new Error(set.error.message);
  return vectors(set.rows, lab);
}

/**
 * The condition number of (S0…S3) → probabilities with rows ½(1, n). For these sets AᵀA is diagonal, so the singular values are
 * the lengths of the columns.
 */
function conditionNumber(set: readonly Vector[]): number {
  const columns = [0, 1, 2, 3].map((k) => set.map((n) => (k === 0 ? 1 : (n[k - 1] ?? NaN)) / 2));
  const lengths = columns.map((column) => Math.sqrt(dot(column, column)));
  columns.forEach((a, i) =>
    columns.forEach((b, j) => i < j && expect(Math.abs(dot(a, b))).toBeLessThan(1e-15)),
  );
  return Math.max(...lengths) / Math.min(...lengths);
}

// references.md 8: condition √3 for the six states and the tetrahedron; overlaps 1/3 and n·n = −1/3 (Renes et al. 2004).
test('the six Pauli states and both tetrahedra have condition number √3, the tetrahedra overlaps of 1/3', () => {
  for (const lab of LABS) {
    expect(conditionNumber(vectors(pauliStates(), lab))).toBeCloseTo(Math.sqrt(3), 14);
    for (const orientation of ['one at H', 'corners of a cube'] as const) {
      const set = vectors(tetrahedron(orientation, lab), lab);
      expect(conditionNumber(set)).toBeCloseTo(Math.sqrt(3), 14);
      set.forEach((a, i) =>
        set.forEach((b, j) => {
          if (i === j) return;
          expect(dot(a, b)).toBeCloseTo(-1 / 3, 14);
          expect(1 - infidelityBetween(a, b)).toBeCloseTo(1 / 3, 14);
        }),
      );
    }
  }
});

test('the tetrahedra stand as published, and are the same light in every convention', () => {
  const [first, second] = vectors(tetrahedron('one at H', DEFAULT_CONVENTION), DEFAULT_CONVENTION);
  expect(first).toEqual([1, 0, 0]);
  // Bloch (2√2/3, 0, −1/3) is (S2, S3, S1).
  expect(second?.[0]).toBeCloseTo(-1 / 3, 15);
  expect(second?.[1]).toBeCloseTo((2 * Math.SQRT2) / 3, 15);
  for (const lab of LABS) {
    for (const orientation of ['one at H', 'corners of a cube'] as const) {
      const here = vectors(tetrahedron(orientation, lab), lab);
      vectors(tetrahedron(orientation, DEFAULT_CONVENTION), DEFAULT_CONVENTION).forEach((n, k) =>
        expect(infidelityBetween(n, here[k] ?? [0, 0, 0])).toBeLessThan(1e-30),
      );
    }
  }
});

test('two conjugate bases: opposite within a base, half of each in the other', () => {
  for (const pair of ['HV/DA', 'HV/RL', 'DA/RL'] as const) {
    const rows = twoConjugateBases(pair);
    expect(rows.map(({ label }) => label).join('')).toBe(pair.replace('/', ''));
    const [a = [0, 0, 0], b = [0, 0, 0], c = [0, 0, 0], d = [0, 0, 0]] = vectors(rows, OTHER);
    expect(
      [dot(a, b), dot(c, d), dot(a, c), dot(a, d), dot(b, c)].map((part) => Number(part.toFixed(14)) + 0),
    ).toEqual([-1, -1, 0, 0, 0]);
  }
});

test('a great circle is evenly spaced, at right angles to its pole, and begins where it is told', () => {
  for (const lab of LABS) {
    for (const [pole, count] of [
      ['equator', 8],
      ['D', 5],
      ['ellipse(20deg, 15deg)', 200],
      ['R', 2],
      ['H', 7],
    ] as const) {
      const set = circle(pole, 10, count, lab);
      const [axis = [0, 0, 1]] = pole === 'equator' ? [] : vectors([{ label: 'p', expression: pole }], lab);
      expect(set).toHaveLength(count);
      set.forEach((n, k) => {
        expect(Math.abs(dot(n, axis))).toBeLessThan(1e-12);
        expect(dot(n, set[(k + 1) % count] ?? [0, 0, 0])).toBeCloseTo(Math.cos((2 * Math.PI) / count), 11);
      });
    }
    const linear = greatCircle({ pole: 'equator', startAzimuthDeg: 22.5, count: 4 }, lab);
    expect(linear.ok && linear.rows.map(({ expression }) => expression)).toEqual([
      'linear(22.5deg)',
      'linear(67.5deg)',
      'linear(-67.5deg)',
      'linear(-22.5deg)',
    ]);
    const meridian = greatCircle({ pole: 'D', startAzimuthDeg: 0, count: 2 }, lab);
    expect(meridian.ok && meridian.rows.map(({ expression }) => expression)).toEqual(['H', 'V']);
  }
  expect(greatCircle({ pole: 'Q', startAzimuthDeg: 0, count: 4 }, OTHER)).toMatchObject({
    ok: false,
    error: { column: 1 },
  });
  expect(() => greatCircle({ pole: 'H', startAzimuthDeg: 0, count: 1 }, OTHER)).toThrow(RangeError);
  expect(() => greatCircle({ pole: 'H', startAzimuthDeg: NaN, count: 3 }, OTHER)).toThrow(RangeError);
});

test('drawn states repeat with their seed, are the same light in every convention, and a longer draw begins alike', () => {
  const rows = haarStates({ count: 50, seed: 7 }, DEFAULT_CONVENTION);
  expect(haarStates({ count: 50, seed: 7 }, DEFAULT_CONVENTION)).toEqual(rows);
  expect(haarStates({ count: 50, seed: 8 }, DEFAULT_CONVENTION)).not.toEqual(rows);
  expect(haarStates({ count: 50, seed: 7 + 2 ** 40 }, DEFAULT_CONVENTION)).not.toEqual(rows);
  const longer = haarStates({ count: 99, seed: 7 }, DEFAULT_CONVENTION);
  expect(longer.slice(0, 50)).toEqual(rows);
  const here = vectors(rows, DEFAULT_CONVENTION);
  vectors(haarStates({ count: 50, seed: 7 }, OTHER), OTHER).forEach((n, k) =>
    expect(infidelityBetween(n, here[k] ?? [0, 0, 0])).toBeLessThan(1e-24),
  );
  // Worked out apart from this code, in Python's integers, from splitmix64 and xoshiro128** as their authors print them.
  expect(haarStates({ count: 1, seed: 1 }, DEFAULT_CONVENTION)[0]?.expression).toBe(
    'ellipse(54.8906279097418deg, 25.7524524050129deg)',
  );
  for (const bad of [
    { count: 0, seed: 1 },
    { count: 201, seed: 1 },
    { count: 1.5, seed: 1 },
    { count: 3, seed: -1 },
    { count: 3, seed: 0.5 },
  ]) {
    expect(() => haarStates(bad, OTHER)).toThrow(RangeError);
    expect(() => haarUnitaries(bad, OTHER)).toThrow(RangeError);
  }
});

/** Whether a mean of n draws lies within five standard errors of its expectation. */
function isFair(draws: readonly number[], mean: number, variance: number): void {
  const found = draws.reduce((sum, draw) => sum + draw, 0) / draws.length;
  expect(Math.abs(found - mean)).toBeLessThan(5 * Math.sqrt(variance / draws.length));
}

test('drawn states are spread as Haar: first, second and fourth moments of each Stokes parameter', () => {
  const drawn = Array.from({ length: 100 }, (_, seed) =>
    vectors(haarStates({ count: 200, seed }, DEFAULT_CONVENTION), DEFAULT_CONVENTION),
  ).flat();
  for (const k of [0, 1, 2] as const) {
    // Each coordinate is uniform on [−1, 1].
    isFair(
      drawn.map((n) => n[k]),
      0,
      1 / 3,
    );
    isFair(
      drawn.map((n) => n[k] ** 2),
      1 / 3,
      1 / 5 - 1 / 9,
    );
    isFair(
      drawn.map((n) => n[k] ** 4),
      1 / 5,
      1 / 9 - 1 / 25,
    );
    const other = ([1, 2, 0] as const)[k];
    isFair(
      drawn.map((n) => n[k] * n[other]),
      0,
      1 / 15,
    );
  }
});

test('drawn unitaries are spread as Haar: even moments of each quaternion part, and tr U', () => {
  const drawn = Array.from({ length: 100 }, (_, seed) =>
    turns(haarUnitaries({ count: 200, seed }, OTHER), OTHER),
  ).flat();
  for (const part of ['w', 'x', 'y', 'z'] as const) {
    // On the 3-sphere E q² = 1/4, E q⁴ = 1/8, E q⁸ = 7/128.
    isFair(
      drawn.map((q) => q[part] ** 2),
      1 / 4,
      1 / 8 - 1 / 16,
    );
    isFair(
      drawn.map((q) => q[part] ** 4),
      1 / 8,
      7 / 128 - 1 / 64,
    );
  }
  isFair(
    drawn.map((q) => q.x * q.z),
    0,
    1 / 24,
  );
  isFair(
    drawn.map((q) => q.w * q.y),
    0,
    1 / 24,
  );
});

test('the stream is even: mean, variance and neighbours of a hundred thousand numbers', () => {
  for (const seed of [0, 1, 2, 2 ** 31, 2 ** 32, 2 ** 52]) {
    const next = seededStream(seed);
    const drawn = Array.from({ length: 100_000 }, next);
    expect(Math.min(...drawn.slice(0, 50_000))).toBeGreaterThanOrEqual(0);
    isFair(drawn, 1 / 2, 1 / 12);
    isFair(
      drawn.map((u) => u * u),
      1 / 3,
      1 / 5 - 1 / 9,
    );
    isFair(
      drawn.slice(1).map((u, k) => (u - 0.5) * ((drawn[k] ?? NaN) - 0.5)),
      0,
      1 / 144,
    );
  }
  expect(seededStream(0)()).not.toBe(seededStream(2 ** 32)());
});

test('the Clifford turns are 24, all different, closed under products, and move the six states among themselves', () => {
  for (const lab of LABS) {
    const rows = cliffordTurns();
    expect(rows.every(({ expression }) => expression.startsWith('rotate('))).toBe(true);
    const group = turns(rows, lab);
    expect(group).toHaveLength(24);
    group.forEach((a, i) =>
      group.forEach((b, j) => {
        if (i !== j) expect(unitaryShortfall(a, b)).toBeGreaterThan(0.1);
        expect(Math.min(...group.map((c) => unitaryShortfall(compose(a, b), c)))).toBeLessThan(1e-28);
      }),
    );
  }
});
