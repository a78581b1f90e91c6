import { OutOfReachSign } from '../../../components/SmallSigns';
import { Scientific } from '../../../components/Scientific';
import type { RowView } from './row-view';

interface RowNoteProps {
  readonly view: Extract<RowView, { status: 'solved' }>;
  readonly columns: number;
}

/** The one thing worth saying about a row, under it and across. */
export function RowNote({ view, columns }: RowNoteProps) {
  const { solved, solution, reading } = view;
  if (solved.kind === 'nearest') {
    return (
      <NoteLine columns={columns} sign={<OutOfReachSign />}>
        Out of reach by {solved.shortfallDeg.toFixed(1)}° on the sphere. The closest setting leaves 1 − F{' '}
        <Scientific value={solution.infidelity} />.
      </NoteLine>
    );
  }
  if (solved.kind === 'family') {
    return (
      <NoteLine columns={columns}>
        Any angle of one plate serves here, if the other follows it. Four members are listed.
      </NoteLine>
    );
  }
  if (reading.normalised) {
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
  readonly sign?: React.ReactNode;
  readonly children: React.ReactNode;
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
