import { useEffect, useMemo, useRef } from 'react';
import type { DraftTarget } from '../../../../shared/schemas/protocols';
import {
  addTarget,
  type DraftEdit,
  holdSolution,
  removeTarget,
  restoreTarget,
  writeExpression,
  writeLabel,
} from '../draft-edits';
import type { RowActions } from './TargetRow';
import { useDesignerView } from './view-store';

const blankField = '[data-blank] input';
export const selectedRow = 'tr[aria-selected="true"]';

interface Newest {
  readonly blank: DraftTarget;
  readonly edit: (edit: DraftEdit) => void;
  readonly focusAfter: (selector: string) => void;
  readonly onAskWords: () => void;
}

/** What rows can do, made once: each looks up what is newest when it is done, not when it was drawn. */
export function useRowActions(newest: Newest): RowActions {
  const latest = useRef(newest);
  useEffect(() => {
    latest.current = newest;
  });
  return useMemo((): RowActions => {
    const view = useDesignerView.getState;
    const edit = (change: DraftEdit) => latest.current.edit(change);
    return {
      select: ({ id }) => view().select(id),
      openSource: (target) => view().openSource(target.id, target),
      write: (target, expression) => {
        const { blank } = latest.current;
        if (target.id !== blank.id) {
          edit(writeExpression(target.id, expression));
          return;
        }
        if (expression.trim() === '') return;
        edit(addTarget({ ...blank, expression }));
        view().openSource(target.id, null);
      },
      label: ({ id }, label) => edit(writeLabel(id, label)),
      done: () => {
        // A row that was just written leads to the next one; a row that was changed keeps the focus.
        latest.current.focusAfter(view().openedTarget === null ? blankField : selectedRow);
        view().closeSource();
      },
      cancel: (target) => {
        const { editingId, openedTarget, closeSource } = view();
        if (target.id === editingId) {
          edit(openedTarget === null ? removeTarget(target.id) : restoreTarget(openedTarget));
          latest.current.focusAfter(openedTarget === null ? blankField : selectedRow);
        }
        closeSource();
      },
      hold: ({ id }, fastAxesDeg) => edit(holdSolution(id, fastAxesDeg)),
      listSolutions: ({ id }, open) => {
        view().select(id);
        view().listSolutions(open ? id : null);
      },
      askWords: () => latest.current.onAskWords(),
    };
  }, []);
}
