import { expect, test } from 'vitest';
import { prepare, radians, type Solved } from '../../shared/optics';
import { apart, denseMinima, denseZeros, inputH, type SearchProblem } from './dense-search';
import { apply, infidelity, plate, randomState, randomStream, stokesOf } from './independent';

const DEGREE = Math.PI / 180;
const CASES = 100_000;

/** A half-wave plate of 160° to 200° and a quarter-wave plate of 70° to 110°, in either order. */
function randomProblem(random: () => number): SearchProblem {
  const half = (160 + 40 * random()) * DEGREE;
  const quarter = (70 + 40 * random()) * DEGREE;
  return {
    input: random() < 0.5 ? inputH : randomState(random),
    target: randomState(random),
    retardancesRad: random() < 0.5 ? [half, quarter] : [quarter, half],
  };
}

function solve({ input, target, retardancesRad: [first, second] }: SearchProblem): Solved {
  return prepare({
    input: stokesOf(input),
    target: stokesOf(target),
    retardancesRad: [radians(first), radians(second)],
  });
}

function missed({ input, target, retardancesRad }: SearchProblem, fastAxesRad: readonly number[]): number {
  const [a = NaN, b = NaN] = fastAxesRad;
  const behind = apply(plate(retardancesRad[1], b), apply(plate(retardancesRad[0], a), input));
  return infidelity(target, behind);
}

test('100 000 preparations with plates of 70° to 110° and 160° to 200°: 0, 2 or 4 settings, all exact, no two alike, none missed', () => {
  const random = randomStream(101);
  const counts = new Map<string, number>();
  const searched = { usual: 0, rare: 0 };
  let worst = 0;
  let closest = Infinity;
  for (let k = 0; k < CASES; k += 1) {
    const problem = randomProblem(random);
    const { kind, solutions, shortfallRad } = solve(problem);
    const label = kind === 'exact' ? `${solutions.length}` : kind;
    counts.set(label, (counts.get(label) ?? 0) + 1);
    if (kind === 'exact') {
      for (const [index, { fastAxesRad }] of solutions.entries()) {
        worst = Math.max(worst, missed(problem, fastAxesRad));
        for (const other of solutions.slice(index + 1)) {
          closest = Math.min(closest, apart(fastAxesRad, other.fastAxesRad));
        }
      }
    }
    // The usual four settings on a sample, and what is rarer than that whenever it comes.
    const usual = label === '4';
    if (usual ? k % 250 !== 0 : searched.rare >= 400) continue;
    searched[usual ? 'usual' : 'rare'] += 1;
    if (kind === 'exact') {
      const dense = denseZeros(problem, 90);
      const unknown = dense.filter(
        (found) => !solutions.some((known) => apart(known.fastAxesRad, found.fastAxesRad) < 1e-4),
      );
      expect(unknown, JSON.stringify(problem)).toEqual([]);
      expect(dense.length, JSON.stringify(problem)).toBe(solutions.length);
    } else {
      const least = Math.min(...denseMinima(problem, 45).map((found) => found.infidelity));
      expect(Math.sin(shortfallRad / 2) ** 2, JSON.stringify(problem)).toBeCloseTo(least, 12);
    }
  }
  process.stdout.write(
    `two plates, ${CASES} cases: ${JSON.stringify([...counts])}, worst infidelity ${worst.toExponential(1)}, ` +
      `closest two settings ${closest.toExponential(1)} rad, searched densely ${searched.usual} + ${searched.rare}\n`,
  );
  expect([...counts.keys()].sort()).toEqual(['2', '4', 'nearest']);
  expect(worst).toBeLessThan(1e-24);
  expect(closest).toBeGreaterThan(1e-8);
}, 60_000);
