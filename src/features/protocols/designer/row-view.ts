import type { RowResult } from '../../../../shared/protocol/solve-row';
import { chooseSolution } from '../../../../shared/protocol/solve-row';
import type { DraftTarget, ShownSolution } from '../../../../shared/schemas/protocols';
import type { SolvedRow } from '../use-solved-rows';

type Unreadable = Extract<RowResult, { status: 'unreadable' }>;
type Solved = Extract<RowResult, { status: 'solved' }>;
export type SettingSolution = Solved['solved']['solutions'][number];

/** A target's row as the table draws it. */
export type RowView =
  /** Nothing written yet, or the first answer is still on its way. */
  | { readonly status: 'empty' | 'waiting' }
  | { readonly status: 'unreadable'; readonly error: Unreadable['error'] }
  | {
      readonly status: 'solved';
      readonly reading: Solved['reading'];
      readonly solved: Solved['solved'];
      readonly solution: SettingSolution;
      /** Place of `solution` among them, from 0. */
      readonly chosen: number;
      readonly held: boolean;
      /** The numbers are of the text before the last key. */
      readonly stale: boolean;
    };

export function viewOf(target: DraftTarget, row: SolvedRow | undefined): RowView {
  if (target.expression.trim() === '') return { status: 'empty' };
  if (row === undefined) return { status: 'waiting' };
  const { result, stale } = row;
  if (result.status === 'unreadable') return { status: 'unreadable', error: result.error };
  const { reading, solved } = result;
  const { index, held } = chooseSolution(solved, target.heldFastAxesDeg);
  const solution = solved.solutions[index];
  if (solution === undefined) return { status: 'waiting' };
  return { status: 'solved', reading, solved, solution, chosen: index, held, stale };
}

/** Why a version can't be saved now; null when it can. Names the row, so that one knows where to look. */
export function whatHoldsUp(targets: readonly DraftTarget[], views: readonly RowView[]): string | null {
  const written = targets.flatMap((target, place) => {
    const view = views[place];
    return view === undefined || view.status === 'empty' ? [] : [{ place, target, view }];
  });
  if (written.length === 0) return 'No target is written yet.';
  const unread = written.filter(({ view }) => view.status === 'unreadable').map(({ place }) => place + 1);
  if (unread.length === 1) return `Row ${String(unread[0])} can’t be read and holds this up.`;
  if (unread.length > 1) return `Rows ${unread.join(', ')} can’t be read and hold this up.`;
  const empty = targets.findIndex(({ expression }) => expression.trim() === '');
  if (empty >= 0) return `Row ${empty + 1} has no state. Write one, or take the row out.`;
  const unlabelled = targets.findIndex(({ label }) => label.trim() === '');
  if (unlabelled >= 0) return `Row ${unlabelled + 1} has no label.`;
  const labels = targets.map(({ label }) => label.trim());
  const twice = labels.findIndex((label, place) => labels.indexOf(label) !== place);
  if (twice >= 0) return `Two rows are called ${String(labels[twice])}. Rename row ${twice + 1}.`;
  const isNew = ({ view }: (typeof written)[number]) => view.status === 'solved' && !view.stale;
  return written.every(isNew) ? null : 'The last rows are still being solved.';
}

/** What the page shows, for the server to hold its own solution against. */
export function shownSolutions(targets: readonly DraftTarget[], views: readonly RowView[]): ShownSolution[] {
  return targets.flatMap((target, place) => {
    const view = views[place];
    if (view?.status !== 'solved') return [];
    const { fastAxesDeg, dialsDeg, infidelity, dialledInfidelity } = view.solution;
    return [
      {
        targetId: target.id,
        fastAxesDeg: [...fastAxesDeg],
        dialsDeg: [...dialsDeg],
        infidelity,
        dialledInfidelity,
      },
    ];
  });
}
