import { useRef } from 'react';
import { Button } from '../../components/Button';
import { Dialog } from '../../components/Dialog';
import { useLeaveAsked } from '../../lib/use-leave-asked';

interface LeaveRunDialogProps {
  readonly running: boolean;
  readonly runNumber: number;
  /** Counted from 1; null when all settings are passed. */
  readonly settingNumber: number | null;
  /** Pages below this address belong to the run. */
  readonly recordHref: string;
}

/** Leaving a run in progress asks once, so that a sleeve can't end it. */
export function LeaveRunDialog({ running, runNumber, settingNumber, recordHref }: LeaveRunDialogProps) {
  const answered = useRef(false);
  const { isAsked, stay, leave } = useLeaveAsked(
    running,
    ({ nextLocation }) => !answered.current && !nextLocation.pathname.startsWith(recordHref),
  );
  const at = settingNumber === null ? 'with all its settings passed' : `at setting ${settingNumber}`;
  return (
    <Dialog
      open={isAsked}
      question={`Leave run ${runNumber} ${at}?`}
      onClose={stay}
      actions={
        <>
          <Button size="far" onClick={stay}>
            Stay at the bench
          </Button>
          <Button
            size="far"
            kind="filled"
            onClick={() => {
              answered.current = true;
              leave();
            }}
          >
            Leave the run standing
          </Button>
        </>
      }
    >
      <p>
        What is recorded stays. The run goes on standing where it is, and anyone who may record can take it up
        again.
      </p>
    </Dialog>
  );
}
