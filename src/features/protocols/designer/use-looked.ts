import { useMemo, useState } from 'react';
import type { Convention } from '../../../../shared/optics/convention';
import { parseState } from '../../../../shared/optics/expression';
import type { Stokes } from '../../../../shared/optics/stokes';
import type { Bench } from '../../../../shared/schemas/benches';
import type { DraftContent, DraftTarget } from '../../../../shared/schemas/protocols';
import { lightOf } from './followed-light';
import type { RowView } from './row-view';
import { type FollowedLight, useDesignerView } from './view-store';

/** The row that the stage, the sphere and the budget are about, with the light that is followed through it. */
export interface Looked {
  readonly bench: Bench;
  /** The light before the first plate: the bench's own, or the one that a unitary is followed with. */
  readonly input: Stokes;
  /** What it is called where it isn't the bench's own. */
  readonly followed: FollowedLight | null;
  readonly target: DraftTarget;
  readonly view: Extract<RowView, { status: 'solved' }>;
}

interface Looking {
  readonly content: DraftContent;
  readonly bench: Bench | undefined;
  readonly convention: Convention;
  readonly target: DraftTarget | undefined;
  readonly view: RowView | undefined;
}

/**
 * The same object as long as nothing of it changed, so that drawing two hundred rows does not redraw the sphere. While the
 * selected row can't be read, what was looked at before stays, under its own label; null before anything was.
 */
export function useLooked({ content, bench, convention, target, view }: Looking): Looked | null {
  const followed = useDesignerView((state) => state.followed);
  const { kind } = content;
  const inputExpression = bench?.inputExpression;
  const input = useMemo((): Stokes | null => {
    if (inputExpression === undefined) return null;
    const read = parseState(inputExpression, convention);
    if (!read.ok) return null;
    return kind === 'apply' ? lightOf(followed, convention) : read.stokes;
  }, [inputExpression, convention, kind, followed]);
  const now = useMemo(
    () =>
      bench === undefined ||
      input === null ||
      target === undefined ||
      view?.status !== 'solved' ||
      // Solved for the bench before this one, with another number of plates.
      view.solution.dialsDeg.length !== bench.plates.length
        ? null
        : { bench, input, followed: kind === 'apply' ? followed : null, target, view },
    [bench, input, kind, followed, target, view],
  );
  const [before, setBefore] = useState<Looked | null>(null);
  if (now !== null && now !== before) setBefore(now);
  return now ?? (before?.bench === bench ? before : null);
}
