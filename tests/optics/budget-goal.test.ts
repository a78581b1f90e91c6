import * as math from 'mathjs';
import { expect, test } from 'vitest';
import { type BudgetProblem, errorBudget, expectedInfidelity, whatIf } from '../../shared/optics/budget';
import { radians } from '../../shared/optics/units';
import { quaternionOf, randomProblem } from './budget-problems';
import { type Matrix, plate as plateMatrix, product, randomStream } from './independent';

/** One perturbation: how far each parameter stands from its nominal value. */
interface Moved {
  readonly retardance: readonly number[];
  readonly angle: readonly number[];
  readonly polariser: number;
  readonly shared: readonly number[];
}

/** 1 − F with mathjs's complex matrices: no line in common with the product. */
function infidelityByMathjs({ goal, plates, shared }: BudgetProblem, moved: Moved): number {
  const total = plates.reduce(
    (product, { retardanceRad, fastAxisRad }, k) => {
      const drift = shared.reduce(
        (sum, { retardancePerUnitRad }, j) =>
          sum + (retardancePerUnitRad[k] ?? NaN) * (moved.shared[j] ?? NaN),
        0,
      );
      const half = (retardanceRad + (moved.retardance[k] ?? NaN) + drift) / 2;
      const angle = fastAxisRad + (moved.angle[k] ?? NaN);
      const turn = (by: number) =>
        math.matrix([
          [math.cos(by), -math.sin(by)],
          [math.sin(by), math.cos(by)],
        ]);
      const delay = math.diag([math.exp(math.complex(0, -half)), math.exp(math.complex(0, half))]);
      return math.multiply(
        math.multiply(math.multiply(turn(angle), math.matrix(delay)), turn(-angle)),
        product,
      );
    },
    math.matrix([
      [math.complex(1, 0), math.complex(0, 0)],
      [math.complex(0, 0), math.complex(1, 0)],
    ]),
  );
  if (goal.kind === 'apply') {
    const { w, x, y, z } = goal.target;
    const wanted = math.matrix([
      [math.complex(w, -z), math.complex(-y, -x)],
      [math.complex(y, -x), math.complex(w, z)],
    ]);
    const { re, im } = traceOf(math.multiply(math.ctranspose(wanted), total));
    // F_avg = (|tr|² + 2) / 6
    return 1 - (re * re + im * im + 2) / 6;
  }
  const [s1, s2, s3] = goal.input;
  const [c, s] = [Math.cos(2 * moved.polariser), Math.sin(2 * moved.polariser)];
  const input = densityOf([c * s1 - s * s2, s * s1 + c * s2, s3]);
  const out = math.multiply(math.multiply(total, input), math.ctranspose(total));
  return 1 - traceOf(math.multiply(out, densityOf(goal.target))).re;
}

// mathjs's types call every trace a number; written out and read back it is the complex number that it is.
function traceOf(matrix: math.Matrix): math.Complex {
  return math.complex(String(math.trace(matrix)));
}

function densityOf([s1, s2, s3]: readonly [number, number, number]) {
  return math.matrix([
    [math.complex((1 + s1) / 2, 0), math.complex(s2 / 2, -s3 / 2)],
    [math.complex(s2 / 2, s3 / 2), math.complex((1 - s1) / 2, 0)],
  ]);
}

test.each(['prepare', 'apply'] as const)(
  'each contribution to a goal of kind %s is half the curvature of 1 − F as mathjs works it out, times σ²',
  (kind) => {
    const random = randomStream(41);
    for (let round = 0; round < 12; round += 1) {
      const problem = randomProblem(random, { kind, plateCount: 1 + (round % 6), sigmaDeg: 0.5 });
      const nothing: Moved = {
        retardance: problem.plates.map(() => 0),
        angle: problem.plates.map(() => 0),
        polariser: 0,
        shared: problem.shared.map(() => 0),
      };
      const only = (list: readonly number[], at: number, by: number) =>
        list.map((_, k) => (k === at ? by : 0));
      const { contributions } = errorBudget({ ...problem, extinction: null });
      expect(contributions).toHaveLength(3 * problem.plates.length + 2 + (kind === 'prepare' ? 1 : 0));
      for (const { kind: what, plate, sigma, infidelity } of contributions) {
        const index = plate ?? 0;
        const drift = what === 'wavelength' ? 0 : 1;
        const moved = (by: number): Moved => {
          if (what === 'retardance') return { ...nothing, retardance: only(nothing.retardance, index, by) };
          if (what === 'polariser') return { ...nothing, polariser: by };
          if (what === 'wavelength' || what === 'temperature')
            return { ...nothing, shared: only(nothing.shared, drift, by) };
          return { ...nothing, angle: only(nothing.angle, index, by) };
        };
        // 1 − F is 0 at the setting, so half its curvature is all there is to second order. From both sides and at two
        // steps (Richardson), what is left is of sixth order in a thousandth of a radian.
        const rate = what === 'wavelength' || what === 'temperature' ? problem.shared[drift] : undefined;
        const h = 1e-3 / Math.max(1e-9, ...(rate?.retardancePerUnitRad.map(Math.abs) ?? [1]));
        const both = (by: number): number =>
          (infidelityByMathjs(problem, moved(by)) + infidelityByMathjs(problem, moved(-by))) / 2;
        const numeric = (16 * both(h) - both(2 * h)) / 12;
        expect(Math.abs(numeric - (infidelity * h * h) / (sigma * sigma)), `${what} ${index}`).toBeLessThan(
          1e-14,
        );
      }
    }
  },
);

test('the fast expectation is the budget’s to the bit', () => {
  const random = randomStream(5);
  for (let round = 0; round < 400; round += 1) {
    const kind = round % 2 === 0 ? 'prepare' : 'apply';
    const problem = randomProblem(random, { kind, plateCount: 1 + (round % 6), sigmaDeg: 2 });
    expect(expectedInfidelity(problem)).toBe(errorBudget(problem).expectedInfidelity);
  }
});

test('what if a σ were another: the same as a problem that has it', () => {
  const random = randomStream(6);
  for (let round = 0; round < 60; round += 1) {
    const kind = round % 2 === 0 ? 'prepare' : 'apply';
    const plain = randomProblem(random, { kind, plateCount: 1 + (round % 4), sigmaDeg: 1 });
    const problem = { ...plain, extinction: 1e-3 };
    const budget = errorBudget(problem);
    budget.contributions.forEach((part, index) => {
      for (const factor of [0, 0.5, 2]) {
        const changed = whatIf(problem, index, factor);
        const direct = expectedInfidelity(withFactor(problem, part, factor));
        expect(Math.abs(changed / direct - 1)).toBeLessThan(1e-12);
      }
      // What the budget says about half the σ is what comes out.
      const half = whatIf(problem, index, 0.5);
      expect(1 - half / budget.expectedInfidelity).toBeCloseTo(part.gainIfHalved, 12);
    });
    expect(() => whatIf(problem, budget.contributions.length, 1)).toThrow(RangeError);
    expect(() => whatIf(problem, 0, -1)).toThrow(RangeError);
  }
});

function withFactor(
  problem: BudgetProblem,
  { kind, plate }: { readonly kind: string; readonly plate: number | null },
  factor: number,
): BudgetProblem {
  const times = (value: number) => radians(factor * value);
  return {
    ...problem,
    sigmaPolariserRad: kind === 'polariser' ? times(problem.sigmaPolariserRad) : problem.sigmaPolariserRad,
    extinction: kind === 'extinction' ? factor * (problem.extinction ?? NaN) : problem.extinction,
    shared: problem.shared.map((drift) =>
      drift.kind === kind ? { ...drift, sigma: factor * drift.sigma } : drift,
    ),
    plates: problem.plates.map((one, k) => {
      if (k !== plate) return one;
      if (kind === 'retardance') return { ...one, sigmaRetardanceRad: times(one.sigmaRetardanceRad) };
      if (kind === 'zero') return { ...one, sigmaOffsetRad: times(one.sigmaOffsetRad) };
      return {
        ...one,
        dialResolutionRad: times(one.dialResolutionRad),
        dialRepeatabilityRad: times(one.dialRepeatabilityRad),
      };
    }),
  };
}

test('a leaking polariser: exactly the fidelity of the mixture that it passes', () => {
  const random = randomStream(8);
  for (let round = 0; round < 40; round += 1) {
    const problem = randomProblem(random, { kind: 'prepare', plateCount: 2, sigmaDeg: 0 });
    const extinction = random() * 0.5;
    const { goal, plates } = problem;
    if (goal.kind !== 'prepare') throw new Error('a state was asked for');
    // Half a degree off, so that there is something of its own.
    const off = plates.map((one) => ({ ...one, fastAxisRad: radians(one.fastAxisRad + 0.009) }));
    const opposite = goal.input.map((part) => -part);
    const [o1 = NaN, o2 = NaN, o3 = NaN] = opposite;
    const alone = (input: readonly [number, number, number]): number =>
      expectedInfidelity({ ...problem, goal: { ...goal, input }, plates: off, extinction: null });
    const mixture = (alone(goal.input) + extinction * alone([o1, o2, o3])) / (1 + extinction);
    const budget = errorBudget({ ...problem, plates: off, extinction });
    expect(Math.abs(budget.expectedInfidelity / mixture - 1)).toBeLessThan(1e-12);
    // Nothing else is uncertain: the distribution is a point.
    expect(budget.expectedLow).toBeCloseTo(mixture, 12);
    expect(budget.expectedHigh).toBeCloseTo(mixture, 12);
    expect(budget.contributions.filter(({ infidelity }) => infidelity > 0).map(({ kind }) => kind)).toEqual([
      'extinction',
    ]);
  }
});

test('a drift that all plates share adds up before it is squared: opposite plates cancel it, equal ones double it', () => {
  const one = (fastAxis: number) => ({
    retardanceRad: radians(Math.PI),
    fastAxisRad: radians(fastAxis),
    sigmaRetardanceRad: radians(0),
    sigmaOffsetRad: radians(0),
    dialResolutionRad: radians(0),
    dialRepeatabilityRad: radians(0),
  });
  const budgetFor = (angles: readonly number[], target: Matrix) =>
    expectedInfidelity({
      goal: { kind: 'apply', target: quaternionOf(target) },
      plates: angles.map(one),
      sigmaPolariserRad: radians(0),
      extinction: null,
      shared: [{ kind: 'temperature', sigma: 3, retardancePerUnitRad: angles.map(() => 0.002) }],
    });
  const alone = budgetFor([0.3], plateMatrix(Math.PI, 0.3));
  const twice = budgetFor([0.3, 0.3], product(plateMatrix(Math.PI, 0.3), plateMatrix(Math.PI, 0.3)));
  const crossed = 0.3 + Math.PI / 2;
  const none = budgetFor([0.3, crossed], product(plateMatrix(Math.PI, crossed), plateMatrix(Math.PI, 0.3)));
  expect(alone).toBeCloseTo((0.006 * 0.006) / 6, 15);
  expect(twice / alone).toBeCloseTo(4, 10);
  expect(none).toBeLessThan(1e-30);
});

test('what doesn’t fit is refused: a leak that is no ratio, a drift without a plate, a negative σ of a drift', () => {
  const problem = randomProblem(randomStream(1), { kind: 'prepare', plateCount: 2, sigmaDeg: 1 });
  const drift = { kind: 'wavelength', sigma: 1, retardancePerUnitRad: [0.1] } as const;
  for (const wrong of [
    { ...problem, extinction: -1e-6 },
    { ...problem, extinction: 1.1 },
    { ...problem, extinction: NaN },
    { ...problem, shared: [drift] },
    { ...problem, shared: [{ ...drift, sigma: -1, retardancePerUnitRad: [0.1, 0.1] }] },
  ]) {
    expect(() => errorBudget(wrong)).toThrow(RangeError);
    expect(() => expectedInfidelity(wrong)).toThrow(RangeError);
  }
});

test('a unitary has no input: polariser and extinction make no difference to it', () => {
  const problem = randomProblem(randomStream(2), { kind: 'apply', plateCount: 3, sigmaDeg: 1 });
  const other = { ...problem, sigmaPolariserRad: radians(0.1), extinction: 0.01 };
  expect(errorBudget(other)).toEqual(errorBudget(problem));
  const kinds = errorBudget(problem).contributions.map(({ kind }) => kind);
  expect(kinds).not.toContain('polariser');
  expect(kinds).not.toContain('extinction');
});
