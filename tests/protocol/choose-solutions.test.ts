import { expect, test } from 'vitest';
import { DEFAULT_CONVENTION } from '../../shared/optics/convention';
import { evaluateDials } from '../../shared/optics/solve-target';
import { wrapSigned } from '../../shared/optics/units';
import {
  chooseSolutions,
  chosenSolution,
  heldIndex,
  whyUnplanned,
} from '../../shared/protocol/choose-solutions';
import { benchProblem, rowGoal, solveRow, type SolvingTask } from '../../shared/protocol/solve-row';
import type { SolvingPlate } from '../../shared/protocol/solving-plates';
import { solvingBench, solvingPlate, solvingTask } from '../support/plates';

const plate = (retardanceDeg: number, offsetDeg: number, mount: Partial<SolvingPlate['mount']> = {}) =>
  solvingPlate({ mount, calibration: { retardanceDeg, offsetDeg } });

const bench = solvingBench({
  wavelengthSigmaNm: 0.2,
  polariserExtinction: 1e-5,
  plates: [plate(179.2, 12.4), plate(88.9, 301.7)],
});

const expressions = ['bloch(70deg, 20deg)', 'bloch(110deg, 200deg)', 'D', 'bloch(40deg, 300deg)', 'A'];

function chosen(
  objective: SolvingTask['objective'],
  held: readonly (readonly number[] | null)[],
  plates: readonly SolvingPlate[] = bench.plates,
  texts: readonly string[] = expressions,
) {
  const read = benchProblem(
    { ...bench, plates },
    DEFAULT_CONVENTION,
    solvingTask({ objective, presentDialsDeg: plates.map(() => 100) }),
  );
  if (!read.ok) throw new Error(read.error.message);
  const rows = texts.map((expression, place) => {
    const heldFastAxesDeg = held[place] ?? null;
    const result = solveRow(expression, read.problem, DEFAULT_CONVENTION, heldFastAxesDeg);
    if (result.status !== 'solved') throw new Error(`${expression} can’t be read`);
    return { ...result, heldFastAxesDeg };
  });
  const { choices, unplanned } = chooseSolutions(rows, read.problem);
  const dials = choices.map(({ dialsDeg }) => dialsDeg);
  const travel = dials.reduce<number>((sum, to, step) => {
    const from = step === 0 ? [100, 100] : (dials[step - 1] ?? []);
    return (
      sum + to.reduce<number>((all, dial, k) => all + Math.abs(wrapSigned(dial - (from[k] ?? 0), 360)), 0)
    );
  }, 0);
  return { rows, choices, unplanned, travel, problem: read.problem };
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

test('a chosen solution has the readings that were chosen for it, and the infidelity of those very readings', () => {
  // Half a turn is no whole number of steps of 0.7°: the other reading of an axis is rounded otherwise.
  const coarse = bench.plates.map((one) => ({ ...one, mount: { ...one.mount, resolutionDeg: 0.7 } }));
  const around = Array.from({ length: 24 }, (_, k) => `bloch(${20 + 6 * k}deg, ${30 * k}deg)`);
  let moved = 0;
  for (const plates of [bench.plates, coarse]) {
    const { rows, choices, problem } = chosen('least-travel', [], plates, around);
    for (const [place, choice] of choices.entries()) {
      const row = rows[place];
      if (row === undefined) throw new Error('a row is missing');
      const solution = chosenSolution(row.solved, choice);
      expect(solution?.dialsDeg).toEqual(choice.dialsDeg);
      const standing = { goal: rowGoal(row.reading, problem.input), plates: problem.plates };
      const { infidelity } = evaluateDials(standing, choice.dialsDeg);
      expect(solution?.dialledInfidelity).toBe(infidelity);
      if (row.solved.solutions[choice.index]?.dialledInfidelity !== infidelity) moved += 1;
    }
  }
  expect(moved).toBeGreaterThan(0);
});

test('where the play of a mount leaves it less than half a turn, the row and the plate that it fails at are named', () => {
  const narrow = plate(88.9, 301.7, {
    rangeDeg: { from: 0, to: 180 },
    backlashDeg: 175,
    approach: 'rising',
  });
  const { choices, unplanned, rows } = chosen('least-travel', [], [plate(179.2, 12.4), narrow]);
  expect(unplanned?.plate).toBe(1);
  expect(choices.map(({ index }) => index)).toEqual(rows.map(() => 0));
  expect(whyUnplanned('Row 2 (t2)', 'Q-B')).toMatch(/^Row 2 \(t2\) .* the mount of Q-B does not reach it\./);
  expect(chosen('nearest-to-present', [], [plate(179.2, 12.4), narrow]).unplanned).toBeNull();
});

test('a row that can be dialled in more ways than can be planned is named, with no plate to blame', () => {
  const onAndOn = { rangeDeg: { from: 0, to: 1440 } };
  const plates = [10, 20, 30, 40, 50, 60].map((offsetDeg) => plate(88.9, offsetDeg, onAndOn));
  expect(chosen('least-travel', [], plates).unplanned).toEqual({ row: 0, plate: null });
  expect(whyUnplanned('Row 1', null)).toContain('too many ways');
});

test('what was held with another number of plates is not held', () => {
  const [row] = chosen('least-expected-infidelity', []).rows;
  const axes = row?.solved.solutions[0]?.fastAxesDeg ?? [];
  if (row === undefined) throw new Error('a row is missing');
  expect(heldIndex({ ...row, heldFastAxesDeg: axes })).toBe(0);
  expect(heldIndex({ ...row, heldFastAxesDeg: [...axes, 45] })).toBeNull();
  expect(heldIndex({ ...row, heldFastAxesDeg: axes.slice(1) })).toBeNull();
});
