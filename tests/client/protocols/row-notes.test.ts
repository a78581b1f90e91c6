import { describe, expect, it } from 'vitest';
import { DEFAULT_CONVENTION } from '../../../shared/optics/convention';
import { chooseSolution } from '../../../shared/protocol/choose-solutions';
import { benchProblem, solveRow } from '../../../shared/protocol/solve-row';
import { noteOf, numberRows } from '../../../src/features/protocols/designer/row-notes';
import { type RowView, viewOf } from '../../../src/features/protocols/designer/row-view';
import { solvingBench, solvingTask, target } from '../../support/plates';

function solvedView(expression: string): RowView {
  const read = benchProblem(solvingBench(), DEFAULT_CONVENTION, solvingTask());
  if (!read.ok) throw new Error(read.error.message);
  const result = solveRow(expression, read.problem, DEFAULT_CONVENTION, null);
  if (result.status !== 'solved') throw new Error(`${expression} was not read`);
  const choice = chooseSolution({ solved: result.solved, heldFastAxesDeg: null });
  return viewOf(target({ expression }), { result, choice, stale: false });
}

describe('rows of the table, counted as if all were in the document', () => {
  const rows = ['a', 'b', 'c'].map((id) => target({ id, expression: '2 D' }));
  const views = rows.map(() => solvedView('2 D'));

  it('count the head, and the note and the list that stand under a row before the next one', () => {
    const wide = 0.5;
    expect(noteOf(views[0] ?? { status: 'empty' }, wide, true)).toBe('normalised');
    const bare = numberRows(rows, views, wide, { selectedId: null, solutionsOfId: null });
    expect(bare).toEqual({ indexes: [2, 3, 4], count: 4 });
    const noted = numberRows(rows, views, wide, { selectedId: 'b', solutionsOfId: 'b' });
    expect(noted).toEqual({ indexes: [2, 3, 6], count: 6 });
  });

  it('say of every row, selected or not, that it is not within the tolerance', () => {
    expect(noteOf(views[0] ?? { status: 'empty' }, 1e-9, false)).toBe('not-within');
    expect(numberRows(rows, views, 1e-9, { selectedId: null, solutionsOfId: null }).count).toBe(7);
  });
});
