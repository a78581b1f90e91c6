import { useState } from 'react';
import type { DraftTarget } from '../../../../shared/schemas/protocols';
import type { SolvedRow } from '../use-solved-rows';
import { type RowView, viewOf } from './row-view';

interface Kept {
  readonly row: SolvedRow | undefined;
  readonly view: RowView;
}

/** What was drawn last, so that what did not change stays the very same object. */
class KeptViews {
  readonly #ofTarget = new WeakMap<DraftTarget, Kept>();
  #all: readonly RowView[] = [];

  of(targets: readonly DraftTarget[], rows: ReadonlyMap<string, SolvedRow>): readonly RowView[] {
    const all = targets.map((target) => this.#viewOf(target, rows.get(target.id)));
    const same = all.length === this.#all.length && all.every((view, place) => view === this.#all[place]);
    if (!same) this.#all = all;
    return this.#all;
  }

  #viewOf(target: DraftTarget, row: SolvedRow | undefined): RowView {
    const before = this.#ofTarget.get(target);
    if (before !== undefined && before.row === row) return before.view;
    const view = viewOf(target, row);
    this.#ofTarget.set(target, { row, view });
    return view;
  }
}

/**
 * Each row's view, the same object as long as the row is, in the same list as long as all of them are: of two hundred rows only
 * the one that changed is drawn again, and a plan of them stands while another is looked at.
 */
export function useRowViews(
  targets: readonly DraftTarget[],
  rows: ReadonlyMap<string, SolvedRow>,
): readonly RowView[] {
  const [kept] = useState(() => new KeptViews());
  return kept.of(targets, rows);
}
