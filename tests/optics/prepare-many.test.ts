import fc from 'fast-check';
import { expect, test } from 'vitest';
import { prepare, radians, type Solved, type Stokes } from '../../shared/optics';
import { apart } from './dense-search';
import { randomState, randomStream, stokesOf, type Vector } from './independent';
import { globalMinimum, missed, type StackProblem } from './stack-search';

const DEGREE = Math.PI / 180;
const H: Stokes = [1, 0, 0];
const LINEAR: Stokes = [0.6, 0.8, 0];
const ELLIPTIC: Stokes = [0.48, 0.64, 0.6];
const CIRCULAR: Stokes = [0, 0, 1];

function solve({ input, target, retardancesRad }: StackProblem): Solved {
  return prepare({
    input: stokesOf(input),
    target: stokesOf(target),
    retardancesRad: retardancesRad.map(radians),
  });
}

function from(input: Stokes, target: Stokes, retardancesDeg: readonly number[]): Solved {
  return prepare({ input, target, retardancesRad: retardancesDeg.map((each) => radians(each * DEGREE)) });
}

function inDegrees({ solutions }: Solved): readonly (readonly number[])[] {
  return solutions.map(({ fastAxesRad }) =>
    fastAxesRad.map((angle) => Math.round((angle / DEGREE) * 1e9) / 1e9),
  );
}

/** Half- and quarter-wave plates as labs have them, or any plates. */
function randomPlates(random: () => number, count: number): readonly number[] {
  return Array.from({ length: count }, () => {
    const kind = random();
    if (kind < 0.4) return (170 + 20 * random()) * DEGREE;
    return kind < 0.8 ? (80 + 20 * random()) * DEGREE : (20 + 320 * random()) * DEGREE;
  });
}

function randomProblem(random: () => number, count: number): StackProblem {
  return {
    input: randomState(random),
    target: randomState(random),
    retardancesRad: randomPlates(random, count),
  };
}

test('one to six plates: each setting makes what it says by an independent product, turning plates by 180° changes nothing, and the answer is the same each time', () => {
  let worst = 0;
  const kinds = new Map<string, number>();
  fc.assert(
    fc.property(fc.integer(), fc.integer({ min: 1, max: 6 }), (seed, count) => {
      const problem = randomProblem(randomStream(seed), count);
      const answer = solve(problem);
      expect(answer.solutions.length).toBeGreaterThan(0);
      expect(answer.family === null).toBe(answer.kind !== 'family');
      for (const { fastAxesRad, infidelity } of answer.solutions) {
        const value = missed(problem, fastAxesRad);
        if (answer.shortfallRad === 0) worst = Math.max(worst, value);
        expect(value).toBeCloseTo(infidelity, 14);
        expect(fastAxesRad.every((angle) => angle >= 0 && angle < Math.PI)).toBe(true);
        expect(
          missed(
            problem,
            fastAxesRad.map((angle, k) => angle + (k % 2 === 0 ? Math.PI : 0)),
          ),
        ).toBeCloseTo(infidelity, 14);
      }
      answer.solutions.forEach(({ fastAxesRad }, index) => {
        for (const other of answer.solutions.slice(index + 1)) {
          expect(apart(fastAxesRad, other.fastAxesRad)).toBeGreaterThan(1e-9);
        }
      });
      expect(JSON.stringify(solve(problem))).toBe(JSON.stringify(answer));
      const label = `${count} ${answer.kind}`;
      kinds.set(label, (kinds.get(label) ?? 0) + 1);
    }),
    { numRuns: 400, seed: 31 },
  );
  process.stdout.write(`one to six plates: worst ${worst.toExponential(1)}, ${JSON.stringify([...kinds])}\n`);
  expect(worst).toBeLessThan(1e-24);
});

test('members of a family make the target at any free angle, and follow it continuously', () => {
  const random = randomStream(32);
  let members = 0;
  let steps = 0;
  for (let k = 0; k < 60; k += 1) {
    const problem = randomProblem(random, 3 + (k % 4));
    const { family, shortfallRad } = solve(problem);
    if (family === null || shortfallRad > 0) continue;
    const angles = family.freePlates.map(() => radians(Math.PI * random()));
    const here = family.membersAt(angles);
    const beside = family.membersAt(angles.map((angle, at) => radians(at === 0 ? angle + 1e-6 : angle)));
    for (const { fastAxesRad } of here) {
      members += 1;
      expect(missed(problem, fastAxesRad)).toBeLessThan(1e-24);
      family.freePlates.forEach((plate, at) => expect(fastAxesRad[plate]).toBe(angles[at]));
      if (here.length !== beside.length) continue;
      steps += 1;
      const nearest = Math.min(...beside.map((other) => apart(fastAxesRad, other.fastAxesRad)));
      // A branch moves with the free plate, but for the neighbourhood of a fold.
      expect(nearest).toBeLessThan(3e-4);
    }
  }
  expect(members).toBeGreaterThan(100);
  expect(steps).toBeGreaterThan(100);
});

test('one plate: every angle that reaches, every local optimum where none does, and a family where all angles do the same', () => {
  expect(inDegrees(from(H, LINEAR, [180])).map(([angle = NaN]) => angle)).toEqual([
    expect.closeTo(Math.atan2(0.8, 0.6) / 4 / DEGREE, 8),
    expect.closeTo(Math.atan2(0.8, 0.6) / 4 / DEGREE + 90, 8),
  ]);
  expect(inDegrees(from(H, H, [90]))).toEqual([[0], [90]]);
  // A quarter turn about A, the fast axis at 135°, right-handed, takes H to S3 = +1 (optics.md 1).
  expect(inDegrees(from(H, CIRCULAR, [90]))).toEqual([[135]]);
  const flip = from(CIRCULAR, [0, 0, -1], [180]);
  expect([flip.kind, flip.shortfallRad, flip.solutions.length]).toEqual(['family', 0, 8]);
  expect(flip.family?.membersAt([radians(0.3)])).toHaveLength(1);
  const away = from(CIRCULAR, H, [180]);
  expect([away.kind, away.solutions.length]).toEqual(['family', 8]);
  expect(away.shortfallRad).toBeCloseTo(Math.PI / 2, 12);
  const random = randomStream(33);
  for (let k = 0; k < 200; k += 1) {
    const problem = randomProblem(random, 1);
    const { kind, solutions } = solve(problem);
    expect(kind).toBe('nearest');
    // Local minima of a fine scan.
    const value = (at: number): number => missed(problem, [(at * Math.PI) / 720]);
    const scanned = Array.from({ length: 720 }, (_, at) => at).filter(
      (at) => value(at) < value(at - 1) && value(at) <= value(at + 1),
    );
    expect(solutions.length).toBe(scanned.length);
    for (const at of scanned) {
      const near = solutions.find(({ fastAxesRad }) => apart(fastAxesRad, [(at * Math.PI) / 720]) < 0.005);
      expect(near?.infidelity).toBeLessThanOrEqual(value(at));
    }
  }
});

test('by name: H to H, two and three half-wave plates, quarter–half–quarter', () => {
  const halves = [180, 180, 180];
  const gadget = [90, 180, 90];
  for (const [target, plates, free] of [
    [H, gadget, 1],
    [LINEAR, gadget, 1],
    [ELLIPTIC, gadget, 1],
    [CIRCULAR, gadget, 1],
    [H, [91, 178, 88], 1],
    [H, [180, 180], 1],
    [LINEAR, [180, 180], 1],
    // Only the difference of the three angles counts: two of them are free.
    [H, halves, 2],
    [LINEAR, halves, 2],
    // One quarter-wave plate at 135° makes it circular and half-wave plates flip it: back again after two.
    [CIRCULAR, [90, 180, 180], 2],
  ] as const) {
    const answer = from(H, target, plates);
    expect([plates, target, answer.kind, answer.shortfallRad, answer.family?.freePlates.length]).toEqual([
      plates,
      target,
      'family',
      0,
      free,
    ]);
    expect(answer.solutions.length).toBeLessThanOrEqual(16);
    expect(answer.solutions.length).toBeGreaterThanOrEqual(8);
  }
  const same = from(H, H, gadget);
  // Axes along H or V leave H alone: among the representatives.
  expect(inDegrees(same)).toContainEqual([0, 0, 0]);
});

test('half-wave plates keep light linear: circular light is a quarter turn away at every angle, elliptic light as far as it is from linear', () => {
  for (const count of [1, 2, 3, 4, 6]) {
    const circular = from(
      H,
      CIRCULAR,
      Array.from({ length: count }, () => 180),
    );
    expect([count, circular.kind]).toEqual([count, 'family']);
    expect(circular.shortfallRad).toBeCloseTo(Math.PI / 2, 10);
    if (count > 2) expect(circular.family?.freePlates).toHaveLength(count);
    if (count < 2) continue;
    const elliptic = from(
      H,
      ELLIPTIC,
      Array.from({ length: count }, () => 180),
    );
    expect([count, elliptic.kind]).toEqual([count, 'family']);
    expect(elliptic.shortfallRad).toBeCloseTo(Math.asin(0.6), 10);
  }
  // Two half-wave plates before a quarter-wave plate that is 1° off: circular light is missed by that degree.
  const off = from(H, CIRCULAR, [180, 180, 91]);
  expect([off.kind, off.family?.freePlates.length]).toEqual(['family', 2]);
  expect(off.shortfallRad / DEGREE).toBeCloseTo(1, 9);
});

test('the ends of reach: three plates of 30° make circular light from H, of 29° they miss it by 3°', () => {
  const edge = from(H, CIRCULAR, [30, 30, 30]);
  expect([
    edge.kind,
    edge.shortfallRad,
    inDegrees(edge).map((at) => at.map((angle) => Math.round(angle))),
  ]).toEqual(['exact', 0, [[135, 135, 135]]]);
  const short = from(H, CIRCULAR, [29, 29, 29]);
  expect([short.kind, short.solutions.length]).toEqual(['nearest', 1]);
  expect(short.shortfallRad / DEGREE).toBeCloseTo(3, 9);
  expect(from(H, CIRCULAR, [30, 30, 31]).kind).toBe('family');
  const six = from(H, CIRCULAR, [10, 10, 10, 10, 10, 10]);
  expect(six.shortfallRad / DEGREE).toBeCloseTo(30, 9);
});

test('a plate that does nothing between two that are needed is the free one', () => {
  const answer = from(H, CIRCULAR, [40, 360, 50.5]);
  expect([answer.kind, answer.shortfallRad, answer.family?.freePlates]).toEqual(['family', 0, [1]]);
  expect(answer.family?.membersAt([radians(1)]).length).toBeGreaterThan(0);
});

test('what is reported out of reach, a global search does not reach either, and what it says is the least', () => {
  const random = randomStream(34);
  let unreachable = 0;
  for (let k = 0; k < 400 && unreachable < 24; k += 1) {
    const count = 3 + (k % 2);
    const near = random() < 0.5 ? 0 : Math.PI;
    const problem: StackProblem = {
      input: randomState(random),
      target: randomState(random),
      retardancesRad: Array.from({ length: count }, () => near + (40 * random() - 10) * DEGREE),
    };
    const { shortfallRad } = solve(problem);
    if (shortfallRad === 0) continue;
    unreachable += 1;
    const least = globalMinimum(problem, count === 3 ? 24 : 10);
    expect(Math.sin(shortfallRad / 2) ** 2, JSON.stringify(problem)).toBeCloseTo(least, 9);
  }
  expect(unreachable).toBe(24);
});

test('no plates, seven plates, no light and an endless retardance are refused', () => {
  const half = radians(Math.PI);
  const seven = Array.from({ length: 7 }, () => half);
  for (const retardancesRad of [[], seven, [half, half, radians(Infinity)]]) {
    expect(() => prepare({ input: H, target: H, retardancesRad })).toThrow(RangeError);
  }
  for (const retardancesRad of [[half], [half, half, half]]) {
    expect(() => prepare({ input: H, target: [0, 0, 0], retardancesRad })).toThrow(RangeError);
  }
});

const horizontal: Vector = [
  { re: 1, im: 0 },
  { re: 0, im: 0 },
];

test('light that is already there has three plates that leave it alone', () => {
  const random = randomStream(35);
  for (let k = 0; k < 40; k += 1) {
    const retardancesRad = randomPlates(random, 3);
    const problem = { input: horizontal, target: horizontal, retardancesRad };
    const answer = solve(problem);
    expect(answer.shortfallRad).toBe(0);
    for (const { fastAxesRad } of answer.solutions) expect(missed(problem, fastAxesRad)).toBeLessThan(1e-24);
  }
});
