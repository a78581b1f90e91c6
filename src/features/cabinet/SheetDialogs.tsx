import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { useLab } from '../labs';
import { SettleDialog } from './questions/SettleDialog';
import type { SettledQuestion } from './questions/settle';
import { SeatDialog } from './seats/SeatDialog';
import type { SeatMove } from './seats/seat-move';

function moveOf(task: string | null): SeatMove | null {
  switch (task) {
    case 'take-out':
      return 'out';
    case 'seat-anew':
      return 'anew';
    case 'seat':
      return 'other';
    default:
      return null;
  }
}

function questionOf(task: string | null): SettledQuestion | null {
  switch (task) {
    case 'settle-axis':
      return 'axis';
    case 'settle-branch':
      return 'branch';
    default:
      return null;
  }
}

/** The questions that a sheet asks before something that cannot be undone, as its address says which. */
export function SheetDialogs(props: {
  readonly plate: CabinetPlate;
  readonly task: string | null;
  readonly measures: boolean;
  readonly seats: boolean;
  readonly onClose: () => void;
}) {
  const { plate, task, measures, seats, onClose } = props;
  const { lab } = useLab();
  const move = moveOf(task);
  const question = questionOf(task);
  const { calibration } = plate;
  if (move !== null && seats) {
    return <SeatDialog key={task} labId={lab.id} plate={plate} wished={move} onClose={onClose} />;
  }
  if (question !== null && measures && calibration?.openQuestions.includes(question) === true) {
    return <SettleDialog key={task} labId={lab.id} {...{ plate, calibration, question, onClose }} />;
  }
  return null;
}
