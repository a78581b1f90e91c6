import { afterAll, expect, test } from 'vitest';
import { radians } from '../../shared/optics';
import { matrixOf, unitaryMiss } from '../optics/unitary-search';
import { Deviations } from './deviations';
import { beamOrder, DEGREE, farthest, type Four, solve, type Three } from './three-plate-settings';

/*
 * Gates, rotators and half-wave gates by three plates, two quarter- and one half-wave: the project's collected references,
 * sections 1.5 and 1.6, whose tables were computed there independently (numpy, scipy).
 */
const deviations = new Deviations();
afterAll(() => deviations.print('Gates by three plates against collected values, worst deviation'));

const ROOT = Math.SQRT1_2;

test('the entanglement infidelity that calibrated plates leave of Hadamard, X, Z and the identity', () => {
  // Infidelity here is the average gate's, ⅔ of the entanglement infidelity sin²(ε/2).
  const hadamard: Four = [0, ROOT, 0, ROOT];
  for (const target of [hadamard, [0, 1, 0, 0], [0, 0, 0, 1]] as const) {
    const { kind, solutions } = solve(target, beamOrder([89.2, 180.7, 90.5]));
    expect(kind).toBe('nearest');
    const off = Math.abs(1.5 * (solutions[0]?.infidelity ?? NaN) - Math.sin(0.3 * DEGREE) ** 2);
    expect(deviations.note('1.5 89.2/180.7/90.5: sin²(0.3°)', off)).toBeLessThan(1e-14);
  }
  expect(Math.abs(Math.sin(0.3 * DEGREE) ** 2 - 2.742e-5)).toBeLessThan(5e-9);
  const identity = solve([1, 0, 0, 0], [90, 178, 90]);
  expect(identity.shortfallRad / DEGREE).toBeCloseTo(2, 9);
  const off = Math.abs(1.5 * (identity.solutions[0]?.infidelity ?? NaN) - Math.sin(DEGREE) ** 2);
  expect(deviations.note('1.5 90/178/90, identity: sin²(1°)', off)).toBeLessThan(1e-14);
  // The same plates make T and anything generic in four ways.
  expect(
    solve([Math.cos(22.5 * DEGREE), 0, 0, Math.sin(22.5 * DEGREE)], beamOrder([89.2, 180.7, 90.5])).solutions,
  ).toHaveLength(4);
});

test('rotators are missed by at least x = max(0, |a + c| − |e|), half-wave gates by y = max(0, |a − c| − |e|), in any order', () => {
  for (const [one, half, two] of [
    [91, 180, 91],
    [92, 180, 91],
    [89, 180, 89],
  ] as const) {
    const [a, c, e] = [one - 90, two - 90, half - 180];
    const x = Math.max(0, Math.abs(a + c) - Math.abs(e)) * DEGREE;
    const y = Math.max(0, Math.abs(a - c) - Math.abs(e)) * DEGREE;
    for (const plates of [
      [one, half, two],
      [half, one, two],
      [one, two, half],
    ]) {
      for (const angle of [0, 0.3, 1, 2.2]) {
        const [s, k] = [Math.sin(angle), Math.cos(angle)];
        const rotator = solve([k, 0, s, 0], plates).shortfallRad;
        const gate = solve([0, s, 0, k], plates).shortfallRad;
        // The references give sin²(x/2) as a bound, met for these plates; where it is 0 the target is not always reached.
        for (const [shortfall, least] of [
          [rotator, x],
          [gate, y],
        ] as const) {
          expect(shortfall).toBeGreaterThan(least - 1e-9);
          if (least > 0)
            expect(
              deviations.note('1.5 x and y for three plate sets (rad)', Math.abs(shortfall - least)),
            ).toBeLessThan(1e-9);
        }
      }
    }
  }
});

const EIGHTH = Math.PI / 8;
const GATES: readonly (readonly [
  name: string,
  target: Four,
  first: Three,
  second: Three,
  family: boolean,
])[] = [
  ['I', [1, 0, 0, 0], [0, 0, 0], [90, 0, 90], true],
  ['X', [0, 1, 0, 0], [90, 135, 90], [0, 45, 0], true],
  ['Y', [0, 0, 1, 0], [45, 0, 135], [135, 0, 45], true],
  ['Z', [0, 0, 0, 1], [45, 90, 45], [135, 0, 135], true],
  ['Hadamard', [0, ROOT, 0, ROOT], [67.5, 112.5, 67.5], [157.5, 22.5, 157.5], true],
  ['S', [ROOT, 0, 0, ROOT], [45, 67.5, 45], [135, 22.5, 135], false],
  ['S†', [ROOT, 0, 0, -ROOT], [135, 157.5, 135], [45, 112.5, 45], false],
  ['T', [Math.cos(EIGHTH), 0, 0, Math.sin(EIGHTH)], [45, 56.25, 45], [135, 33.75, 135], false],
  ['T†', [Math.cos(EIGHTH), 0, 0, -Math.sin(EIGHTH)], [135, 146.25, 135], [45, 123.75, 45], false],
  ['√X', [ROOT, ROOT, 0, 0], [90, 112.5, 90], [0, 67.5, 0], false],
  ['√X†', [ROOT, -ROOT, 0, 0], [0, 22.5, 0], [90, 157.5, 90], false],
  ['Rx(30°)', [Math.cos(15 * DEGREE), Math.sin(15 * DEGREE), 0, 0], [90, 97.5, 90], [0, 82.5, 0], false],
  ['Ry(45°)', [Math.cos(EIGHTH), 0, Math.sin(EIGHTH), 0], [11.25, 0, 168.75], [101.25, 0, 78.75], true],
  ['Rz(60°)', [Math.cos(30 * DEGREE), 0, 0, Math.sin(30 * DEGREE)], [45, 60, 45], [135, 30, 135], false],
];

test.each(GATES)('%s with ideal quarter-half-quarter plates', (_, target, first, second, isFamily) => {
  const { kind, solutions, family } = solve(target, [90, 180, 90]);
  expect(kind).toBe(isFamily ? 'family' : 'exact');
  const problem = { target: matrixOf(...target), retardancesRad: [90, 180, 90].map((deg) => deg * DEGREE) };
  for (const published of [first, second]) {
    const setting = beamOrder(published);
    expect(
      unitaryMiss(
        problem,
        setting.map((deg) => deg * DEGREE),
      ),
    ).toBeLessThan(1e-30);
    const members =
      family === null
        ? solutions
        : family.membersAt(family.freePlates.map((plate) => radians((setting[plate] ?? NaN) * DEGREE)));
    const off = farthest(members, [setting]);
    expect(deviations.note('1.6 named gates (degrees)', off)).toBeLessThan(1e-9);
  }
  if (!isFamily) expect(solutions).toHaveLength(4);
});
