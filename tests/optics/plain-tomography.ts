import { add, complex, lusolve, type MathType, matrix, multiply } from 'mathjs';
import type { MeasuredCounts, Stokes } from '../../shared/optics';

/*
 * Tomography written to be read, sharing no line with the product: the likelihood, its slope, the barrier's path in plain
 * coordinates (S0, S1, S2, S3) by a general linear solver, and density matrices.
 */

/** (S0, S1, S2, S3), not divided by S0. */
export type Light = readonly [number, number, number, number];

export const lightOf = (intensity: number, [s1, s2, s3]: Stokes): Light => [
  intensity,
  intensity * s1,
  intensity * s2,
  intensity * s3,
];

export function settingsOf({ projectors, counts, exposures, darkCounts }: MeasuredCounts) {
  return projectors.map((m, k) => ({
    m,
    n: counts[k] ?? NaN,
    e: exposures[k] ?? NaN,
    d: darkCounts[k] ?? NaN,
  }));
}

const rate = ([s0, s1, s2, s3]: Light, m: Stokes): number => (s0 + s1 * m[0] + s2 * m[1] + s3 * m[2]) / 2;

export function logLikelihood(data: MeasuredCounts, light: Light): number {
  return settingsOf(data).reduce((sum, { m, n, e, d }) => {
    const mean = e * rate(light, m) + d;
    return sum + (n === 0 ? 0 : n * Math.log(mean)) - mean;
  }, 0);
}

/** −∇ log L. */
export function slope(data: MeasuredCounts, light: Light): Light {
  return settingsOf(data).reduce<Light>(
    ([a, b, c, f], { m, n, e, d }) => {
      const by = (e / 2) * (1 - (n === 0 ? 0 : n / (e * rate(light, m) + d)));
      return [a + by, b + by * m[0], c + by * m[1], f + by * m[2]];
    },
    [0, 0, 0, 0],
  );
}

const form = ([s0, s1, s2, s3]: Light): number => s0 * s0 - s1 * s1 - s2 * s2 - s3 * s3;
const dot = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((sum, value, k) => sum + value * (b[k] ?? NaN), 0);

/** The point of the central path at this μ: log L there is within 2μ of the maximum. Halves steps on values of the function. */
export function plainPath(data: MeasuredCounts, lastBarrier: number): Light {
  const total = data.counts.reduce((sum, n) => sum + n, 0);
  const exposure = data.exposures.reduce((sum, e) => sum + e / 2, 0);
  let light: Light = [total / exposure, 0, 0, 0];
  for (let barrier = total; barrier > lastBarrier / 4; barrier /= 4) {
    const mu = Math.max(barrier, lastBarrier);
    const value = (at: Light): number =>
      form(at) > 0 && at[0] > 0 ? -logLikelihood(data, at) - mu * Math.log(form(at)) : Infinity;
    for (let step = 0; step < 100; step += 1) {
      const { gradient, hessian } = expansion(data, light, mu);
      const move = lusolve(matrix(hessian), matrix(gradient.map((part) => -part)))
        .toArray()
        .flat()
        .map(Number);
      const gain = -dot(gradient, move);
      if (gain < 1e-9 * mu) break;
      let length = 1;
      const moved = (): Light => {
        const [a, b, c, d] = light.map((part, k) => part + length * (move[k] ?? NaN));
        return [a ?? NaN, b ?? NaN, c ?? NaN, d ?? NaN];
      };
      const before = value(light);
      while (length > 1e-12 && !(value(moved()) <= before - 0.1 * length * gain)) length /= 2;
      if (length <= 1e-12) break;
      light = moved();
    }
  }
  return light;
}

function expansion(data: MeasuredCounts, light: Light, mu: number) {
  const flipped = light.map((part, k) => (k === 0 ? part : -part));
  const size = form(light);
  const gradient = slope(data, light).map((part, k) => part - (2 * mu * (flipped[k] ?? NaN)) / size);
  const hessian = flipped.map((left, i) =>
    flipped.map((right, j) => {
      const metric = i === j ? (i === 0 ? 1 : -1) : 0;
      return mu * ((4 * left * right) / size ** 2 - (2 * metric) / size);
    }),
  );
  for (const { m, n, e, d } of settingsOf(data)) {
    const row = [1, ...m];
    const mean = e * rate(light, m) + d;
    row.forEach((left, i) =>
      row.forEach((right, j) => {
        const line = hessian[i];
        if (line !== undefined) line[j] = (line[j] ?? NaN) + (n * e * e * left * right) / 4 / mean ** 2;
      }),
    );
  }
  return { gradient, hessian };
}

/** ½ (S0 + S1 σz + S2 σx + S3 σy) in the basis H, V of the canonical frame. */
export function densityMatrix([s0, s1, s2, s3]: Light) {
  return matrix([
    [complex((s0 + s1) / 2, 0), complex(s2 / 2, -s3 / 2)],
    [complex(s2 / 2, s3 / 2), complex((s0 - s1) / 2, 0)],
  ]);
}

/** R = Σ e (n/λ) Π and G = Σ e Π, for which Rρ = Gρ at the maximum. */
export function fixedPoint(
  data: MeasuredCounts,
  light: Light,
): { readonly r: MathType; readonly g: MathType } {
  const projector = (m: Stokes) => densityMatrix([1, m[0], m[1], m[2]]);
  const zero: MathType = densityMatrix([0, 0, 0, 0]);
  return settingsOf(data).reduce<{ r: MathType; g: MathType }>(
    ({ r, g }, { m, n, e, d }) => {
      const weight = n === 0 ? 0 : (e * n) / (e * rate(light, m) + d);
      return {
        r: add(r, multiply(projector(m), weight)),
        g: add(g, multiply(projector(m), e)),
      };
    },
    { r: zero, g: zero },
  );
}
