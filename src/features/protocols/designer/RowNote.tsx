import type { ReactNode } from 'react';
import type { SolvedTarget } from '../../../../shared/optics/solve-target';
import { OutOfReachSign } from '../../../components/SmallSigns';
import { Scientific } from '../../../components/Scientific';
import { toleranceVerdict } from './verdict';
import type { RowNoteKind } from './row-notes';
import type { RowView } from './row-view';

type Solved = Extract<RowView, { status: 'solved' }>;

interface RowNoteProps {
  readonly kind: RowNoteKind;
  readonly view: Solved;
  readonly toleranceInfidelity: number;
  readonly columns: number;
  readonly rowIndex: number;
}

const plateWords = ['first', 'second', 'third', 'fourth', 'fifth', 'sixth'] as const;

function familyWords({ freePlates, solutions }: SolvedTarget, held: boolean): string {
  const free = freePlates.map((plate) => plateWords[plate] ?? '').join(' and the ');
  const may = freePlates.length === 1 ? 'plate may stand' : 'plates may each stand';
  return `The ${free} ${may} at any of many angles here, with the others to match. ${held ? 'The held member stands' : 'The best member stands'}; ${solutions.length} of the family are listed.`;
}

/** A row under the target's row, across. */
export function RowNote({ kind, view, toleranceInfidelity, columns, rowIndex }: RowNoteProps) {
  return (
    <NoteLine
      columns={columns}
      rowIndex={rowIndex}
      sign={kind === 'out-of-reach' ? <OutOfReachSign /> : undefined}
    >
      {noteWords(kind, view, toleranceInfidelity)}
    </NoteLine>
  );
}

function noteWords(kind: RowNoteKind, view: Solved, toleranceInfidelity: number): ReactNode {
  const { solved, solution, reading } = view;
  switch (kind) {
    case 'held-is-gone':
      return 'The held solution is not there any more: the best one stands. List the solutions to hold another.';
    case 'out-of-reach': {
      const verdict = toleranceVerdict(solution, toleranceInfidelity);
      return (
        <>
          Out of reach by {solved.shortfallDeg.toFixed(1)}°{' '}
          {reading.kind === 'state' ? 'on the sphere' : 'of turn'}. The closest setting leaves 1 − F{' '}
          <Scientific value={solution.infidelity} />
          {verdict === 'within'
            ? ''
            : `, which is ${verdict === 'not within' ? 'not within' : 'not decided against'} the tolerance`}
          .
        </>
      );
    }
    case 'not-within':
      return 'Not within the tolerance: even the 5 % point of what is expected lies beyond it.';
    case 'not-decided':
      return 'Not decided: the tolerance lies between the 5 % and 95 % points of what is expected.';
    case 'family':
      return familyWords(solved, view.held);
    case 'normalised':
      return reading.kind === 'unitary'
        ? `Written ${Number(reading.scale.toPrecision(4))} times a unitary; taken as the unitary.`
        : `Written with length ${Number(reading.norm.toPrecision(4))}; taken as the state in that direction, length 1.`;
  }
}

interface NoteLineProps {
  readonly columns: number;
  readonly rowIndex: number;
  readonly sign: ReactNode;
  readonly children: ReactNode;
}

function NoteLine({ columns, rowIndex, sign, children }: NoteLineProps) {
  return (
    <tr className="target-note" aria-rowindex={rowIndex}>
      <td colSpan={2} />
      <td colSpan={columns - 2}>
        <span className="flex items-center gap-2">
          {sign}
          <span>{children}</span>
        </span>
      </td>
    </tr>
  );
}
