import { useEffect, useRef } from 'react';
import { useBlocker } from 'react-router-dom';
import { Button } from '../../components/Button';
import { Dialog } from '../../components/Dialog';

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
  const blocker = useBlocker(
    ({ nextLocation }) => running && !answered.current && !nextLocation.pathname.startsWith(recordHref),
  );
  useEffect(() => {
    if (!running) return;
    const ask = (event: BeforeUnloadEvent): void => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [running]);
  const stay = (): void => blocker.reset?.();
  const at = settingNumber === null ? 'with all its settings passed' : `at setting ${settingNumber}`;
  return (
    <Dialog
      open={blocker.state === 'blocked'}
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
              blocker.proceed?.();
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
