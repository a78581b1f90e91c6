import { memo } from 'react';
import type { Plate } from '../../../../shared/schemas/cabinet';
import type { DraftTarget } from '../../../../shared/schemas/protocols';
import { classNames } from '../../../components/class-names';
import { FidelityChip } from '../../../components/FidelityChip';
import { Scientific } from '../../../components/Scientific';
import { HeldSign } from '../../../components/SmallSigns';
import { formatDial, formatTheta } from '../../../lib/format';
import { dialledAxisDeg } from './dialled-problem';
import type { RowView } from './row-view';
import type { RowActions } from './TargetRow';

const chipWidthPx = 100;

type Solved = Extract<RowView, { status: 'solved' }>;

interface RowNumbersProps {
  readonly target: DraftTarget;
  /** Null while there is no answer: the cells then stand empty. */
  readonly solved: Solved | null;
  readonly plates: readonly Plate[];
  readonly toleranceInfidelity: number;
  readonly name: string;
  /** Whether the row's other solutions are listed. */
  readonly open: boolean;
  readonly actions: RowActions;
}

/** Where each plate must stand for a target, how well that does, and which of the solutions it is. */
export const RowNumbers = memo(function RowNumbers(props: RowNumbersProps) {
  const { target, solved, plates, toleranceInfidelity, name, open, actions } = props;
  const numbers = classNames('text-right whitespace-nowrap', solved?.stale === true && 'text-ink-3');
  return (
    <>
      {plates.map((plate, index) => (
        <td key={plate.id} className={numbers}>
          {solved !== null && (
            <>
              <span className="font-mono text-dial">
                {formatDial(solved.solution.dialsDeg[index] ?? 0, plate.mount.resolutionDeg)}
              </span>
              <span className="theta">
                {formatTheta(dialledAxisDeg(plate, solved.solution.dialsDeg[index] ?? 0))}
              </span>
            </>
          )}
        </td>
      ))}
      <td className={classNames(numbers, 'chip-cell')}>
        {solved !== null && (
          <span className="chip-line">
            <FidelityChip
              width={chipWidthPx}
              infidelity={{
                value: solved.solution.expectedInfidelity,
                low: solved.solution.expectedLow,
                high: solved.solution.expectedHigh,
              }}
              tolerance={toleranceInfidelity}
              kind="predicted"
            />
            <Scientific value={solved.solution.expectedInfidelity} />
          </span>
        )}
      </td>
      <td className={classNames(numbers, 'pr-1 font-mono text-s')}>
        {solved !== null && (
          <SolutionCount
            solved={solved}
            name={name}
            open={open}
            onOpen={(open) => actions.listSolutions(target, open)}
          />
        )}
      </td>
    </>
  );
});

interface SolutionCountProps {
  readonly solved: Solved;
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
