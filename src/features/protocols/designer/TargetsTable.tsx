import { useMemo, useState } from 'react';
import type { Plate } from '../../../../shared/schemas/cabinet';
import type { DraftTarget } from '../../../../shared/schemas/protocols';
import {
  type DraftEdit,
  addTarget,
  holdSolution,
  newTarget,
  writeExpression,
  writeLabel,
} from '../draft-edits';
import type { RowView } from './row-view';
import { TargetRow } from './TargetRow';
import { useDesignerView } from './view-store';

interface TargetsTableProps {
  readonly targets: readonly DraftTarget[];
  readonly views: readonly RowView[];
  readonly plates: readonly Plate[];
  readonly toleranceInfidelity: number;
  readonly mayWrite: boolean;
  readonly edit: (edit: DraftEdit) => void;
  /** Takes back what was typed since the row's source was opened. */
  readonly undo: () => void;
}

/** The targets in order, and below them an empty row to write the next one in. */
export function TargetsTable({
  targets,
  views,
  plates,
  toleranceInfidelity,
  mayWrite,
  edit,
  undo,
}: TargetsTableProps) {
  const { selectedId, editingId, solutionsOfId, select, openSource, listSolutions } = useDesignerView();
  const blank = useBlankTarget(targets);
  const before = useState(new Map<string, string>())[0];
  const rows = mayWrite ? [...targets, blank] : targets;

  return (
    <table className="targets-table">
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
            target, after the plates
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
              view={views[place] ?? { status: 'empty' }}
              plates={plates}
              toleranceInfidelity={toleranceInfidelity}
              selected={target.id === selectedId}
              editing={target.id === editingId}
              solutionsOpen={target.id === solutionsOfId}
              blank={isBlank}
              mayWrite={mayWrite}
              onSelect={() => {
                if (!isBlank) select(target.id);
              }}
              onOpenSource={() => {
                before.set(target.id, target.expression);
                openSource(target.id);
              }}
              onWrite={(expression) => {
                if (!isBlank) {
                  edit(writeExpression(target.id, expression));
                  return;
                }
                if (expression.trim() === '') return;
                before.set(target.id, '');
                edit(addTarget({ ...blank, expression }));
                openSource(target.id);
              }}
              onLabel={(label) => edit(writeLabel(target.id, label))}
              onDone={() => openSource(null)}
              onCancel={() => {
                if (before.get(target.id) !== undefined && before.get(target.id) !== target.expression)
                  undo();
                openSource(null);
              }}
              onHold={(fastAxesDeg) => edit(holdSolution(target.id, fastAxesDeg))}
              onListSolutions={(open) => {
                select(target.id);
                listSolutions(open ? target.id : null);
              }}
            />
          );
        })}
      </tbody>
    </table>
  );
}

/** The row to come: the same row, with the same field under the caret, becomes a target with its first letter. */
function useBlankTarget(targets: readonly DraftTarget[]): DraftTarget {
  return useMemo(() => newTarget(targets, ''), [targets]);
}
