import type { ReactNode } from 'react';
import type { SolvedTarget } from '../../../../shared/optics/solve-target';
import { OutOfReachSign } from '../../../components/SmallSigns';
import { Scientific } from '../../../components/Scientific';
import { toleranceVerdict } from './verdict';
import type { RowView } from './row-view';

interface RowNoteProps {
  readonly view: Extract<RowView, { status: 'solved' }>;
  readonly toleranceInfidelity: number;
  readonly columns: number;
  /** What is no more than worth knowing is said of the selected row only. */
  readonly selected: boolean;
}

const plateWords = ['first', 'second', 'third', 'fourth', 'fifth', 'sixth'] as const;

function familyWords({ freePlates, solutions }: SolvedTarget, held: boolean): string {
  const free = freePlates.map((plate) => plateWords[plate] ?? '').join(' and the ');
  const may = freePlates.length === 1 ? 'plate may stand' : 'plates may each stand';
  return `The ${free} ${may} at any of many angles here, with the others to match. ${held ? 'The held member stands' : 'The best member stands'}; ${solutions.length} of the family are listed.`;
}

/** The one thing most worth saying about a row, under it and across. */
export function RowNote({ view, toleranceInfidelity, columns, selected }: RowNoteProps) {
  const { solved, solution, reading, heldIsGone } = view;
  const verdict = toleranceVerdict(solution, toleranceInfidelity);
  if (heldIsGone) {
    return (
      <NoteLine columns={columns}>
        The held solution is not there any more: the best one stands. List the solutions to hold another.
      </NoteLine>
    );
  }
  if (solved.shortfallDeg > 0) {
    return (
      <NoteLine columns={columns} sign={<OutOfReachSign />}>
        Out of reach by {solved.shortfallDeg.toFixed(1)}°{' '}
        {reading.kind === 'state' ? 'on the sphere' : 'of turn'}. The closest setting leaves 1 − F{' '}
        <Scientific value={solution.infidelity} />
        {verdict === 'within'
          ? ''
          : `, which is ${verdict === 'not within' ? 'not within' : 'not decided against'} the tolerance`}
        .
      </NoteLine>
    );
  }
  if (verdict !== 'within') {
    return (
      <NoteLine columns={columns}>
        {verdict === 'not within'
          ? 'Not within the tolerance: even the 5 % point of what is expected lies beyond it.'
          : 'Not decided: the tolerance lies between the 5 % and 95 % points of what is expected.'}
      </NoteLine>
    );
  }
  if (!selected) return null;
  if (solved.kind === 'family')
    return <NoteLine columns={columns}>{familyWords(solved, view.held)}</NoteLine>;
  if (reading.normalised && reading.kind === 'unitary') {
    return (
      <NoteLine columns={columns}>
        Written {Number(reading.scale.toPrecision(4))} times a unitary; taken as the unitary.
      </NoteLine>
    );
  }
  if (reading.normalised && reading.kind === 'state') {
    return (
      <NoteLine columns={columns}>
        Written with length {Number(reading.norm.toPrecision(4))}; taken as the state in that direction,
        length 1.
      </NoteLine>
    );
  }
  return null;
}

interface NoteLineProps {
  readonly columns: number;
  readonly sign?: ReactNode;
  readonly children: ReactNode;
}

function NoteLine({ columns, sign, children }: NoteLineProps) {
  return (
    <tr className="target-note">
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
