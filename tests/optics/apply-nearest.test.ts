import { expect, test } from 'vitest';
import { radians } from '../../shared/optics';
import { apply } from '../../shared/optics/solver/apply';
import type { Solved } from '../../shared/optics/solver/setting';
import { randomStream } from './independent';
import {
  isAmong,
  isMinimum,
  matrixOf,
  randomUnitary,
  searchedMinima,
  unitaryMiss,
  type UnitaryProblem,
} from './unitary-search';

const DEGREE = Math.PI / 180;
type Four = readonly [number, number, number, number];

function problemOf([w, x, y, z]: Four, retardancesRad: readonly number[]): UnitaryProblem {
  return { target: matrixOf(w, x, y, z), retardancesRad };
}

function solve([w, x, y, z]: Four, retardancesRad: readonly number[]): Solved {
  return apply({ target: { w, x, y, z }, retardancesRad: retardancesRad.map(radians) });
}

/** Best first, each truly as good as it says and no worse than all its neighbours. */
function expectOptima(problem: UnitaryProblem, { solutions, shortfallRad }: Solved): void {
  const values = solutions.map(({ infidelity }) => infidelity);
  expect(values.every((value, k) => value >= (values[k - 1] ?? 0) * (1 - 1e-11))).toBe(true);
  expect((2 / 3) * Math.sin(shortfallRad / 2) ** 2).toBeCloseTo(values[0] ?? NaN, 12);
  for (const { fastAxesRad, infidelity } of solutions) {
    const miss = unitaryMiss(problem, fastAxesRad);
    expect((2 / 3) * miss).toBeCloseTo(infidelity, 13);
    expect(isMinimum(problem, { fastAxesRad, miss })).toBe(true);
  }
}

function unreachable(
  seed: number,
  plates: number,
  cases: number,
  side: number,
  retardance: (random: () => number) => number,
): void {
  const random = randomStream(seed);
  let met = 0;
  for (let k = 0; k < 40_000 && met < cases; k += 1) {
    const retardancesRad = Array.from({ length: plates }, () => retardance(random) * DEGREE);
    const target = randomUnitary(random);
    const answer = solve(target, retardancesRad);
    if (answer.kind === 'exact') continue;
    met += 1;
    expect(answer.kind).toBe('nearest');
    const problem = problemOf(target, retardancesRad);
    expectOptima(problem, answer);
    const searched = searchedMinima(problem, side);
    const missing = searched.filter(({ fastAxesRad }) => !isAmong(answer.solutions, fastAxesRad, 3e-3));
    expect(missing, JSON.stringify({ target, retardancesRad })).toEqual([]);
    const best = Math.min(...searched.map(({ miss }) => miss));
    const ours = answer.solutions[0]?.infidelity ?? NaN;
    // The search creeps to a minimum that is not 0, and stops a little above it.
    expect((2 / 3) * best - ours).toBeGreaterThan(-1e-13);
    expect((2 / 3) * best - ours).toBeLessThan(1e-7);
  }
  expect(met).toBe(cases);
}

test('one plate: both optima, by a search from 12 starts', () => {
  unreachable(51, 1, 100, 12, (random) => 10 + 340 * random());
});

test('two plates: every local optimum that a search from 64 starts finds', () => {
  unreachable(52, 2, 50, 8, (random) => 10 + 340 * random());
}, 120_000);

test('three plates far from half and quarter waves: every local optimum that a search from 216 starts finds', () => {
  unreachable(53, 3, 10, 6, (random) => 10 + 110 * random());
}, 120_000);

test('three plates as labs have them: what is reported out of reach is, by a search, and by as much', () => {
  unreachable(54, 3, 8, 6, (random) => (random() < 0.5 ? 70 + 40 * random() : 160 + 40 * random()));
}, 120_000);

test('a half-wave plate alone makes its own kind of gate in two ways and misses the identity wherever it stands', () => {
  const x = solve([0, 1, 0, 0], [Math.PI]);
  expect(x.kind).toBe('exact');
  expect(x.solutions.map(({ fastAxesRad: [angle = NaN] }) => angle / DEGREE)).toEqual([
    expect.closeTo(45, 9),
    expect.closeTo(135, 9),
  ]);
  const identity = solve([1, 0, 0, 0], [Math.PI]);
  expect(identity.kind).toBe('family');
  expect(identity.family?.freePlates).toEqual([0]);
  expect(identity.shortfallRad).toBeCloseTo(Math.PI, 7);
});

test('half-wave plates only: gates of their kind are a family, and any other is missed by a family of equals', () => {
  const half = Math.PI;
  const reached = solve([0, 0.6, 0, 0.8], [half, half, half]);
  expect([reached.kind, reached.shortfallRad, reached.family?.freePlates]).toEqual(['family', 0, [0, 1]]);
  const turned: Four = [0.5, 0.5, 0.5, 0.5];
  const missed = solve(turned, [half, half, half]);
  expect([missed.kind, missed.family?.freePlates]).toEqual(['family', [0, 1]]);
  // sin²(ε/2) is the share of the target that no half-wave plate has, w² + y².
  expect(missed.solutions[0]?.infidelity).toBeCloseTo((2 / 3) * 0.5, 12);
  const members = missed.family?.membersAt([radians(0.3), radians(1.2)]) ?? [];
  expect(members.length).toBeGreaterThan(0);
  for (const { fastAxesRad } of members)
    expect(unitaryMiss(problemOf(turned, [half, half, half]), fastAxesRad)).toBeCloseTo(0.5, 12);
});

test('a plate that does nothing may stand anywhere and keeps nothing from the others', () => {
  const random = randomStream(55);
  for (const [place, idle] of [
    [0, 0],
    [1, 2 * Math.PI],
    [3, 4 * Math.PI],
  ] as const) {
    const others = [92 * DEGREE, 178 * DEGREE, 89 * DEGREE];
    const retardancesRad = [...others.slice(0, place), idle, ...others.slice(place)];
    const target = randomUnitary(random);
    const answer = solve(target, retardancesRad);
    const without = solve(target, others);
    expect(answer.kind).toBe('family');
    expect(answer.family?.freePlates).toEqual([place]);
    expect(answer.solutions.length).toBe(without.solutions.length);
    const members = answer.family?.membersAt([radians(1)]) ?? [];
    expect(members.length).toBe(without.solutions.length);
    for (const { fastAxesRad } of members) {
      expect(fastAxesRad[place]).toBe(1);
      expect(unitaryMiss(problemOf(target, retardancesRad), fastAxesRad)).toBeLessThan(1e-27);
    }
  }
});
