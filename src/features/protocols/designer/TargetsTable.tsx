import { type CSSProperties, useEffect, useMemo, useRef } from 'react';
import type { Plate } from '../../../../shared/schemas/cabinet';
import type { DraftTarget, ProtocolKind } from '../../../../shared/schemas/protocols';
import {
  addTarget,
  type DraftEdit,
  holdSolution,
  newTarget,
  removeTarget,
  restoreTarget,
  writeExpression,
  writeLabel,
} from '../draft-edits';
import type { RowView } from './row-view';
import { type RowActions, TargetRow } from './TargetRow';
import { useDesignerView } from './view-store';

interface TargetsTableProps {
  readonly targets: readonly DraftTarget[];
  readonly views: readonly RowView[];
  readonly kind: ProtocolKind;
  readonly plates: readonly Plate[];
  readonly toleranceInfidelity: number;
  readonly mayWrite: boolean;
  readonly edit: (edit: DraftEdit) => void;
  readonly onAskWords: () => void;
}

const emptyView: RowView = { status: 'empty' };

/** The targets in order, and below them an empty row to write the next one in. */
export function TargetsTable({
  targets,
  views,
  kind,
  plates,
  toleranceInfidelity,
  mayWrite,
  edit,
  onAskWords,
}: TargetsTableProps) {
  const { selectedId, editingId, solutionsOfId } = useDesignerView();
  const blank = useBlankTarget(targets);
  const { table, focusAfter } = useFocusAfter();
  const actions = useRowActions({ blank, edit, focusAfter, onAskWords });
  const rows = mayWrite ? [...targets, blank] : targets;
  const style: CSSProperties & Record<'--plates', number> = { '--plates': plates.length };

  return (
    <table
      ref={table}
      className="targets-table"
      data-plates={plates.length > 2 ? 'many' : 'few'}
      style={style}
    >
      <caption className="sr-only">Targets, the dials that make them, and the expected infidelity</caption>
      <colgroup>
        <col className="w-8" />
        <col className="label-column" />
        <col />
        {plates.map(({ id }) => (
          <col key={id} className="dial-column" />
        ))}
        <col className="chip-column" />
        <col className="solution-column" />
      </colgroup>
      <thead>
        <tr className="border-y border-ink text-left text-s text-ink-2">
          <th scope="col" className="h-8 w-8">
            <span className="sr-only">row</span>
          </th>
          <th scope="col" className="font-words">
            label
          </th>
          <th scope="col" className="font-words">
            {kind === 'prepare' ? 'target, after the plates' : 'unitary, of all the plates'}
          </th>
          {plates.map(({ id, name }) => (
            <th key={id} scope="col" className="text-right font-words whitespace-nowrap">
              <b className="text-ink">{name}</b> dial <i className="theta-head">θ</i>
            </th>
          ))}
          <th scope="col" className="pl-6 font-words">
            expected 1 − F
          </th>
          <th scope="col" className="pr-1 text-right font-words">
            solution
          </th>
        </tr>
      </thead>
      <tbody>
        {rows.map((target, place) => {
          const isBlank = target.id === blank.id;
          return (
            <TargetRow
              key={target.id}
              place={place}
              target={target}
              view={views[place] ?? emptyView}
              kind={kind}
              plates={plates}
              toleranceInfidelity={toleranceInfidelity}
              selected={target.id === selectedId}
              editing={target.id === editingId}
              solutionsOpen={target.id === solutionsOfId}
              blank={isBlank}
              mayWrite={mayWrite}
              actions={actions}
            />
          );
        })}
      </tbody>
    </table>
  );
}

const blankField = '[data-blank] input';
const selectedRow = 'tr[aria-selected="true"]';

interface Newest {
  readonly blank: DraftTarget;
  readonly edit: (edit: DraftEdit) => void;
  readonly focusAfter: (selector: string) => void;
  readonly onAskWords: () => void;
}

/** What rows can do, made once: each looks up what is newest when it is done, not when it was drawn. */
function useRowActions(newest: Newest): RowActions {
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

/** Moves the focus once the field that had it is gone: left alone it would fall to the page, and the next keys with it. */
function useFocusAfter() {
  const table = useRef<HTMLTableElement>(null);
  const wanted = useRef<string | null>(null);
  // After every drawing, since it is the next one that takes the field away.
  useEffect(() => {
    if (wanted.current === null) return;
    table.current?.querySelector<HTMLElement>(wanted.current)?.focus();
    wanted.current = null;
  });
  return {
    table,
    focusAfter: (selector: string) => {
      wanted.current = selector;
    },
  };
}

/** The row to come: the same row, with the same field under the caret, becomes a target with its first letter. */
function useBlankTarget(targets: readonly DraftTarget[]): DraftTarget {
  return useMemo(() => newTarget(targets, ''), [targets]);
}
