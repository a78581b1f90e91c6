import fc from 'fast-check';
import { abs, multiply, norm, subtract, trace } from 'mathjs';
import { describe, expect, it } from 'vitest';
import {
  fidelityToPure,
  linearInversion,
  type MeasuredCounts,
  type MostLikelyState,
  mostLikelyState,
  purity,
  rotate,
  type Stokes,
  stokesLength,
  stokesToBloch,
  blochToStokes,
} from '../../shared/optics';
import { BarrierPath } from '../../shared/optics/tomography/barrier-path';
import { randomState, randomStream, stokesOf } from './independent';
import {
  densityMatrix,
  fixedPoint,
  type Light,
  lightOf,
  logLikelihood,
  plainPath,
  slope,
} from './plain-tomography';
import { meanCounts, plainly, SIX, TETRAHEDRON, tomography } from './random-tomography';

function estimate(data: MeasuredCounts): MostLikelyState {
  const result = mostLikelyState(data);
  if (!result.ok) throw new Error(result.refusal.message);
  return result;
}

const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);
const apart = (a: Stokes, b: Stokes): number => stokesLength([a[0] - b[0], a[1] - b[1], a[2] - b[2]]);
const lightAt = ({ intensity, stokes }: MostLikelyState): Light => lightOf(intensity, stokes);
/** What rounding hides in units of log L: 4e-15 for each count, more where the settings lean to one side of the sphere. */
function rounding({ projectors, counts, exposures }: MeasuredCounts): number {
  const lean = ([0, 1, 2] as const).map((axis) =>
    sum(projectors.map((m, k) => (exposures[k] ?? NaN) * m[axis])),
  );
  return (4e-15 * sum(counts)) / (1 - Math.hypot(...lean) / sum(exposures));
}

describe('the likeliest state of Poisson counts', () => {
  it('certifies a gap of 1e-10, or of what rounding hides, for any counts', () => {
    fc.assert(
      fc.property(tomography, (data) => {
        const { gapBound, stokes } = estimate(data);
        expect(gapBound).toBeLessThan(Math.max(1e-10, rounding(data)));
        expect(gapBound).toBeGreaterThan(0);
        expect(stokesLength(stokes)).toBeLessThanOrEqual(1 + 1e-15);
      }),
      { numRuns: 500 },
    );
  });

  it('meets the conditions of a maximum over the cone: −slope in the cone, and across from the light', () => {
    fc.assert(
      fc.property(tomography, (data) => {
        const light = lightAt(estimate(data));
        const [s0, ...s] = slope(data, light);
        const size = sum(data.exposures);
        expect(Math.hypot(...s) - s0).toBeLessThan(1e-9 * size);
        const product = light.reduce((total, part, k) => total + part * ([s0, ...s][k] ?? NaN), 0);
        expect(Math.abs(product)).toBeLessThan(1e-10 + rounding(data));
      }),
      { numRuns: 500 },
    );
  });

  it('has R ρ = G ρ in density matrices', () => {
    fc.assert(
      fc.property(tomography, (data) => {
        const { intensity, stokes } = estimate(data);
        const { r, g } = fixedPoint(data, lightOf(intensity, stokes));
        const rho = densityMatrix(lightOf(1, stokes));
        const distance = norm(subtract(multiply(r, rho), multiply(g, rho)), 'fro');
        expect(Number(distance)).toBeLessThan(1e-5 * sum(data.exposures));
      }),
      { numRuns: 200 },
    );
  });

  it('is nowhere below a plain path in other coordinates, and above it by no more than that path may miss', () => {
    fc.assert(
      fc.property(tomography, (data) => {
        const barrier = 1e-6;
        const plain = logLikelihood(data, plainPath(data, barrier));
        const found = estimate(data);
        expect(found.logLikelihood - plain).toBeGreaterThan(-1e-9 - rounding(data));
        expect(found.logLikelihood - plain).toBeLessThan(3 * barrier + rounding(data));
      }),
      { numRuns: 60 },
    );
  });

  it('is higher than every other state, and rises all the way from it', () => {
    const random = randomStream(8);
    fc.assert(
      fc.property(tomography, (data) => {
        const found = estimate(data);
        const best = lightAt(found);
        expect(Math.abs(found.logLikelihood - logLikelihood(data, best))).toBeLessThan(
          1e-13 * Math.abs(found.logLikelihood) + 1e-12,
        );
        for (let k = 0; k < 10; k += 1) {
          const [s1, s2, s3] = stokesOf(randomState(random));
          const degree = Math.min(1, 1.5 * random());
          const other = lightOf(found.intensity * (0.2 + 2 * random()), [
            degree * s1,
            degree * s2,
            degree * s3,
          ]);
          const along = [0.01, 0.3, 0.6, 0.9, 0.99, 1].map((t) => {
            const [a, b, c, d] = other.map((part, j) => part + t * ((best[j] ?? NaN) - part));
            return logLikelihood(data, [a ?? NaN, b ?? NaN, c ?? NaN, d ?? NaN]);
          });
          along.slice(1).forEach((value, j) => {
            expect(value).toBeGreaterThan((along[j] ?? NaN) - 1e-10 - rounding(data));
          });
        }
      }),
      { numRuns: 100 },
    );
  });

  it('does not depend on the order of the settings', () => {
    fc.assert(
      fc.property(tomography, fc.nat(), (data, seed) => {
        const random = randomStream(seed);
        const order = data.counts
          .map((_, k) => ({ k, key: random() }))
          .sort((a, b) => a.key - b.key)
          .map(({ k }) => k);
        const pick = <T>(list: readonly T[]): T[] => order.flatMap((k) => list.slice(k, k + 1));
        const moved = estimate({
          projectors: pick(data.projectors),
          counts: pick(data.counts),
          exposures: pick(data.exposures),
          darkCounts: pick(data.darkCounts),
        });
        expect(apart(moved.stokes, estimate(data).stokes)).toBeLessThan(1e-6);
        expect(Math.abs(moved.logLikelihood - estimate(data).logLikelihood)).toBeLessThan(
          1e-9 + rounding(data),
        );
      }),
      { numRuns: 100 },
    );
  });

  it('turns with the projectors', () => {
    fc.assert(
      fc.property(tomography, fc.nat(), (data, seed) => {
        const random = randomStream(seed);
        const [x, y, z] = stokesOf(randomState(random));
        const half = Math.PI * random();
        const turn = {
          w: Math.cos(half),
          x: Math.sin(half) * x,
          y: Math.sin(half) * y,
          z: Math.sin(half) * z,
        };
        const turned = (stokes: Stokes): Stokes => blochToStokes(rotate(turn, stokesToBloch(stokes)));
        const moved = estimate({ ...data, projectors: data.projectors.map(turned) });
        const found = estimate(data);
        expect(apart(moved.stokes, turned(found.stokes))).toBeLessThan(1e-6);
        expect(Math.abs(moved.logLikelihood - found.logLikelihood)).toBeLessThan(1e-9 + rounding(data));
      }),
      { numRuns: 100 },
    );
  });

  it('counts exposure in any unit, and a setting measured twice as one of both exposures', () => {
    fc.assert(
      fc.property(tomography, fc.double({ min: 1e-6, max: 1e6, noNaN: true }), (data, unit) => {
        const found = estimate(data);
        const other = estimate({ ...data, exposures: data.exposures.map((e) => e * unit) });
        expect(apart(other.stokes, found.stokes)).toBeLessThan(1e-6);
        expect(Math.abs((other.intensity * unit) / found.intensity - 1)).toBeLessThan(1e-6);
        const twice = estimate({
          projectors: [...data.projectors, ...data.projectors],
          counts: [...data.counts, ...data.counts.map((n) => n + 1)],
          exposures: [...data.exposures, ...data.exposures],
          darkCounts: [...data.darkCounts, ...data.darkCounts],
        });
        const both = estimate({
          projectors: data.projectors,
          counts: data.counts.map((n) => 2 * n + 1),
          exposures: data.exposures.map((e) => 2 * e),
          darkCounts: data.darkCounts.map((d) => 2 * d),
        });
        expect(apart(twice.stokes, both.stokes)).toBeLessThan(1e-6);
      }),
      { numRuns: 100 },
    );
  });

  it('finds the state behind very many counts, with unequal exposures and dark counts', () => {
    const random = randomStream(5);
    for (let k = 0; k < 50; k += 1) {
      const settings = {
        projectors: k % 2 === 0 ? SIX : TETRAHEDRON,
        exposures: (k % 2 === 0 ? SIX : TETRAHEDRON).map(() => 0.2 + 2 * random()),
        darkCounts: (k % 2 === 0 ? SIX : TETRAHEDRON).map(() => 1e8 * random()),
      };
      const [s1, s2, s3] = stokesOf(randomState(random));
      const degree = 0.99 * random();
      const state: Stokes = [degree * s1, degree * s2, degree * s3];
      // Whole numbers next to the means: each is off by 1e-9 of them.
      const counts = meanCounts(settings, 1e9, state).map(Math.round);
      const found = estimate({ ...settings, counts });
      expect(apart(found.stokes, state)).toBeLessThan(2e-8);
      expect(Math.abs(found.intensity / 1e9 - 1)).toBeLessThan(2e-8);
    }
  });

  it('takes settings without counts: all of one light and none of its opposite is that light, pure', () => {
    const {
      stokes,
      purity: found,
      intensity,
      logLikelihood: value,
    } = estimate(plainly(SIX, [800, 0, 400, 400, 400, 400]));
    expect(apart(stokes, [1, 0, 0])).toBeLessThan(1e-9);
    expect(found).toBeCloseTo(1, 9);
    expect(intensity).toBeCloseTo(800, 6);
    // Every λ is its n here: the likelihood can't be higher.
    const most = 800 * Math.log(800) - 800 + 4 * (400 * Math.log(400) - 400);
    expect(Math.abs(value - most)).toBeLessThan(1e-9);
    expect(estimate(plainly(SIX, [0, 0, 1, 0, 0, 0])).stokes[1]).toBeCloseTo(1, 9);
  });

  it('leaves a port that was off out of it', () => {
    const counts = [985, 15, 640, 360, 520, 480];
    const without = estimate(plainly(SIX, counts));
    const off = estimate({
      projectors: [...SIX, [0, 0, 1]],
      counts: [...counts, 12],
      exposures: [1, 1, 1, 1, 1, 1, 0],
      darkCounts: [0, 0, 0, 0, 0, 0, 10],
    });
    expect(off.stokes).toEqual(without.stokes);
    expect(off.gapBound).toBe(without.gapBound);
    expect(off.logLikelihood).toBeCloseTo(without.logLikelihood + 12 * Math.log(10) - 10, 8);
  });

  it('finds the light in counts that are nearly all dark', () => {
    const found = estimate({
      projectors: SIX,
      counts: [3, 7, 938, 74, 11, 6],
      exposures: [1, 1, 1, 1, 1, 1],
      darkCounts: [0, 0, 910, 54, 0, 0],
    });
    expect(found.gapBound).toBeLessThan(1e-10);
    expect(stokesLength(found.stokes)).toBeGreaterThan(0);
  });

  it('answers the same whatever the settings were used for before', () => {
    const path = new BarrierPath(plainly(SIX, []));
    const lists = [
      [985, 15, 640, 360, 520, 480],
      [5120, 4880, 9790, 210, 5300, 4700],
      [0, 0, 1, 0, 0, 0],
    ];
    const first = lists.map((counts) => path.climb(counts));
    expect(lists.map((counts) => path.climb(counts))).toEqual(first);
    expect(lists.map((counts) => new BarrierPath(plainly(SIX, [])).climb(counts))).toEqual(first);
  });
});

describe('four outcomes of a tetrahedron', () => {
  it('are inverted exactly where the inverse is a state, and then the likeliest state is that', () => {
    const counts = [400, 300, 250, 50];
    const linear = linearInversion(plainly(TETRAHEDRON, counts));
    if (!linear.ok) throw new Error(linear.refusal.message);
    // S = 3 Σ p m for p that sum to 1.
    const wanted = ([0, 1, 2] as const).map((axis) =>
      sum(TETRAHEDRON.map((m, k) => (3 * (counts[k] ?? NaN) * m[axis]) / 1000)),
    );
    linear.stokes.forEach((part, axis) => expect(part).toBeCloseTo(wanted[axis] ?? NaN, 12));
    expect(linear.intensity).toBeCloseTo(500, 9);
    expect(apart(estimate(plainly(TETRAHEDRON, counts)).stokes, linear.stokes)).toBeLessThan(1e-8);
  });

  it('of which all counts are in one are the pure light of that one', () => {
    const linear = linearInversion(plainly(TETRAHEDRON, [100, 0, 0, 0]));
    if (!linear.ok) throw new Error(linear.refusal.message);
    expect(stokesLength(linear.stokes)).toBeCloseTo(3, 12);
    expect(
      apart(estimate(plainly(TETRAHEDRON, [100, 0, 0, 0])).stokes, TETRAHEDRON[0] ?? [0, 0, 0]),
    ).toBeLessThan(1e-9);
  });
});

describe('linear inversion', () => {
  it('solves the normal equations with weights 1/n, dark counts taken off', () => {
    const data: MeasuredCounts = {
      projectors: SIX,
      counts: [900, 90, 700, 420, 333, 0],
      exposures: [1, 1.2, 0.7, 1, 0.9, 1],
      darkCounts: [5, 0, 7, 0, 20, 0],
    };
    const found = linearInversion(data);
    if (!found.ok) throw new Error(found.refusal.message);
    const [s0, s1, s2, s3] = lightOf(found.intensity, found.stokes);
    // Weighted residuals are across from every column.
    const residual = SIX.map((m, k) => {
      const e = data.exposures[k] ?? NaN;
      const n = data.counts[k] ?? NaN;
      const mean = (e * (s0 + s1 * m[0] + s2 * m[1] + s3 * m[2])) / 2 + (data.darkCounts[k] ?? NaN);
      return { by: (e * (n - mean)) / Math.max(n, 1), row: [1, ...m] };
    });
    for (const column of [0, 1, 2, 3]) {
      expect(sum(residual.map(({ by, row }) => by * (row[column] ?? NaN)))).toBeCloseTo(0, 12);
    }
  });

  it('refuses what has no light in it, and what it is told wrong', () => {
    expect(linearInversion(plainly(SIX, [0, 0, 0, 0, 0, 0]))).toMatchObject({
      ok: false,
      refusal: { reason: 'no-counts' },
    });
    expect(linearInversion(plainly(SIX, [1]))).toMatchObject({ ok: false, refusal: { reason: 'lengths' } });
  });
});

describe('what is reported of a state', () => {
  it('is Tr ρ² and ⟨t|ρ|t⟩ of the density matrix', () => {
    const random = randomStream(2);
    for (let k = 0; k < 50; k += 1) {
      const [t1, t2, t3] = stokesOf(randomState(random));
      const [s1, s2, s3] = stokesOf(randomState(random));
      const degree = random();
      const stokes: Stokes = [degree * s1, degree * s2, degree * s3];
      const rho = densityMatrix(lightOf(1, stokes));
      const target = densityMatrix([1, t1, t2, t3]);
      expect(purity(stokes)).toBeCloseTo(traceOf(multiply(rho, rho)), 14);
      expect(fidelityToPure(stokes, [t1, t2, t3])).toBeCloseTo(traceOf(multiply(rho, target)), 14);
    }
  });
});

function traceOf(square: ReturnType<typeof densityMatrix>): number {
  return abs(trace(square));
}
