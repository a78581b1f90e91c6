import { memo, useEffect, useRef, type KeyboardEvent } from 'react';
import type { Plate } from '../../../../shared/schemas/cabinet';
import type { DraftTarget, ProtocolKind } from '../../../../shared/schemas/protocols';
import { classNames } from '../../../components/class-names';
import { Formula } from '../../../components/Formula';
import { noteOf } from './row-notes';
import { RowNote } from './RowNote';
import { RowNumbers } from './RowNumbers';
import type { RowView } from './row-view';
import { SolutionsList } from './SolutionsList';
import { SourceField } from './SourceField';
import type { RowWindow } from './use-row-window';

/** What can be done with a row. The same object for all rows and drawings, so that a row is drawn again only when it changed. */
export interface RowActions {
  readonly select: (target: DraftTarget) => void;
  readonly openSource: (target: DraftTarget) => void;
  readonly write: (target: DraftTarget, expression: string) => void;
  readonly label: (target: DraftTarget, label: string) => void;
  readonly done: () => void;
  readonly cancel: (target: DraftTarget) => void;
  readonly hold: (target: DraftTarget, fastAxesDeg: readonly number[] | null) => void;
  readonly listSolutions: (target: DraftTarget, open: boolean) => void;
  readonly askWords: () => void;
}

const placeholders = {
  prepare: 'write a state, like (H + i V)/sqrt(2)',
  apply: 'write a unitary, like hadamard or rotate(x, 90deg)',
} as const;

interface TargetRowProps {
  readonly actions: RowActions;
  readonly place: number;
  /** Its place among all rows of the table, in the document or not. */
  readonly rowIndex: number;
  readonly target: DraftTarget;
  readonly view: RowView;
  readonly kind: ProtocolKind;
  readonly plates: readonly Plate[];
  readonly toleranceInfidelity: number;
  readonly selected: boolean;
  readonly editing: boolean;
  readonly solutionsOpen: boolean;
  /** The last, empty row: it becomes a target with its first letter. */
  readonly blank: boolean;
  readonly mayWrite: boolean;
  readonly measure: RowWindow['measure'];
}

/** One target: what it is, where each plate must stand for it, and how well that does. At most one note below. */
export const TargetRow = memo(function TargetRow(props: TargetRowProps) {
  const { place, target, view, kind, plates, toleranceInfidelity, selected, editing, blank } = props;
  const { actions, mayWrite, rowIndex, solutionsOpen, measure } = props;
  const row = useRef<HTMLTableRowElement>(null);
  const solved = view.status === 'solved' ? view : null;
  const showsSource =
    mayWrite && (editing || blank || view.status === 'unreadable' || view.status === 'empty');
  const note = noteOf(view, toleranceInfidelity, selected);
  const name = blank ? 'a new target' : `target ${target.label}`;

  // The selection moves by keys: the row that has it has the focus, unless somebody types.
  useEffect(() => {
    const active = document.activeElement;
    if (selected && !editing && !blank && active instanceof HTMLTableRowElement)
      row.current?.focus({ preventScroll: true });
  }, [selected, editing, blank]);

  return (
    <tbody ref={measure} data-row={target.id} data-index={place}>
      <tr
        ref={row}
        aria-rowindex={rowIndex}
        tabIndex={selected && !blank ? 0 : -1}
        aria-selected={selected}
        data-blank={blank ? '' : undefined}
        onClick={() => {
          if (!blank) actions.select(target);
        }}
        onKeyDown={(event: KeyboardEvent) => {
          if (event.key === 'Enter' && event.target === event.currentTarget && mayWrite) {
            event.preventDefault();
            actions.openSource(target);
          }
        }}
        className={classNames(
          'target-row',
          selected && !blank && 'target-row-lit',
          view.status === 'unreadable' && 'target-row-unread',
        )}
      >
        <td className="place-cell font-mono text-s text-ink-3">{place + 1}</td>
        <td className="label-cell">
          {showsSource && !blank ? (
            <input
              type="text"
              aria-label={`Label of row ${place + 1}`}
              className="label-input"
              maxLength={24}
              value={target.label}
              onChange={(event) => actions.label(target, event.target.value)}
              onKeyDown={(event) => {
                if (event.key === 'Enter') actions.done();
                if (event.key === 'Escape') actions.cancel(target);
              }}
            />
          ) : (
            target.label
          )}
        </td>
        <td
          className="expression-cell"
          colSpan={view.status === 'unreadable' || blank ? 3 + plates.length : 1}
        >
          {showsSource ? (
            <SourceField
              label={blank ? 'New target' : `Expression of ${name}`}
              value={target.expression}
              mode={kind === 'prepare' ? 'state' : 'unitary'}
              fault={view.status === 'unreadable' ? view.error : null}
              latex={editing && solved !== null ? solved.reading.latex : null}
              onAskWords={actions.askWords}
              autoFocus={editing}
              placeholder={blank ? placeholders[kind] : ''}
              onChange={(expression) => actions.write(target, expression)}
              onDone={actions.done}
              onCancel={() => actions.cancel(target)}
              // What is mended in a row that can't be read must not close under the caret once it can.
              onFocus={blank || editing ? undefined : () => actions.openSource(target)}
            />
          ) : (
            <ExpressionText {...{ target, mayWrite, solved }} onOpen={() => actions.openSource(target)} />
          )}
        </td>
        {view.status !== 'unreadable' && !blank && (
          <RowNumbers
            {...{ target, plates, toleranceInfidelity, name, actions, solved }}
            open={solutionsOpen}
          />
        )}
      </tr>
      {solved !== null && note !== null && (
        <RowNote
          {...{ toleranceInfidelity, kind: note }}
          view={solved}
          columns={plates.length + 5}
          rowIndex={rowIndex + 1}
        />
      )}
      {solved !== null && solutionsOpen && (
        <SolutionsList
          {...{ view: solved, plates, mayWrite }}
          onHold={(fastAxesDeg) => actions.hold(target, fastAxesDeg)}
          label={target.label}
          rowIndex={rowIndex + (note === null ? 1 : 2)}
        />
      )}
    </tbody>
  );
});

interface ExpressionTextProps {
  readonly target: DraftTarget;
  readonly solved: Extract<RowView, { status: 'solved' }> | null;
  readonly mayWrite: boolean;
  readonly onOpen: () => void;
}

/** The expression typeset; pressing it opens the source. */
function ExpressionText({ target, solved, mayWrite, onOpen }: ExpressionTextProps) {
  const text =
    solved === null ? (
      <span className="font-mono text-s text-ink-3">{target.expression || 'nothing written'}</span>
    ) : (
      <Formula latex={solved.reading.latex} source={target.expression} />
    );
  if (!mayWrite) return text;
  return (
    <button type="button" className="min-h-6 w-full text-left" onClick={onOpen}>
      <span className="sr-only">Edit {target.label}: </span>
      {text}
    </button>
  );
}
