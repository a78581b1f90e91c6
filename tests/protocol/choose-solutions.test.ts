import { expect, test } from 'vitest';
import { DEFAULT_CONVENTION } from '../../shared/optics/convention';
import { wrapSigned } from '../../shared/optics/units';
import { chooseSolutions, chosenSolution } from '../../shared/protocol/choose-solutions';
import { benchProblem, solveRow, type SolvingBench, type SolvingTask } from '../../shared/protocol/solve-row';
import type { SolvingPlate } from '../../shared/protocol/solving-plates';

const plate = (retardanceDeg: number, offsetDeg: number): SolvingPlate => ({
  construction: 'compound-zero-order',
  material: 'quartz',
  order: 0,
  mount: {
    direction: 1,
    resolutionDeg: 0.1,
    repeatabilityDeg: 0.05,
    rangeDeg: null,
    speedDegPerS: null,
    backlashDeg: 0,
    approach: 'either',
  },
  calibration: {
    wavelengthNm: 810,
    temperatureC: null,
    retardanceDeg,
    retardanceSigmaDeg: 0.3,
    offsetDeg,
    offsetSigmaDeg: 0.05,
  },
});

const bench: SolvingBench = {
  wavelengthNm: 810,
  wavelengthSigmaNm: 0.2,
  temperatureC: null,
  temperatureSigmaK: 0,
  inputExpression: 'H',
  polariserSigmaDeg: 0.05,
  polariserExtinction: 1e-5,
  plates: [plate(179.2, 12.4), plate(88.9, 301.7)],
};

const expressions = ['bloch(70deg, 20deg)', 'bloch(110deg, 200deg)', 'D', 'bloch(40deg, 300deg)', 'A'];

function chosen(objective: SolvingTask['objective'], held: readonly (readonly number[] | null)[]) {
  const read = benchProblem(bench, DEFAULT_CONVENTION, {
    kind: 'prepare',
    objective,
    presentDialsDeg: [100, 100],
  });
  if (!read.ok) throw new Error(read.error.message);
  const rows = expressions.map((expression, place) => {
    const heldFastAxesDeg = held[place] ?? null;
    const result = solveRow(expression, read.problem, DEFAULT_CONVENTION, heldFastAxesDeg);
    if (result.status !== 'solved') throw new Error(`${expression} can’t be read`);
    return { solved: result.solved, heldFastAxesDeg };
  });
  const choices = chooseSolutions(rows, read.problem);
  const dials = choices.map(({ dialsDeg }) => dialsDeg);
  const travel = dials.reduce<number>((sum, to, step) => {
    const from = step === 0 ? [100, 100] : (dials[step - 1] ?? []);
    return (
      sum + to.reduce<number>((all, dial, k) => all + Math.abs(wrapSigned(dial - (from[k] ?? 0), 360)), 0)
    );
  }, 0);
  return { rows, choices, travel };
}

test('by least travel the list turns the plates no further than by any other choice, and less than by fidelity', () => {
  const planned = chosen('least-travel', []);
  expect(planned.travel).toBeLessThan(chosen('least-expected-infidelity', []).travel);
  expect(planned.travel).toBeLessThanOrEqual(chosen('nearest-to-present', []).travel + 1e-9);
});

test('a held solution stands whatever the objective', () => {
  const free = chosen('least-travel', []);
  const other = free.rows[1]?.solved.solutions.find((_, index) => index !== free.choices[1]?.index);
  const held = chosen('least-travel', [null, other?.fastAxesDeg ?? null]);
  expect(held.choices[1]).toMatchObject({ held: true });
  expect(held.rows[1]?.solved.solutions[held.choices[1]?.index ?? -1]?.fastAxesDeg).toEqual(
    other?.fastAxesDeg,
  );
  expect(held.travel).toBeGreaterThanOrEqual(free.travel - 1e-9);
});

test('a chosen solution has the readings that were chosen for it', () => {
  const { rows, choices } = chosen('least-travel', []);
  for (const [place, choice] of choices.entries()) {
    const solved = rows[place]?.solved;
    if (solved === undefined) throw new Error('a row is missing');
    expect(chosenSolution(solved, choice)?.dialsDeg).toEqual(choice.dialsDeg);
  }
});
