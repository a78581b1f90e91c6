import type { RowResult } from '../../../../shared/protocol/solve-row';
import { chosenSolution } from '../../../../shared/protocol/choose-solutions';
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
      /** A solution was held whose branch no longer exists. */
      readonly heldIsGone: boolean;
      /** The numbers are of the text before the last key. */
      readonly stale: boolean;
    };

export function viewOf(target: DraftTarget, row: SolvedRow | undefined): RowView {
  if (target.expression.trim() === '') return { status: 'empty' };
  if (row === undefined) return { status: 'waiting' };
  const { result, choice, stale } = row;
  if (result.status === 'unreadable') return { status: 'unreadable', error: result.error };
  const { reading, solved } = result;
  const solution = choice === null ? undefined : chosenSolution(solved, choice);
  if (choice === null || solution === undefined) return { status: 'waiting' };
  const { index, held } = choice;
  const heldIsGone = target.heldFastAxesDeg !== null && !held;
  return { status: 'solved', reading, solved, solution, chosen: index, held, heldIsGone, stale };
}

/** Why a version can't be saved now. */
export interface HoldUp {
  readonly text: string;
  /** Whether a person has to mend it, or it passes by itself. */
  readonly isFault: boolean;
}

/** What holds a version up; null when nothing does. Names the row, so that one knows where to look. */
export function whatHoldsUp(targets: readonly DraftTarget[], views: readonly RowView[]): HoldUp | null {
  const fault = faultIn(targets, views);
  if (fault !== null) return { text: fault, isFault: true };
  const isNew = (view: RowView) => view.status === 'solved' && !view.stale;
  return views.every(isNew) ? null : { text: 'The last rows are still being solved.', isFault: false };
}

function faultIn(targets: readonly DraftTarget[], views: readonly RowView[]): string | null {
  if (views.every(({ status }) => status === 'empty')) return 'No target is written yet.';
  const unread = views.flatMap(({ status }, place) => (status === 'unreadable' ? [place + 1] : []));
  if (unread.length === 1) return `Row ${unread.join()} can’t be read and holds this up.`;
  if (unread.length > 1) return `Rows ${someOf(unread)} can’t be read and hold this up.`;
  const empty = views.findIndex(({ status }) => status === 'empty');
  if (empty >= 0) return `Row ${empty + 1} is empty. Write what it is to make, or take the row out.`;
  const labels = targets.map(({ label }) => label.trim());
  const unlabelled = labels.indexOf('');
  if (unlabelled >= 0) return `Row ${unlabelled + 1} has no label.`;
  const twice = labels.findIndex((label, place) => labels.indexOf(label) !== place);
  return twice < 0 ? null : `Two rows are called ${labels[twice] ?? ''}. Rename row ${twice + 1}.`;
}

/** The first few: a pasted list may have a fault in every row. */
function someOf(rows: readonly number[]): string {
  const named = 4;
  const more = rows.length - named;
  return rows.slice(0, named).join(', ') + (more > 0 ? ` and ${more} more` : '');
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
