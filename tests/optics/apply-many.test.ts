import { expect, test } from 'vitest';
import { radians } from '../../shared/optics';
import { apply } from '../../shared/optics/solver/apply';
import type { Solved } from '../../shared/optics/solver/setting';
import { randomStream, stack } from './independent';
import { isAmong, matrixOf, randomUnitary, unitaryMiss } from './unitary-search';

const DEGREE = Math.PI / 180;
type Four = readonly [number, number, number, number];

function solve([w, x, y, z]: Four, retardancesRad: readonly number[]): Solved {
  return apply({ target: { w, x, y, z }, retardancesRad: retardancesRad.map(radians) });
}

function worstMiss([w, x, y, z]: Four, retardancesRad: readonly number[], { solutions }: Solved): number {
  const problem = { target: matrixOf(w, x, y, z), retardancesRad };
  return Math.max(...solutions.map(({ fastAxesRad }) => unitaryMiss(problem, fastAxesRad)));
}

test('four, five and six plates: a family with three neighbours following, each representative and member exact', () => {
  const random = randomStream(61);
  let members = 0;
  for (let k = 0; k < 300; k += 1) {
    const plates = 4 + (k % 3);
    const retardancesRad = Array.from(
      { length: plates },
      // Two quarter-wave plates at least: half-wave plates alone don't reach every unitary.
      (_, plate) => (plate % 2 === 0 ? 80 + 20 * random() : 170 + 20 * random()) * DEGREE,
    );
    const target = randomUnitary(random);
    const answer = solve(target, retardancesRad);
    expect(answer.kind).toBe('family');
    expect(answer.shortfallRad).toBe(0);
    expect(answer.solutions.length).toBeGreaterThan(0);
    expect(answer.solutions.length).toBeLessThanOrEqual(16);
    expect(worstMiss(target, retardancesRad, answer)).toBeLessThan(1e-27);
    const free = answer.family?.freePlates ?? [];
    expect(free.length).toBe(plates - 3);
    const chosen = free.map(() => radians(Math.PI * random()));
    for (const { fastAxesRad } of answer.family?.membersAt(chosen) ?? []) {
      members += 1;
      expect(free.map((plate) => fastAxesRad[plate])).toEqual(chosen);
      const [w, x, y, z] = target;
      expect(unitaryMiss({ target: matrixOf(w, x, y, z), retardancesRad }, fastAxesRad)).toBeLessThan(1e-27);
    }
  }
  expect(members).toBeGreaterThan(300);
}, 60_000);

test('the settings from which a unitary was made are members, when the free plates stand as they did', () => {
  const random = randomStream(62);
  let held = 0;
  for (let k = 0; k < 300; k += 1) {
    const plates = 4 + (k % 3);
    const retardancesRad = Array.from({ length: plates }, () => (20 + 320 * random()) * DEGREE);
    const angles = retardancesRad.map(() => Math.PI * random());
    const [[a], [c]] = stack(retardancesRad, angles);
    const answer = solve([a.re, -c.im, c.re, -a.im], retardancesRad);
    expect(answer.shortfallRad).toBe(0);
    const free = answer.family?.freePlates ?? [];
    const members = answer.family?.membersAt(free.map((plate) => radians(angles[plate] ?? NaN))) ?? [];
    expect(isAmong(members, angles, 1e-5)).toBe(true);
    held += 1;
  }
  expect(held).toBe(300);
}, 60_000);

test('weak plates out of reach: all axes along the target’s, missed by what their retardances lack', () => {
  // Four plates of 30° are at most a turn by 120°: a half-wave gate of X is 60° away.
  const answer = solve(
    [0, 1, 0, 0],
    [30, 30, 30, 30].map((deg) => deg * DEGREE),
  );
  expect(answer.kind).toBe('nearest');
  expect(answer.shortfallRad / DEGREE).toBeCloseTo(60, 7);
  for (const angle of answer.solutions[0]?.fastAxesRad ?? []) expect(angle / DEGREE).toBeCloseTo(45, 4);
});

test('four half-wave plates are a rotator: any other gate is missed by a family with three free plates', () => {
  const half = Math.PI;
  const halves = [half, half, half, half];
  const rotator = solve([Math.cos(0.4), 0, Math.sin(0.4), 0], halves);
  expect([rotator.kind, rotator.shortfallRad]).toEqual(['family', 0]);
  expect(worstMiss([Math.cos(0.4), 0, Math.sin(0.4), 0], halves, rotator)).toBeLessThan(1e-27);
  const missed = solve([0.5, 0.5, 0.5, 0.5], halves);
  expect([missed.kind, missed.family?.freePlates]).toEqual(['family', [0, 1, 2]]);
  expect(missed.shortfallRad).toBeCloseTo(Math.PI / 2, 10);
});

test('the same question has the same answer to the last bit, members as well', () => {
  const random = randomStream(63);
  for (let k = 0; k < 20; k += 1) {
    const retardancesRad = Array.from({ length: 5 }, () => (20 + 320 * random()) * DEGREE);
    const target = randomUnitary(random);
    const [one, other] = [solve(target, retardancesRad), solve(target, retardancesRad)];
    expect(one.solutions).toEqual(other.solutions);
    const chosen = [radians(0.2), radians(2.9)];
    expect(one.family?.membersAt(chosen)).toEqual(other.family?.membersAt(chosen));
  }
});
