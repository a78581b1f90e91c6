import { expect, test } from 'vitest';
import { type Quaternion, radians } from '../../shared/optics';
import { apply } from '../../shared/optics/solver/apply';
import type { Solved } from '../../shared/optics/solver/setting';
import { randomStream, stack } from './independent';
import {
  isAmong,
  matrixOf,
  randomUnitary,
  searchedZeros,
  unitaryMiss,
  type UnitaryProblem,
} from './unitary-search';

const DEGREE = Math.PI / 180;

interface Case {
  readonly target: Quaternion;
  readonly problem: UnitaryProblem;
}

function caseOf(
  [w, x, y, z]: readonly [number, number, number, number],
  retardancesRad: readonly number[],
): Case {
  return { target: { w, x, y, z }, problem: { target: matrixOf(w, x, y, z), retardancesRad } };
}

function solve({ target, problem }: Case): Solved {
  return apply({ target, retardancesRad: problem.retardancesRad.map(radians) });
}

/** Two quarter-wave plates and a half-wave plate as labs have them, in any of the three orders. */
function imperfectTriple(random: () => number): readonly number[] {
  const quarter = (): number => (70 + 40 * random()) * DEGREE;
  const half = (160 + 40 * random()) * DEGREE;
  const order = Math.floor(3 * random());
  const [one, two] = [quarter(), quarter()];
  if (order === 0) return [one, half, two];
  return order === 1 ? [half, one, two] : [one, two, half];
}

test('100 000 random unitaries and imperfect triples: 4, 2 or no settings, each exact by an independent product and none twice', () => {
  const random = randomStream(41);
  const counts = new Map<string, number>();
  let [worst, closest] = [0, Infinity];
  for (let k = 0; k < 100_000; k += 1) {
    const each = caseOf(randomUnitary(random), imperfectTriple(random));
    const { kind, solutions, family } = solve(each);
    const label = kind === 'exact' ? `exact ${solutions.length}` : kind;
    counts.set(label, (counts.get(label) ?? 0) + 1);
    if (kind !== 'exact') continue;
    if (family !== null) throw new Error('an isolated setting is no family');
    solutions.forEach(({ fastAxesRad }, index) => {
      worst = Math.max(worst, unitaryMiss(each.problem, fastAxesRad));
      for (const other of solutions.slice(index + 1)) {
        const apart = Math.max(
          ...fastAxesRad.map((angle, plate) => {
            const off = Math.abs(angle - (other.fastAxesRad[plate] ?? NaN));
            return Math.min(off, Math.PI - off);
          }),
        );
        closest = Math.min(closest, apart);
      }
    });
  }
  process.stdout.write(
    `three plates, 100 000 cases: worst sin²(ε/2) ${worst.toExponential(1)}, nearest two settings ${closest.toExponential(1)} rad, ${JSON.stringify([...counts])}\n`,
  );
  expect(worst).toBeLessThan(1e-27);
  expect(closest).toBeGreaterThan(1e-7);
  expect([...counts.keys()].filter((label) => !['exact 4', 'exact 2', 'nearest'].includes(label))).toEqual(
    [],
  );
  expect(counts.get('exact 4')).toBeGreaterThan(80_000);
}, 60_000);

test('the set is complete: a search from 216 starts finds the same settings and no other', () => {
  const random = randomStream(42);
  let found = 0;
  for (let k = 0; k < 200; k += 1) {
    const each = caseOf(randomUnitary(random), imperfectTriple(random));
    const { kind, solutions } = solve(each);
    const ours = kind === 'exact' ? solutions : [];
    const searched = searchedZeros(each.problem, 6);
    const missing = searched.filter(({ fastAxesRad }) => !isAmong(ours, fastAxesRad, 1e-5));
    expect(missing, JSON.stringify(each)).toEqual([]);
    expect(searched.length, JSON.stringify(each)).toBe(ours.length);
    found += searched.length;
  }
  expect(found).toBeGreaterThan(600);
}, 120_000);

test('any retardances: the settings from which a unitary was made are among those found', () => {
  const random = randomStream(43);
  for (let k = 0; k < 4000; k += 1) {
    const plates = 1 + Math.floor(3 * random());
    const retardancesRad = Array.from({ length: plates }, () => (10 + 700 * random()) * DEGREE);
    const angles = retardancesRad.map(() => Math.PI * random());
    const [[a], [c]] = stack(retardancesRad, angles);
    const each = caseOf([a.re, -c.im, c.re, -a.im], retardancesRad);
    const { shortfallRad, solutions, family } = solve(each);
    expect(shortfallRad).toBe(0);
    const members =
      family === null
        ? solutions
        : family.membersAt(family.freePlates.map((plate) => radians(angles[plate] ?? 0)));
    expect(isAmong(members, angles, 1e-5), JSON.stringify(each)).toBe(true);
    for (const { fastAxesRad, infidelity } of members) {
      expect(unitaryMiss(each.problem, fastAxesRad)).toBeLessThan(1e-26);
      expect(infidelity).toBeLessThan(2.5e-25);
    }
  }
});

test('a unitary on the edge of reach has one setting where two meet, two just inside, and a shortfall beyond', () => {
  const random = randomStream(44);
  let edges = 0;
  for (let k = 0; k < 300; k += 1) {
    const retardancesRad = Array.from({ length: 3 }, () => (50 + 80 * random()) * DEGREE);
    const [from, to] = [randomUnitary(random), randomUnitary(random)];
    const between = (share: number): Case => {
      const mix = from.map((part, index) => part + share * ((to[index] ?? 0) - part));
      const length = Math.hypot(...mix);
      const [w = 1, x = 0, y = 0, z = 0] = mix.map((part) => part / length);
      return caseOf([w, x, y, z], retardancesRad);
    };
    const reached = (share: number): boolean => solve(between(share)).shortfallRad === 0;
    if (!reached(0) || reached(1)) continue;
    let [low, high] = [0, 1];
    for (let step = 0; step < 50; step += 1) {
      const middle = (low + high) / 2;
      if (reached(middle)) low = middle;
      else high = middle;
    }
    edges += 1;
    const inside = solve(between(low - 1e-6));
    expect(inside.solutions.length).toBe(2);
    const edge = solve(between(low));
    expect(edge.solutions.length).toBe(1);
    for (const answer of [inside, edge]) expect(answer.kind).toBe('exact');
    const beyond = solve(between(high + 1e-6));
    expect(beyond.kind).toBe('nearest');
    expect(beyond.shortfallRad).toBeGreaterThan(0);
    // No further than the setting on the edge itself is.
    const [edgeAngles] = edge.solutions;
    const known = unitaryMiss(between(high + 1e-6).problem, edgeAngles?.fastAxesRad ?? []);
    expect(Math.sin(beyond.shortfallRad / 2)).toBeLessThanOrEqual(Math.sqrt(known) + 1e-12);
  }
  expect(edges).toBeGreaterThan(30);
}, 60_000);

test('θ and θ + 180°, U and −U, and a retardance with a whole turn more are one and the same', () => {
  const random = randomStream(45);
  for (let k = 0; k < 300; k += 1) {
    const retardancesRad = imperfectTriple(random);
    const each = caseOf(randomUnitary(random), retardancesRad);
    const answer = solve(each);
    const { w, x, y, z } = each.target;
    expect(solve(caseOf([-w, -x, -y, -z], retardancesRad)).solutions.length).toBe(answer.solutions.length);
    const more = solve({
      ...each,
      problem: {
        ...each.problem,
        retardancesRad: retardancesRad.map((rad, plate) => rad + 2 * Math.PI * plate),
      },
    });
    expect(more.solutions.length).toBe(answer.solutions.length);
    for (const { fastAxesRad } of answer.solutions) {
      expect(isAmong(more.solutions, fastAxesRad, 1e-7)).toBe(true);
      const turned = fastAxesRad.map((angle) => angle + Math.PI);
      expect(
        Math.abs(unitaryMiss(each.problem, turned) - unitaryMiss(each.problem, fastAxesRad)),
      ).toBeLessThan(1e-12);
    }
  }
});

test('U by three plates and then its inverse by the same three in reverse is no turn at all', () => {
  const random = randomStream(46);
  for (let k = 0; k < 200; k += 1) {
    const retardancesRad = imperfectTriple(random);
    const { target, problem } = caseOf(randomUnitary(random), retardancesRad);
    const there = solve({ target, problem });
    const back = apply({
      target: { w: target.w, x: -target.x, y: -target.y, z: -target.z },
      retardancesRad: [...retardancesRad].reverse().map(radians),
    });
    if (there.kind !== 'exact' || back.kind !== 'exact') continue;
    const both = [...retardancesRad, ...[...retardancesRad].reverse()];
    const angles = [...(there.solutions[0]?.fastAxesRad ?? []), ...(back.solutions[0]?.fastAxesRad ?? [])];
    expect(unitaryMiss({ target: matrixOf(1, 0, 0, 0), retardancesRad: both }, angles)).toBeLessThan(1e-27);
  }
});

test('angles lie in [0, π), solutions rise by angle, and the same question has the same answer to the last bit', () => {
  const random = randomStream(47);
  for (let k = 0; k < 1000; k += 1) {
    const each = caseOf(randomUnitary(random), imperfectTriple(random));
    const answer = solve(each);
    expect(solve(each)).toEqual(answer);
    for (const { fastAxesRad } of answer.solutions)
      for (const angle of fastAxesRad) expect(angle >= 0 && angle < Math.PI).toBe(true);
    if (answer.kind !== 'exact') continue;
    const firsts = answer.solutions.map(({ fastAxesRad: [first] }) => first ?? NaN);
    expect([...firsts].sort((a, b) => a - b)).toEqual(firsts);
  }
});

test('no plates, seven plates, an endless retardance and a quaternion of length 0 are refused', () => {
  const half = radians(Math.PI);
  const target = { w: 0, x: 1, y: 0, z: 0 };
  expect(() => apply({ target, retardancesRad: [] })).toThrow(RangeError);
  expect(() => apply({ target, retardancesRad: Array.from({ length: 7 }, () => half) })).toThrow(RangeError);
  expect(() => apply({ target, retardancesRad: [half, radians(NaN)] })).toThrow(RangeError);
  expect(() => apply({ target: { w: 0, x: 0, y: 0, z: 0 }, retardancesRad: [half] })).toThrow(RangeError);
  expect(() => apply({ target: { ...target, w: NaN }, retardancesRad: [half] })).toThrow(RangeError);
});
