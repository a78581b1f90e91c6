import type { DraftTarget } from '../../../../shared/schemas/protocols';
import type { RowView } from './row-view';
import { toleranceVerdict } from './verdict';

/** The one thing most worth saying about a row, under it. */
export type RowNoteKind =
  'held-is-gone' | 'out-of-reach' | 'not-within' | 'not-decided' | 'family' | 'normalised';

/** What is no more than worth knowing is said of the selected row only. */
export function noteOf(view: RowView, toleranceInfidelity: number, selected: boolean): RowNoteKind | null {
  if (view.status !== 'solved') return null;
  const { solved, solution, reading, heldIsGone } = view;
  if (heldIsGone) return 'held-is-gone';
  if (solved.shortfallDeg > 0) return 'out-of-reach';
  const verdict = toleranceVerdict(solution, toleranceInfidelity);
  if (verdict !== 'within') return verdict === 'not within' ? 'not-within' : 'not-decided';
  if (!selected) return null;
  if (solved.kind === 'family') return 'family';
  return reading.normalised ? 'normalised' : null;
}

interface Numbered {
  /** `aria-rowindex` of each target's row; its note and its list of solutions have the next ones. */
  readonly indexes: readonly number[];
  /** All rows of the table, whether they are in the document or not. */
  readonly count: number;
}

/** The table's rows counted as if all of them were there: the head, the targets, and what stands under them. */
export function numberRows(
  rows: readonly DraftTarget[],
  views: readonly RowView[],
  toleranceInfidelity: number,
  {
    selectedId,
    solutionsOfId,
  }: { readonly selectedId: string | null; readonly solutionsOfId: string | null },
): Numbered {
  let count = 1;
  const indexes = rows.map(({ id }, place) => {
    const view = views[place];
    const own = count + 1;
    const noted = view !== undefined && noteOf(view, toleranceInfidelity, id === selectedId) !== null;
    const listed = view?.status === 'solved' && id === solutionsOfId;
    count = own + Number(noted) + Number(listed);
    return own;
  });
  return { indexes, count };
}
