import { type CSSProperties, type FocusEvent, useMemo, useState } from 'react';
import type { Plate } from '../../../../shared/schemas/cabinet';
import type { DraftTarget, ProtocolKind } from '../../../../shared/schemas/protocols';
import { type DraftEdit, newTarget } from '../draft-edits';
import { numberRows } from './row-notes';
import type { RowView } from './row-view';
import { TargetRow } from './TargetRow';
import { useFocusAfter } from './use-focus-after';
import { useRowActions } from './use-row-actions';
import { useRowWindow } from './use-row-window';
import { useSelectedInSight } from './use-selected-in-sight';
import { useDesignerView } from './view-store';

interface TargetsTableProps {
  /** What the table scrolls in; null until it is in the document. */
  readonly region: HTMLElement | null;
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

/**
 * The targets in order, and below them an empty row to write the next one in. Rows out of sight are not in the document, all
 * but those that somebody is in: the selected one, the one whose source is open, the one with the focus, and the empty one.
 */
export function TargetsTable({
  region,
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
  const focusAfter = useFocusAfter(region);
  const actions = useRowActions({ blank, edit, focusAfter, onAskWords });
  const rows = useMemo(() => (mayWrite ? [...targets, blank] : targets), [targets, mayWrite, blank]);
  const ids = useMemo(() => rows.map(({ id }) => id), [rows]);
  const { focusedId, watchFocus } = useFocusedRow();
  const staying = placesOf(ids, [selectedId, editingId, focusedId, mayWrite ? blank.id : null]);
  const { parts, measure } = useRowWindow(region, ids, staying);
  useSelectedInSight(region, selectedId);
  const { indexes, count } = numberRows(rows, views, toleranceInfidelity, { selectedId, solutionsOfId });
  const style: CSSProperties & Record<'--plates', number> = { '--plates': plates.length };

  return (
    <table
      className="targets-table"
      aria-rowcount={count}
      data-plates={plates.length > 2 ? 'many' : 'few'}
      style={style}
      {...watchFocus}
    >
      <caption className="sr-only">Targets, the dials that make them, and the expected infidelity</caption>
      <colgroup>
        <col className="place-column" />
        <col className="label-column" />
        <col />
        {plates.map(({ id }) => (
          <col key={id} className="dial-column" />
        ))}
        <col className="chip-column" />
        <col className="solution-column" />
      </colgroup>
      <thead>
        <tr aria-rowindex={1} className="text-left text-s text-ink-2">
          <th scope="col" className="h-8">
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
              <b className="text-ink">{name}</b> dial <span className="theta-head">θ</span>
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
      {parts.map((part) => {
        if (part.kind === 'gap') {
          return (
            <tbody key={`gap ${part.from}`} aria-hidden="true">
              <tr style={{ height: part.heightPx }}>
                <td colSpan={plates.length + 5} className="p-0" />
              </tr>
            </tbody>
          );
        }
        const target = rows[part.place];
        if (target === undefined) return null;
        return (
          <TargetRow
            key={target.id}
            place={part.place}
            rowIndex={indexes[part.place] ?? 0}
            target={target}
            view={views[part.place] ?? emptyView}
            kind={kind}
            plates={plates}
            toleranceInfidelity={toleranceInfidelity}
            selected={target.id === selectedId}
            editing={target.id === editingId}
            solutionsOpen={target.id === solutionsOfId}
            blank={target.id === blank.id}
            mayWrite={mayWrite}
            measure={measure}
            actions={actions}
          />
        );
      })}
    </table>
  );
}

/**
 * The row to come: the same row, with the same field under the caret, becomes a target with its first letter. Until then it
 * stays the same one, whatever is typed in the others.
 */
function useBlankTarget(targets: readonly DraftTarget[]): DraftTarget {
  const [blank, setBlank] = useState(() => newTarget(targets, ''));
  const isTaken = targets.some(({ id, label }) => id === blank.id || label === blank.label);
  const next = isTaken ? newTarget(targets, '') : blank;
  if (next !== blank) setBlank(next);
  return next;
}

/** Where these rows stand; those that are not in the list stand nowhere. */
function placesOf(ids: readonly string[], wanted: readonly (string | null)[]): ReadonlySet<number> {
  const present = new Set(wanted);
  return new Set(ids.flatMap((id, place) => (present.has(id) ? [place] : [])));
}

/** The row that has the focus: taken out of the document it would lose it. */
function useFocusedRow() {
  const [focusedId, setFocusedId] = useState<string | null>(null);
  const watchFocus = {
    onFocus: ({ target }: FocusEvent) =>
      setFocusedId(target.closest<HTMLElement>('[data-row]')?.dataset['row'] ?? null),
    onBlur: () => setFocusedId(null),
  };
  return { focusedId, watchFocus };
}
