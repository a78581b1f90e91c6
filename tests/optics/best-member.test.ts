import { expect, test } from 'vitest';
import { bestMember, type Family, memberNear, prepare, radians, type Setting } from '../../shared/optics';
import { lineMinimum } from '../../shared/optics/solver/line-minimum';
import { apart, inputH } from './dense-search';
import { randomState, randomStream, stokesOf } from './independent';
import { missed, type StackProblem } from './stack-search';

const DEGREE = Math.PI / 180;

function family({ input, target, retardancesRad }: StackProblem): Family {
  const solved = prepare({
    input: stokesOf(input),
    target: stokesOf(target),
    retardancesRad: retardancesRad.map(radians),
  });
  if (solved.family === null) throw new Error('these plates have a family');
  return solved.family;
}

function threePlates(random: () => number): StackProblem {
  const retardancesRad = [90, 180, 90].map((each) => (each + 6 * (random() - 0.5)) * DEGREE);
  return { input: inputH, target: randomState(random), retardancesRad };
}

/** What an error of 0.1° of each angle and 0.5° of each retardance costs, by differences. */
function toleranceCost(problem: StackProblem): (setting: Setting) => number {
  const { retardancesRad } = problem;
  return ({ fastAxesRad }) => {
    let sum = 0;
    fastAxesRad.forEach((_, plate) => {
      const by = (size: number): readonly number[] => fastAxesRad.map((_, k) => (k === plate ? size : 0));
      const turned = by(0.1 * DEGREE);
      sum += missed(
        problem,
        fastAxesRad.map((angle, k) => angle + (turned[k] ?? 0)),
      );
      const delayed = by(0.5 * DEGREE);
      const off = { ...problem, retardancesRad: retardancesRad.map((each, k) => each + (delayed[k] ?? 0)) };
      sum += missed(off, fastAxesRad);
    });
    return sum;
  };
}

/** The best member of these plates' family by that cost: it is exact. */
function bestOf(problem: StackProblem) {
  const cost = toleranceCost(problem);
  const members = family(problem);
  const best = bestMember(members, cost);
  if (best === null) throw new Error('a family has members');
  expect(missed(problem, best.fastAxesRad)).toBeLessThan(1e-24);
  return { best, cost, members };
}

/** The least that any member with these angles of the free plates costs. */
function leastOf(
  { membersAt }: Family,
  cost: (setting: Setting) => number,
  angles: readonly (readonly number[])[],
): number {
  return Math.min(...angles.flatMap((each) => membersAt(each.map(radians)).map(cost)));
}

test('three plates: no member on a grid of a quarter degree costs less than the best one, and it makes the target', () => {
  const random = randomStream(71);
  for (let k = 0; k < 12; k += 1) {
    const problem = threePlates(random);
    const { best, cost, members } = bestOf(problem);
    const everyQuarterDegree = Array.from({ length: 720 }, (_, at) => [(at * Math.PI) / 720]);
    expect(cost(best)).toBeLessThan(leastOf(members, cost, everyQuarterDegree) * (1 + 1e-9));
    expect(bestMember(members, cost)).toEqual(best);
  }
});

test('more free plates: the best member is exact and costs less than the best of 400 random ones, or all but', () => {
  const random = randomStream(72);
  for (const count of [4, 5, 6]) {
    const retardancesRad = Array.from({ length: count }, (_, k) => (k % 2 === 0 ? 91 : 178.5) * DEGREE);
    const problem: StackProblem = { input: inputH, target: randomState(random), retardancesRad };
    const { best, cost, members } = bestOf(problem);
    const draws = Array.from({ length: 400 }, () => members.freePlates.map(() => Math.PI * random()));
    expect(cost(best)).toBeLessThan(leastOf(members, cost, draws) * 1.001);
  }
});

test('least travel from a setting that is itself a member is that setting', () => {
  const random = randomStream(73);
  for (let k = 0; k < 40; k += 1) {
    const members = family(threePlates(random));
    const [held] = members.membersAt([radians(Math.PI * random())]);
    if (held === undefined) continue;
    expect(memberNear(members, held.fastAxesRad)).toEqual(held);
    const travel = ({ fastAxesRad }: Setting): number => apart(fastAxesRad, held.fastAxesRad);
    const nearest = bestMember(members, travel);
    expect(nearest === null ? Infinity : travel(nearest)).toBeLessThan(1e-3 * DEGREE);
  }
});

test('a held setting keeps its branch when the plates are calibrated anew', () => {
  const random = randomStream(74);
  let kept = 0;
  for (let k = 0; k < 60; k += 1) {
    const problem = threePlates(random);
    const before = family(problem);
    const after = family({
      ...problem,
      retardancesRad: problem.retardancesRad.map((each) => each + 1e-5),
    });
    // The windows that follow may differ; the held angles decide in either.
    for (const held of before.membersAt([radians(Math.PI * random())])) {
      const now = memberNear(after, held.fastAxesRad);
      if (now !== null && apart(now.fastAxesRad, held.fastAxesRad) < 0.01) kept += 1;
    }
  }
  expect(kept).toBeGreaterThan(200);
});

test('a family without members has no best one, and a cost that isn’t a number never wins', () => {
  const empty: Family = { freePlates: [0], membersAt: () => [] };
  expect(bestMember(empty, () => 0)).toBeNull();
  expect(memberNear(empty, [radians(0)])).toBeNull();
  const line: Family = {
    freePlates: [0],
    membersAt: ([angle = radians(0)]) => [{ fastAxesRad: [angle], infidelity: 0 }],
  };
  const [angle = NaN] =
    bestMember(line, ({ fastAxesRad: [at = NaN] }) => (at < 1 ? NaN : at))?.fastAxesRad ?? [];
  expect(angle).toBeGreaterThanOrEqual(1);
  expect(angle).toBeLessThan(1.001);
});

test('a line minimum is found to its tolerance, on parabolas, kinks and beside walls', () => {
  const random = randomStream(75);
  for (let k = 0; k < 200; k += 1) {
    const low = 0.2 + 0.6 * random();
    const shapes = [
      (x: number) => (x - low) ** 2,
      (x: number) => Math.abs(x - low),
      (x: number) => (x < low ? Infinity : x),
      (x: number) => -Math.cos(3 * (x - low)),
    ];
    const shape = shapes[k % shapes.length] ?? Math.abs;
    const found = lineMinimum(shape, { at: 0.9, value: shape(0.9) }, [0, 1], 1e-6);
    expect(found.value).toBe(shape(found.at));
    expect(Math.abs(found.at - low)).toBeLessThan(1e-4);
  }
});
