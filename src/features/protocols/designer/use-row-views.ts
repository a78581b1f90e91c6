import { useState } from 'react';
import type { DraftTarget } from '../../../../shared/schemas/protocols';
import type { SolvedRow } from '../use-solved-rows';
import { type RowView, viewOf } from './row-view';

interface Kept {
  readonly row: SolvedRow | undefined;
  readonly view: RowView;
}

/** Each row's view, the same object as long as the row is: of two hundred rows only the one that changed is drawn again. */
export function useRowViews(
  targets: readonly DraftTarget[],
  rows: ReadonlyMap<string, SolvedRow>,
): readonly RowView[] {
  const [kept] = useState(() => new WeakMap<DraftTarget, Kept>());
  return targets.map((target) => {
    const row = rows.get(target.id);
    const before = kept.get(target);
    if (before !== undefined && before.row === row) return before.view;
    const view = viewOf(target, row);
    kept.set(target, { row, view });
    return view;
  });
}
