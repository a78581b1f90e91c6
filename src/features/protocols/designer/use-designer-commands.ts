import type { DraftTarget } from '../../../../shared/schemas/protocols';
import { type Command, useCommands } from '../../../lib/commands';
import { holdSolution, moveTarget, removeTarget } from '../draft-edits';
import type { DraftControl } from '../use-draft';
import type { RowView } from './row-view';
import { useDesignerView } from './view-store';

interface Situation {
  readonly draft: DraftControl;
  readonly views: readonly RowView[];
  readonly mayWrite: boolean;
  /** Goes to the field that finds a target. */
  readonly onFind: () => void;
}

/** What the keys of the designer do; the list behind `?` shows the same commands. */
export function useDesignerCommands({ draft, views, mayWrite, onFind }: Situation): readonly Command[] {
  const { selectedId, editingId, solutionsOfId, select, openSource, listSolutions } = useDesignerView();
  const { targets } = draft.content;
  const place = targets.findIndex(({ id }) => id === selectedId);
  const selected: DraftTarget | undefined = targets[place];
  const view = views[place];
  const resting = () => editingId === null;
  const onRow = () => mayWrite && resting() && selected !== undefined;

  const goTo = (wanted: number) => {
    const next = targets[Math.min(Math.max(wanted, 0), targets.length - 1)];
    if (next !== undefined) select(next.id);
  };
  const step = (by: number) => goTo(place < 0 ? 0 : place + by);
  const otherSolution = (by: number) => {
    if (selected === undefined || view?.status !== 'solved') return;
    const { solutions } = view.solved;
    const other = solutions[(view.chosen + by + solutions.length) % solutions.length];
    if (other !== undefined) draft.edit(holdSolution(selected.id, other.fastAxesDeg));
  };
  const hold = () => {
    if (selected === undefined || view?.status !== 'solved') return;
    draft.edit(holdSolution(selected.id, view.held ? null : view.solution.fastAxesDeg));
  };

  const commands: readonly Command[] = [
    {
      id: 'row-up',
      label: 'Select the row above',
      keys: ['ArrowUp', 'k'],
      when: resting,
      run: () => step(-1),
    },
    {
      id: 'row-down',
      label: 'Select the row below',
      keys: ['ArrowDown', 'j'],
      when: resting,
      run: () => step(1),
    },
    { id: 'row-first', label: 'Select the first row', keys: ['Home'], when: resting, run: () => goTo(0) },
    {
      id: 'row-last',
      label: 'Select the last row',
      keys: ['End'],
      when: resting,
      run: () => goTo(targets.length - 1),
    },
    { id: 'find', label: 'Find a target', keys: ['/'], when: () => targets.length > 1, run: onFind },
    {
      id: 'edit',
      label: 'Edit the row',
      keys: ['Enter', 'F2'],
      when: onRow,
      run: () => {
        if (selected !== undefined) openSource(selected.id, selected);
      },
    },
    {
      id: 'move-up',
      label: 'Move the row up',
      keys: ['Alt+ArrowUp'],
      when: onRow,
      run: () => selected !== undefined && draft.edit(moveTarget(selected.id, -1)),
    },
    {
      id: 'move-down',
      label: 'Move the row down',
      keys: ['Alt+ArrowDown'],
      when: onRow,
      run: () => selected !== undefined && draft.edit(moveTarget(selected.id, 1)),
    },
    {
      id: 'remove',
      label: 'Take the row out',
      keys: ['Delete'],
      when: onRow,
      run: () => {
        if (selected === undefined) return;
        const neighbour = targets[place + 1] ?? targets[place - 1];
        draft.edit(removeTarget(selected.id));
        select(neighbour?.id ?? null);
      },
    },
    {
      id: 'previous',
      label: 'Hold the solution before',
      keys: ['['],
      when: onRow,
      run: () => otherSolution(-1),
    },
    { id: 'next', label: 'Hold the next solution', keys: [']'], when: onRow, run: () => otherSolution(1) },
    { id: 'hold', label: 'Hold this solution, or let it go', keys: ['p'], when: onRow, run: hold },
    {
      id: 'solutions',
      label: 'List the other solutions, or put the list away',
      keys: ['o'],
      when: () => resting() && selected !== undefined,
      run: () => listSolutions(solutionsOfId === selectedId ? null : selectedId),
    },
    {
      id: 'close-solutions',
      label: 'Put the list of solutions away',
      keys: ['Escape'],
      when: () => resting() && solutionsOfId !== null,
      run: () => listSolutions(null),
    },
    { id: 'undo', label: 'Undo', keys: ['Ctrl+z'], when: () => mayWrite, run: draft.undo },
    {
      id: 'redo',
      label: 'Do it again',
      keys: ['Ctrl+Shift+z', 'Ctrl+y'],
      when: () => mayWrite,
      run: draft.redo,
    },
  ];
  useCommands(commands);
  return commands;
}
