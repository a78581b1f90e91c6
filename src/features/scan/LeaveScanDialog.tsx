import { type RefObject, useEffect } from 'react';
import { useBlocker } from 'react-router-dom';
import { Button } from '../../components/Button';
import { Dialog } from '../../components/Dialog';

interface LeaveScanDialogProps {
  /** A file is there and not recorded. */
  readonly isOpen: boolean;
  /** Set once it is recorded, before the page is left. */
  readonly isDone: RefObject<boolean>;
}

/** A scan that is not recorded is on this page only, so leaving asks once. */
export function LeaveScanDialog({ isOpen, isDone }: LeaveScanDialogProps) {
  const blocker = useBlocker(
    ({ currentLocation, nextLocation }) =>
      isOpen && !isDone.current && nextLocation.pathname !== currentLocation.pathname,
  );
  useEffect(() => {
    if (!isOpen) return undefined;
    const ask = (event: BeforeUnloadEvent): void => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [isOpen]);
  const stay = () => blocker.reset?.();
  return (
    <Dialog
      open={blocker.state === 'blocked'}
      question="Leave the scan unrecorded?"
      onClose={stay}
      actions={
        <>
          <Button onClick={stay}>Stay with the scan</Button>
          <Button kind="danger" onClick={() => blocker.proceed?.()}>
            Leave it unrecorded
          </Button>
        </>
      }
    >
      <p>The file, the columns and the lines left out are on this page only. The plate keeps what it had.</p>
    </Dialog>
  );
}
