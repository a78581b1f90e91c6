import fc from 'fast-check';
import type { MeasuredCounts, Stokes } from '../../shared/optics';
import { randomState, randomStream, stokesOf } from './independent';

export const SIX: readonly Stokes[] = [
  [1, 0, 0],
  [-1, 0, 0],
  [0, 1, 0],
  [0, -1, 0],
  [0, 0, 1],
  [0, 0, -1],
];
const third = Math.sqrt(1 / 3);
export const TETRAHEDRON: readonly Stokes[] = [
  [third, third, third],
  [third, -third, -third],
  [-third, third, -third],
  [-third, -third, third],
];

/** Settings with one unit of exposure each and no dark counts. */
export function plainly(projectors: readonly Stokes[], counts: readonly number[]): MeasuredCounts {
  return { projectors, counts, exposures: projectors.map(() => 1), darkCounts: projectors.map(() => 0) };
}

/** A Poisson number by Knuth's product, in pieces so that the product doesn't vanish. */
export function poisson(mean: number, random: () => number): number {
  let [count, left] = [0, mean];
  while (left > 0) {
    const piece = Math.min(left, 300);
    const limit = Math.exp(-piece);
    for (let product = random(); product > limit; product *= random()) count += 1;
    left -= piece;
  }
  return count;
}

export function meanCounts(
  { projectors, exposures, darkCounts }: Omit<MeasuredCounts, 'counts'>,
  intensity: number,
  [s1, s2, s3]: Stokes,
): readonly number[] {
  return projectors.map(
    (m, k) =>
      ((exposures[k] ?? NaN) * intensity * (1 + s1 * m[0] + s2 * m[1] + s3 * m[2])) / 2 +
      (darkCounts[k] ?? NaN),
  );
}

/** Poisson counts of a random state, pure in every other case, with settings, exposures and dark counts of many kinds. */
export const tomography: fc.Arbitrary<MeasuredCounts> = fc
  .record({
    seed: fc.nat(),
    set: fc.constantFrom('six', 'tetrahedron', 'random'),
    isPure: fc.boolean(),
    isEven: fc.boolean(),
    hasDarkCounts: fc.boolean(),
    decades: fc.double({ min: 0.5, max: 4, noNaN: true }),
  })
  .map(({ seed, set, isPure, isEven, hasDarkCounts, decades }) => {
    const random = randomStream(seed);
    const projectors =
      set === 'six'
        ? SIX
        : set === 'tetrahedron'
          ? TETRAHEDRON
          : Array.from({ length: 5 + Math.floor(5 * random()) }, () => stokesOf(randomState(random)));
    const exposures = projectors.map(() => (isEven ? 1 : 0.3 + 3 * random()));
    const intensity = 10 ** decades;
    const darkCounts = projectors.map(() => (hasDarkCounts ? 0.1 * intensity * random() : 0));
    const degree = isPure ? 1 : random();
    const [s1, s2, s3] = stokesOf(randomState(random));
    const settings = { projectors, exposures, darkCounts };
    const means = meanCounts(settings, intensity, [degree * s1, degree * s2, degree * s3]);
    return { ...settings, counts: means.map((mean) => poisson(mean, random)) };
  })
  // Neither no light nor a setting that is hardly there is what these are for.
  .filter(({ counts, darkCounts }) => counts.some((n, k) => n > 2 * (darkCounts[k] ?? NaN)));
