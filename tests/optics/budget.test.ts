import fc from 'fast-check';
import { expect, test } from 'vitest';
import {
  type Budget,
  errorBudget,
  infidelityBetween,
  radians,
  type Radians,
  retardStokes,
  type Stokes,
  type UncertainPlate,
} from '../../shared/optics';
import { randomStream } from './independent';

const DEGREE = Math.PI / 180;

function plate(
  retardanceDeg: number,
  fastAxisDeg: number,
  sigmas: readonly [number, number, number, number],
): UncertainPlate {
  const [retardance, offset, resolution, repeatability] = sigmas;
  return {
    retardanceRad: radians(retardanceDeg * DEGREE),
    fastAxisRad: radians(fastAxisDeg * DEGREE),
    sigmaRetardanceRad: radians(retardance * DEGREE),
    sigmaOffsetRad: radians(offset * DEGREE),
    dialResolutionRad: radians(resolution * DEGREE),
    dialRepeatabilityRad: radians(repeatability * DEGREE),
  };
}

/** A state's budget with nothing but the plates and the polariser's angle. */
function budgetOf(
  input: Stokes,
  target: Stokes,
  plates: readonly UncertainPlate[],
  sigmaPolariserRad: Radians,
): Budget {
  const goal = { kind: 'prepare', input, target } as const;
  return errorBudget({ goal, plates, sigmaPolariserRad, extinction: null, shared: [] });
}

function through(input: Stokes, plates: readonly UncertainPlate[]): Stokes {
  return plates.reduce<Stokes>((state, next) => retardStokes(next, state), input);
}

test('one half-wave plate in H: 1 − F is (2η)² for an error η of its angle, and a quarter of σ² sin² 2θ for one of its retardance', () => {
  // A half-wave plate off by η turns the light's azimuth by 2η: 1 − F = sin² 2η.
  const input: Stokes = [1, 0, 0];
  const plates = [plate(180, 22.5, [0.3, 0.05, 0.1, 0.06])];
  const { contributions, expectedInfidelity } = budgetOf(input, through(input, plates), plates, radians(0));
  const of = (kind: string): number => contributions.find((part) => part.kind === kind)?.infidelity ?? NaN;
  expect(of('zero')).toBeCloseTo((2 * 0.05 * DEGREE) ** 2, 18);
  expect(of('dial')).toBeCloseTo(4 * (0.1 ** 2 / 12 + 0.06 ** 2) * DEGREE ** 2, 18);
  expect(of('retardance')).toBeCloseTo(0.25 * (0.3 * DEGREE) ** 2 * 0.5, 18);
  expect(expectedInfidelity).toBeCloseTo(
    contributions.reduce((sum, part) => sum + part.infidelity, 0),
    18,
  );
});

const angleDeg = fc.double({ min: 0, max: 180, noNaN: true });

test('each derivative is the one that finite differences give', () => {
  fc.assert(
    fc.property(
      angleDeg,
      angleDeg,
      fc.double({ min: 60, max: 200, noNaN: true }),
      fc.double({ min: 60, max: 200, noNaN: true }),
      (a, b, first, second) => {
        const input: Stokes = [0.48, -0.6, 0.64];
        const plates = [plate(first, a, [1, 2, 0, 3]), plate(second, b, [4, 5, 0, 6])];
        const target = through(input, plates);
        const { contributions } = budgetOf(input, target, plates, radians(7 * DEGREE));
        const h = 1e-5;
        for (const { kind, plate: index, sigma, infidelity } of contributions) {
          const moved = (by: number): Stokes => {
            const turn = kind === 'polariser' ? 2 * by : 0;
            const [c, s] = [Math.cos(turn), Math.sin(turn)];
            const from: Stokes = [c * input[0] - s * input[1], s * input[0] + c * input[1], input[2]];
            const changed = plates.map((one, k) => {
              if (k !== index) return one;
              return kind === 'retardance'
                ? { ...one, retardanceRad: radians(one.retardanceRad + by) }
                : { ...one, fastAxisRad: radians(one.fastAxisRad + by) };
            });
            return through(from, changed);
          };
          // The chord between both sides is 2h|∂p|, and the infidelity between them a quarter of its square.
          const numeric = (infidelityBetween(moved(h), moved(-h)) / (4 * h * h)) * sigma * sigma;
          expect(Math.abs(numeric - infidelity)).toBeLessThan(1e-8 * (1 + infidelity));
        }
      },
    ),
  );
});

/** Two standard normal numbers by the polar method. */
function normalPair(random: () => number): readonly [number, number] {
  const radius = Math.sqrt(-2 * Math.log(1 - random()));
  const angle = 2 * Math.PI * random();
  return [radius * Math.cos(angle), radius * Math.sin(angle)];
}

test('expectation and quantiles agree with drawing every parameter at random', () => {
  const input: Stokes = [1, 0, 0];
  const plates = [plate(179.2, 71.1, [0.3, 0.05, 0, 0.07]), plate(86.9, 114.7, [0.4, 0.09, 0, 0.07])];
  const sigmaPolariser = radians(0.05 * DEGREE);
  const exactTarget = through(input, plates);
  const missed: Stokes = [exactTarget[0], ...rotated(exactTarget[1], exactTarget[2], 0.012)];
  for (const target of [exactTarget, missed]) {
    const budget = budgetOf(input, target, plates, sigmaPolariser);
    const random = randomStream(11);
    const draws = Array.from({ length: 40_000 }, () => {
      const [polariser] = normalPair(random);
      const turn = 2 * polariser * sigmaPolariser;
      const drawn = plates.map((one) => {
        const [r, z] = normalPair(random);
        const [d] = normalPair(random);
        return {
          ...one,
          retardanceRad: radians(one.retardanceRad + r * one.sigmaRetardanceRad),
          fastAxisRad: radians(one.fastAxisRad + z * one.sigmaOffsetRad + d * one.dialRepeatabilityRad),
        };
      });
      return infidelityBetween(through([Math.cos(turn), Math.sin(turn), 0], drawn), target);
    }).sort((x, y) => x - y);
    const mean = draws.reduce((sum, value) => sum + value, 0) / draws.length;
    // 40 000 draws pin the mean to half a percent and these quantiles to about two.
    expect(budget.expectedInfidelity / mean).toBeCloseTo(1, 1.5);
    expect(Math.abs(budget.expectedInfidelity / mean - 1)).toBeLessThan(0.02);
    expect(Math.abs(budget.expectedLow / (draws[2000] ?? NaN) - 1)).toBeLessThan(0.06);
    expect(Math.abs(budget.expectedHigh / (draws[38_000] ?? NaN) - 1)).toBeLessThan(0.03);
  }
});

function rotated(x: number, y: number, by: number): readonly [number, number] {
  return [x * Math.cos(by) - y * Math.sin(by), x * Math.sin(by) + y * Math.cos(by)];
}

test('shares add up to 1 with the setting’s own infidelity, and halving a σ gains three quarters of its share', () => {
  const input: Stokes = [1, 0, 0];
  const plates = [plate(179.2, 71.1, [0.3, 0.05, 0.1, 0.06]), plate(86.9, 114.7, [0.4, 0.09, 0.1, 0.06])];
  const budget = budgetOf(input, [0, 0, 1], plates, radians(0.001));
  const own = infidelityBetween(through(input, plates), [0, 0, 1]);
  const shares = budget.contributions.reduce((sum, { share }) => sum + share, 0);
  expect(shares + own / budget.expectedInfidelity).toBeCloseTo(1, 12);
  for (const part of budget.contributions) {
    expect(part.gainIfHalved).toBeCloseTo(0.75 * part.share, 15);
  }
  const sizes = budget.contributions.map(({ infidelity }) => infidelity);
  expect([...sizes].sort((a, b) => b - a)).toEqual(sizes);
});

test('a negative σ is refused, and no uncertainty at all means the setting’s own infidelity', () => {
  const input: Stokes = [1, 0, 0];
  const exact = [plate(180, 10, [0, 0, 0, 0])];
  expect(() => budgetOf(input, input, [plate(180, 10, [-1, 0, 0, 0])], radians(0))).toThrow(RangeError);
  const { expectedInfidelity, expectedLow, expectedHigh } = budgetOf(input, [0, 1, 0], exact, radians(0));
  const own = infidelityBetween(through(input, exact), [0, 1, 0]);
  for (const value of [expectedInfidelity, expectedLow, expectedHigh]) expect(value).toBeCloseTo(own, 14);
});
