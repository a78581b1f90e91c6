import { memo, useEffect, useRef, type KeyboardEvent } from 'react';
import type { Plate } from '../../../../shared/schemas/cabinet';
import type { DraftTarget, ProtocolKind } from '../../../../shared/schemas/protocols';
import { classNames } from '../../../components/class-names';
import { FidelityChip } from '../../../components/FidelityChip';
import { Formula } from '../../../components/Formula';
import { Scientific } from '../../../components/Scientific';
import { HeldSign } from '../../../components/SmallSigns';
import { formatDial, formatTheta } from '../../../lib/format';
import { dialledAxisDeg } from './dialled-problem';
import { RowNote } from './RowNote';
import type { RowView } from './row-view';
import { SolutionsList } from './SolutionsList';
import { SourceField } from './SourceField';
import { useNearScreen } from './use-near-screen';

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

const chipWidthPx = 100;

interface TargetRowProps {
  readonly actions: RowActions;
  readonly place: number;
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
}

/** One target: what it is, where each plate must stand for it, and how well that does. At most one note below. */
export const TargetRow = memo(function TargetRow(props: TargetRowProps) {
  const { place, target, view, kind, plates, toleranceInfidelity, selected, editing, blank } = props;
  const { actions, mayWrite } = props;
  const row = useRef<HTMLTableRowElement>(null);
  const solved = view.status === 'solved' ? view : null;
  const near = useNearScreen(row);
  // Of two hundred rows a few are on the screen: the others keep their place and their words.
  const drawn = near || selected || editing ? solved : null;
  const showsSource =
    mayWrite && (editing || blank || view.status === 'unreadable' || view.status === 'empty');
  const name = blank ? 'a new target' : `target ${target.label}`;

  // The selection moves by keys: the row that has it has the focus, unless somebody types.
  useEffect(() => {
    const active = document.activeElement;
    if (selected && !editing && !blank && active instanceof HTMLTableRowElement) row.current?.focus();
  }, [selected, editing, blank]);

  const numbers = classNames('text-right whitespace-nowrap', drawn?.stale === true && 'text-ink-3');

  return (
    <>
      <tr
        ref={row}
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
        <td className="w-8 pl-3 font-mono text-s text-ink-3">{place + 1}</td>
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
            <ExpressionText
              {...{ target, mayWrite }}
              solved={drawn}
              onOpen={() => actions.openSource(target)}
            />
          )}
        </td>
        {view.status !== 'unreadable' && !blank && (
          <>
            {plates.map((plate, index) => (
              <td key={plate.id} className={numbers}>
                {drawn !== null && (
                  <>
                    <span className="font-mono text-dial">
                      {formatDial(drawn.solution.dialsDeg[index] ?? 0, plate.mount.resolutionDeg)}
                    </span>
                    <span className="theta">
                      {formatTheta(dialledAxisDeg(plate, drawn.solution.dialsDeg[index] ?? 0))}
                    </span>
                  </>
                )}
              </td>
            ))}
            <td className={classNames(numbers, 'chip-cell')}>
              {drawn !== null && (
                <span className="chip-line">
                  <FidelityChip
                    width={chipWidthPx}
                    infidelity={{
                      value: drawn.solution.expectedInfidelity,
                      low: drawn.solution.expectedLow,
                      high: drawn.solution.expectedHigh,
                    }}
                    tolerance={toleranceInfidelity}
                    kind="predicted"
                  />
                  <Scientific value={drawn.solution.expectedInfidelity} />
                </span>
              )}
            </td>
            <td className={classNames(numbers, 'pr-1 font-mono text-s')}>
              {drawn !== null && (
                <SolutionCount
                  solved={drawn}
                  name={name}
                  open={props.solutionsOpen}
                  onOpen={(open) => actions.listSolutions(target, open)}
                />
              )}
            </td>
          </>
        )}
      </tr>
      {solved !== null && (
        <RowNote {...{ toleranceInfidelity, selected }} view={solved} columns={plates.length + 5} />
      )}
      {solved !== null && props.solutionsOpen && (
        <SolutionsList
          {...{ view: solved, plates, mayWrite }}
          onHold={(fastAxesDeg) => actions.hold(target, fastAxesDeg)}
          label={target.label}
        />
      )}
    </>
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

interface SolutionCountProps {
  readonly solved: Extract<RowView, { status: 'solved' }>;
  readonly name: string;
  readonly open: boolean;
  readonly onOpen: (open: boolean) => void;
}

function SolutionCount({ solved, name, open, onOpen }: SolutionCountProps) {
  const count = solved.solved.solutions.length;
  const words =
    solved.solved.shortfallDeg > 0 && count === 1 ? 'closest' : `${solved.chosen + 1} of ${count}`;
  return (
    <button
      type="button"
      aria-expanded={open}
      aria-label={`Solution ${words} for ${name}${solved.held ? ', held' : ''}`}
      className="inline-flex min-h-6 items-center gap-2 whitespace-nowrap"
      onClick={(event) => {
        event.stopPropagation();
        onOpen(!open);
      }}
    >
      {solved.held && <HeldSign />}
      {words}
    </button>
  );
}
