import { describe, expect, it } from 'vitest';
import { DEFAULT_CONVENTION } from '../../../shared/optics/convention';
import { chooseSolution } from '../../../shared/protocol/choose-solutions';
import { benchProblem, solveRow } from '../../../shared/protocol/solve-row';
import type { DraftTarget } from '../../../shared/schemas/protocols';
import {
  type RowView,
  shownSolutions,
  viewOf,
  whatHoldsUp,
} from '../../../src/features/protocols/designer/row-view';
import { idsFrom, solvingBench, solvingTask, target as anyTarget } from '../../support/plates';

const id = idsFrom('0193a000');
const task = solvingTask();
const bench = solvingBench();

function target(label: string, expression: string, heldFastAxesDeg: number[] | null = null): DraftTarget {
  return anyTarget({ id: id(label.length), label, expression, heldFastAxesDeg });
}

function solvedView(row: DraftTarget): RowView {
  const read = benchProblem(bench, DEFAULT_CONVENTION, task);
  if (!read.ok) throw new Error(read.error.message);
  const { heldFastAxesDeg } = row;
  const result = solveRow(row.expression, read.problem, DEFAULT_CONVENTION, heldFastAxesDeg);
  const choice =
    result.status === 'solved' ? chooseSolution({ solved: result.solved, heldFastAxesDeg }) : null;
  return viewOf(row, { result, choice, stale: false });
}

function holdUp(...rows: readonly DraftTarget[]): string | null {
  return whatHoldsUp(rows, rows.map(solvedView))?.text ?? null;
}

describe('what holds a version up', () => {
  it('is nothing when every row is read, solved and labelled', () => {
    expect(holdUp(target('a', 'D'), target('bb', 'bloch(109.47deg, 120deg)'))).toBeNull();
  });

  it('names the one row that cannot be read', () => {
    expect(holdUp(target('a', 'D'), target('bb', 'cos(22.5) H'))).toBe(
      'Row 2 can’t be read and holds this up.',
    );
  });

  it('says that nothing is written yet', () => {
    expect(holdUp()).toBe('No target is written yet.');
  });

  it('names the row whose label another row has', () => {
    expect(holdUp(target('a', 'D'), target('a', 'A'))).toBe('Two rows are called a. Rename row 2.');
  });

  it('waits for rows whose numbers are of the text before', () => {
    const row = target('a', 'D');
    const view = solvedView(row);
    expect(view.status).toBe('solved');
    const stale = view.status === 'solved' ? { ...view, stale: true } : view;
    expect(whatHoldsUp([row], [stale])).toEqual({
      text: 'The last rows are still being solved.',
      isFault: false,
    });
  });
});

describe('a held solution', () => {
  it('stands where its branch still exists, and is what the page shows the server', () => {
    const free = solvedView(target('a', 'bloch(109.47deg, 120deg)'));
    if (free.status !== 'solved') throw new Error('the row was not solved');
    const other = free.solved.solutions[1];
    if (other === undefined) throw new Error('there is one solution only');
    const row = target('a', 'bloch(109.47deg, 120deg)', [...other.fastAxesDeg]);
    const held = solvedView(row);
    expect(held).toMatchObject({ held: true, chosen: 1 });
    expect(shownSolutions([row], [held])[0]?.dialsDeg).toEqual(other.dialsDeg);
  });

  it('gives way to the ranking when no solution is near it', () => {
    const free = solvedView(target('a', 'D'));
    if (free.status !== 'solved') throw new Error('the row was not solved');
    const far = free.solved.solutions[0]?.fastAxesDeg.map((angle) => (angle + 20) % 180) ?? [];
    expect(solvedView(target('a', 'D', far))).toMatchObject({ held: false, chosen: 0 });
  });
});
