import { expect, test } from 'vitest';
import {
  degrees,
  DEFAULT_CONVENTION,
  evaluateDials,
  infidelityBetween,
  parseState,
  parseUnitary,
  platesAtDials,
  radians,
  retardStokes,
  roundDial,
  SOLVER_VERSION,
  solveTarget,
  statesBehind,
  type Stokes,
  type TargetPlate,
  type TargetProblem,
} from '../../shared/optics';
import { randomState, randomStream, stokesOf } from './independent';

const motion = { speedDegPerS: null, backlashDeg: 0, approach: 'either' } as const;

const half: TargetPlate = {
  retardanceDeg: 179.2,
  retardanceSigmaDeg: 0.3,
  offsetSigmaDeg: 0.05,
  repeatabilityDeg: 0.06,
  perNmDeg: -0.22,
  perKelvinDeg: -0.022,
  scale: { offsetDeg: 12.4, direction: 1, resolutionDeg: 0.1, rangeDeg: null },
  motion,
};
const quarter: TargetPlate = {
  retardanceDeg: 86.9,
  retardanceSigmaDeg: 0.4,
  offsetSigmaDeg: 0.09,
  repeatabilityDeg: 0.06,
  perNmDeg: -0.11,
  perKelvinDeg: -0.011,
  scale: { offsetDeg: 301.7, direction: -1, resolutionDeg: 0.1, rangeDeg: null },
  motion,
};

function problem(target: Stokes, plates: readonly TargetPlate[] = [half, quarter]): TargetProblem {
  return {
    goal: { kind: 'prepare', input: [1, 0, 0], target },
    plates,
    polariserSigmaDeg: 0.05,
    polariserExtinction: null,
    wavelengthSigmaNm: 0,
    temperatureSigmaK: 0,
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    heldFastAxesDeg: null,
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
    for (const { dialsDeg, dialledInfidelity } of solveTarget(task).solutions) {
      const statesAfter = statesBehind([1, 0, 0], platesAtDials(task.plates, dialsDeg));
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

test('no plate and seven plates are refused', () => {
  for (const plates of [[], Array.from({ length: 7 }, () => half)]) {
    expect(() => solveTarget(problem([0, 1, 0], plates))).toThrow(RangeError);
  }
});

const unitary = (source: string) => {
  const reading = parseUnitary(source, DEFAULT_CONVENTION);
  if (!reading.ok) throw new Error(reading.error.message);
  return reading.quaternion;
};

test('a unitary is applied by three calibrated plates, and its dials make it as well as they are rounded', () => {
  const plates = [quarter, half, { ...quarter, retardanceDeg: 92.3 }];
  const task: TargetProblem = {
    ...problem([1, 0, 0], plates),
    goal: { kind: 'apply', target: unitary('zyz(30deg, 70deg, 110deg)') },
  };
  const solved = solveTarget(task);
  expect(solved.kind).toBe('exact');
  expect(solved.solutions).toHaveLength(4);
  for (const { infidelity, dialsDeg, dialledInfidelity, expectedInfidelity } of solved.solutions) {
    expect(infidelity).toBeLessThan(1e-24);
    expect(evaluateDials(task, dialsDeg).infidelity).toBe(dialledInfidelity);
    expect(dialledInfidelity).toBeLessThan(1e-4);
    expect(expectedInfidelity).toBeGreaterThan(0);
  }
});

test('of a family the best member for the budget stands first, and a held member is among the solutions', () => {
  const plates = [quarter, half, quarter];
  const target = state('bloch(70deg, 40deg)');
  const solved = solveTarget(problem(target, plates));
  expect(solved.kind).toBe('family');
  expect(solved.freePlates).toHaveLength(1);
  const [best, ...others] = solved.solutions;
  for (const other of others) {
    expect(best?.expectedInfidelity).toBeLessThanOrEqual(other.expectedInfidelity * (1 + 1e-9));
  }
  const some = others.at(-1)?.fastAxesDeg ?? [];
  const [free = 0] = solved.freePlates;
  const held = some.map((angle, plate) => (plate === free ? (angle + 3.7) % 180 : angle));
  const holding = solveTarget({ ...problem(target, plates), heldFastAxesDeg: held });
  expect(
    holding.solutions.some(
      ({ fastAxesDeg }) => Math.abs((fastAxesDeg[free] ?? 0) - (held[free] ?? 0)) < 1e-9,
    ),
  ).toBe(true);
});

test('nearest to the present dials comes first when that is the objective, each plate by its nearer reading', () => {
  const random = randomStream(31);
  for (let k = 0; k < 50; k += 1) {
    const presentDialsDeg = [360 * random(), 360 * random()];
    const task: TargetProblem = {
      ...problem(stokesOf(randomState(random))),
      objective: 'nearest-to-present',
      presentDialsDeg,
    };
    const travels = solveTarget(task).solutions.map(({ dialsDeg, travelDeg }) => {
      const turned = dialsDeg.reduce((sum, dial, plate) => {
        const apart = Math.abs(dial - (presentDialsDeg[plate] ?? 0)) % 360;
        expect(Math.min(apart, 360 - apart)).toBeLessThanOrEqual(90.1);
        return sum + Math.min(apart, 360 - apart);
      }, 0);
      expect(travelDeg).toBeCloseTo(turned, 9);
      return turned;
    });
    travels.forEach((travel, index) =>
      expect(travel).toBeLessThanOrEqual((travels[index + 1] ?? Infinity) + 1e-9),
    );
  }
});

test('a mount that does not turn all the way round is dialled within its range', () => {
  const random = randomStream(32);
  const narrow: TargetPlate = { ...half, scale: { ...half.scale, rangeDeg: { from: -20, to: 175 } } };
  for (let k = 0; k < 100; k += 1) {
    const task = problem(stokesOf(randomState(random)), [narrow, quarter]);
    for (const { dialsDeg, dialledInfidelity } of solveTarget(task).solutions) {
      expect(dialsDeg[0]).toBeGreaterThanOrEqual(-20);
      expect(dialsDeg[0]).toBeLessThanOrEqual(175);
      expect(evaluateDials(task, dialsDeg).infidelity).toBe(dialledInfidelity);
    }
  }
});
