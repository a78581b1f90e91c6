import { multiply, norm, subtract } from 'mathjs';
import { afterAll, expect, test } from 'vitest';
import {
  linearInversion,
  type LinearInversion,
  type MeasuredCounts,
  type MostLikelyState,
  mostLikelyState,
  type Stokes,
  stokesLength,
} from '../../shared/optics';
import { densityMatrix, fixedPoint, lightOf } from '../optics/plain-tomography';
import { Deviations } from './deviations';

const deviations = new Deviations();
afterAll(() => deviations.print('Tomography of one qubit, worst deviation'));

/*
 * The brief's reference page counts S3 positive for R, clockwise as the receiver sees it; the canonical frame counts it
 * positive for L. Counts are of H, V, D, A, R, L.
 */
const fromRPositive = ([s1, s2, s3]: Stokes): Stokes => [s1, s2, -s3];
const HVDARL = [
  [1, 0, 0],
  [-1, 0, 0],
  [0, 1, 0],
  [0, -1, 0],
  [0, 0, 1],
  [0, 0, -1],
] as const;
const measured = (counts: readonly number[]): MeasuredCounts => ({
  projectors: HVDARL.map(([s1, s2, s3]) => fromRPositive([s1, s2, s3])),
  counts,
  exposures: counts.map(() => 1),
  darkCounts: counts.map(() => 0),
});

function likeliest(data: MeasuredCounts): MostLikelyState {
  const result = mostLikelyState(data);
  if (!result.ok) throw new Error(result.refusal.message);
  return result;
}

function inverted(data: MeasuredCounts): Extract<LinearInversion, { ok: true }> {
  const result = linearInversion(data);
  if (!result.ok) throw new Error(result.refusal.message);
  return result;
}

const furthest = (a: Stokes, b: Stokes): number =>
  Math.max(Math.abs(a[0] - b[0]), Math.abs(a[1] - b[1]), Math.abs(a[2] - b[2]));

/** Section 2.3 of the reference page: computed there by a direct search and by Hradil's iteration, which agree to 1e-8. */
const CHECK_SET: readonly {
  readonly counts: readonly number[];
  readonly linear: Stokes;
  readonly length: number;
  readonly likeliest: Stokes;
  readonly tolerance: number;
}[] = [
  {
    counts: [5120, 4880, 9790, 210, 5300, 4700],
    linear: [0.024, 0.958, 0.06],
    length: 0.960177,
    likeliest: [0.024, 0.958, 0.06],
    tolerance: 1e-7,
  },
  {
    counts: [985, 15, 640, 360, 520, 480],
    linear: [0.97, 0.28, 0.04],
    length: 1.010396,
    likeliest: [0.96469711, 0.26074042, 0.03706641],
    tolerance: 1e-7,
  },
  {
    counts: [995, 5, 600, 400, 450, 550],
    linear: [0.99, 0.2, -0.1],
    length: 1.014938,
    likeliest: [0.98278065, 0.16538916, -0.08239311],
    tolerance: 1e-7,
  },
];

test.each(CHECK_SET)('linear inversion and likeliest state of $counts', (row) => {
  const data = measured(row.counts);
  const linear = inverted(data);
  const offLinear = furthest(linear.stokes, fromRPositive(row.linear));
  expect(deviations.note('Reference page 2.3, linear inversion', offLinear)).toBeLessThan(1e-12);
  expect(Math.abs(stokesLength(linear.stokes) - row.length)).toBeLessThan(5e-7);
  const off = furthest(likeliest(data).stokes, fromRPositive(row.likeliest));
  expect(deviations.note('Reference page 2.3, maximum likelihood', off)).toBeLessThan(row.tolerance);
});

test('the second set is not its linear inversion rescaled, the third is pure', () => {
  const [, second, third] = CHECK_SET;
  if (second === undefined || third === undefined) throw new Error('three sets');
  // Rescaled it would be (0.9600, 0.2771, 0.0396).
  const rescaled = fromRPositive([0.96, 0.2771, 0.0396]);
  expect(furthest(likeliest(measured(second.counts)).stokes, rescaled)).toBeGreaterThan(0.01);
  expect(1 - likeliest(measured(third.counts)).purity).toBeLessThan(1e-9);
});

test('R ρ = G ρ at the maximum: Hradil 1997, with G as settings that do not sum to 1 need it', () => {
  const uneven: MeasuredCounts = {
    ...measured([1985, 15, 640, 360, 520, 1480]),
    exposures: [2, 1, 1, 0.8, 1, 3],
  };
  const four: MeasuredCounts = {
    projectors: [
      [1, 0, 0],
      [-1, 0, 0],
      [0, 1, 0],
      [0, 0, -1],
    ],
    counts: [9000, 1200, 8100, 4400],
    exposures: [1, 1, 1, 1],
    darkCounts: [0, 0, 0, 0],
  };
  for (const data of [...CHECK_SET.map(({ counts }) => measured(counts)), uneven, four]) {
    const { intensity, stokes } = likeliest(data);
    const { r, g } = fixedPoint(data, lightOf(intensity, stokes));
    const rho = densityMatrix(lightOf(1, stokes));
    const distance = Number(norm(subtract(multiply(r, rho), multiply(g, rho)), 'fro'));
    expect(deviations.note('Section 9, R ρ = G ρ', distance)).toBeLessThan(1e-6);
  }
});

/*
 * Section 8: ρ = Σ p Π − 1 over the six states, and ρ = Σ (6p − 1) Π/2 over the tetrahedron with Σ p = 1 (p = ½⟨Π⟩), which
 * in Stokes vectors are S = Σ p m and S = ½ Σ (6p − 1) m. Exact where the counts are without noise.
 */
test('six states and a tetrahedron are inverted by the formulas for mutually unbiased and symmetric sets', () => {
  const state: Stokes = [0.3, -0.5, 0.2];
  const six = measured(
    HVDARL.map(([s1, s2, s3]) => Math.round(50_000 * (1 + 0.3 * s1 - 0.5 * s2 - 0.2 * s3))),
  );
  const bySix = [0, 1, 2].map((axis) =>
    six.projectors.reduce((sum, m, k) => sum + ((six.counts[k] ?? NaN) / 100_000) * (m[axis] ?? NaN), 0),
  );
  const [a = NaN, b = NaN, c = NaN] = bySix;
  expect(furthest([a, b, c], state)).toBeLessThan(1e-12);
  expect(deviations.note('Section 8, six states', furthest(inverted(six).stokes, [a, b, c]))).toBeLessThan(
    1e-12,
  );
  expect(
    deviations.note('Section 8, six states, likeliest', furthest(likeliest(six).stokes, [a, b, c])),
  ).toBeLessThan(1e-8);

  const [flat, high] = [Math.sqrt(1 / 3), Math.sqrt(2 / 3)];
  const four: MeasuredCounts = {
    projectors: [
      [flat, high, 0],
      [flat, -high, 0],
      [-flat, 0, high],
      [-flat, 0, -high],
    ],
    counts: [20_000, 35_000, 15_000, 30_000],
    exposures: [1, 1, 1, 1],
    darkCounts: [0, 0, 0, 0],
  };
  const [x = NaN, y = NaN, z = NaN] = [0, 1, 2].map((axis) =>
    four.projectors.reduce(
      (sum, m, k) => sum + (((6 * (four.counts[k] ?? NaN)) / 100_000 - 1) / 2) * (m[axis] ?? NaN),
      0,
    ),
  );
  expect(stokesLength([x, y, z])).toBeLessThan(1);
  expect(deviations.note('Section 8, tetrahedron', furthest(inverted(four).stokes, [x, y, z]))).toBeLessThan(
    1e-12,
  );
  expect(
    deviations.note('Section 8, tetrahedron, likeliest', furthest(likeliest(four).stokes, [x, y, z])),
  ).toBeLessThan(1e-8);
});
