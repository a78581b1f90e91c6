import { expect, test } from 'vitest';
import {
  degrees,
  DEFAULT_CONVENTION,
  evaluateDials,
  infidelityBetween,
  parseState,
  PlateCountError,
  radians,
  retardStokes,
  roundDial,
  SOLVER_VERSION,
  solveTarget,
  type Stokes,
  type TargetPlate,
  type TargetProblem,
} from '../../shared/optics';
import { randomState, randomStream, stokesOf } from './independent';

const half: TargetPlate = {
  retardanceDeg: 179.2,
  retardanceSigmaDeg: 0.3,
  offsetSigmaDeg: 0.05,
  repeatabilityDeg: 0.06,
  scale: { offsetDeg: 12.4, direction: 1, resolutionDeg: 0.1 },
};
const quarter: TargetPlate = {
  retardanceDeg: 86.9,
  retardanceSigmaDeg: 0.4,
  offsetSigmaDeg: 0.09,
  repeatabilityDeg: 0.06,
  scale: { offsetDeg: 301.7, direction: -1, resolutionDeg: 0.1 },
};

function problem(target: Stokes, plates: readonly TargetPlate[] = [half, quarter]): TargetProblem {
  return {
    target,
    input: [1, 0, 0],
    plates,
    polariserSigmaDeg: 0.05,
    objective: 'least-expected-infidelity',
  };
}

function state(source: string): Stokes {
  const reading = parseState(source, DEFAULT_CONVENTION);
  if (!reading.ok) throw new Error(reading.error.message);
  return reading.stokes;
}

test('solutions come best first by expected infidelity, with dials that their scale and rounding give', () => {
  const random = randomStream(21);
  for (let k = 0; k < 200; k += 1) {
    const task = problem(stokesOf(randomState(random)));
    const solved = solveTarget(task);
    const expected = solved.solutions.map(({ expectedInfidelity }) => expectedInfidelity);
    expected.forEach((value, index) =>
      expect(value).toBeLessThanOrEqual((expected[index + 1] ?? Infinity) * (1 + 1e-9)),
    );
    for (const solution of solved.solutions) {
      solution.fastAxesDeg.forEach((angle, plate) => {
        const scale = task.plates[plate]?.scale;
        if (scale === undefined) throw new Error('more angles than plates');
        expect(angle >= 0 && angle < 180).toBe(true);
        const dial = (((scale.offsetDeg + scale.direction * angle) % 360) + 360) % 360;
        expect(solution.dialsDeg[plate]).toBe(roundDial(degrees(dial), scale.resolutionDeg));
      });
      expect(solution.expectedLow).toBeLessThan(solution.expectedInfidelity);
      expect(solution.expectedHigh).toBeGreaterThan(solution.expectedInfidelity);
      expect(solution.expectedInfidelity).toBeGreaterThanOrEqual(solution.infidelity);
    }
  }
});

test('the dialled infidelity and the states after each plate are those of the rounded dials, worked out plate by plate', () => {
  const random = randomStream(22);
  for (let k = 0; k < 100; k += 1) {
    const target = stokesOf(randomState(random));
    const task = problem(target);
    for (const { dialsDeg, dialledInfidelity, statesAfter } of solveTarget(task).solutions) {
      let light: Stokes = [1, 0, 0];
      dialsDeg.forEach((dial, plate) => {
        const { scale, retardanceDeg } = task.plates[plate] ?? half;
        const fastAxisRad = radians((scale.direction * (dial - scale.offsetDeg) * Math.PI) / 180);
        light = retardStokes({ retardanceRad: radians((retardanceDeg * Math.PI) / 180), fastAxisRad }, light);
        expect(infidelityBetween(light, statesAfter[plate] ?? [0, 0, 0])).toBeLessThan(1e-27);
      });
      expect(dialledInfidelity).toBeCloseTo(infidelityBetween(light, target), 14);
      expect(evaluateDials(task, dialsDeg).infidelity).toBe(dialledInfidelity);
    }
  }
});

test('rounding the dials to 0.1° costs at most what half a step of both plates can', () => {
  const random = randomStream(24);
  for (let k = 0; k < 200; k += 1) {
    const solved = solveTarget(problem(stokesOf(randomState(random))));
    if (solved.kind !== 'exact') continue;
    for (const { dialledInfidelity } of solved.solutions) {
      // 0.05° of a plate moves the light by at most four times that on the sphere: 1 − F ≤ ¼ (2 · 4 · 0.05°)².
      expect(dialledInfidelity).toBeLessThan(0.25 * ((0.4 * Math.PI) / 180) ** 2);
    }
  }
});

test('a circular target that these plates miss by 2.3° says so and gives the closest setting', () => {
  // |86.9 − 90| − |179.2 − 180| = 2.3 degrees on the sphere: 1 − F = sin² 1.15°.
  const solved = solveTarget(problem(state('(H + i V)/sqrt(2)')));
  expect(solved.kind).toBe('nearest');
  expect(solved.shortfallDeg).toBeCloseTo(2.3, 10);
  expect(solved.solutions[0]?.infidelity).toBeCloseTo(Math.sin((1.15 * Math.PI) / 180) ** 2, 15);
});

test('turning one dial by hand by 180° changes nothing, and by 1° costs what the plate makes of it', () => {
  const task = problem(state('bloch(109.47deg, 120deg)'));
  const dials = solveTarget(task).solutions[0]?.dialsDeg ?? [];
  const [first = NaN, second = NaN] = dials;
  const here = evaluateDials(task, dials).infidelity;
  expect(evaluateDials(task, [first + 180, second]).infidelity).toBeCloseTo(here, 14);
  // A half-wave plate turned by 1° moves the light by about 4° on the sphere: 1 − F about sin² 2°.
  const turned = evaluateDials(task, [first + 1, second]).infidelity;
  expect(turned).toBeGreaterThan(0.5 * Math.sin((2 * Math.PI) / 180) ** 2);
  expect(turned).toBeLessThan(1.5 * Math.sin((2 * Math.PI) / 180) ** 2);
  expect(() => evaluateDials(task, [first])).toThrow(RangeError);
});

test('the answer survives JSON unchanged and is the same each time', () => {
  const random = randomStream(23);
  for (let k = 0; k < 50; k += 1) {
    const task = problem(stokesOf(randomState(random)));
    const solved = solveTarget(task);
    const parsed: unknown = JSON.parse(JSON.stringify(solved));
    expect(parsed).toEqual(solved);
    expect(solveTarget(task)).toEqual(solved);
  }
  expect(SOLVER_VERSION).toMatch(/^\d+\.\d+\.\d+$/);
});

test('any number of plates but two is refused by name', () => {
  for (const plates of [[], [half], [quarter, half, quarter]]) {
    expect(() => solveTarget(problem([0, 1, 0], plates))).toThrow(PlateCountError);
  }
});
