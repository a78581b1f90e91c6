import type { ReactNode, RefObject } from 'react';
import { useLeaveAsked } from '../lib/use-leave-asked';
import { Button } from './Button';
import { Dialog } from './Dialog';

interface LeaveUnsavedProps {
  /** Something is typed or chosen that no server has. */
  readonly isUnsaved: boolean;
  /** Set once it is saved, or left on purpose, before the page is left. */
  readonly isDoneRef: RefObject<boolean>;
  readonly question: string;
  readonly stay: string;
  readonly leave: string;
  /** What is lost, and what stays. */
  readonly children: ReactNode;
}

/** What is on this page only is not lost to a link or to Back: leaving asks once. */
export function LeaveUnsaved({ isUnsaved, isDoneRef, question, stay, leave, children }: LeaveUnsavedProps) {
  const leaving = useLeaveAsked(
    isUnsaved,
    ({ currentLocation: here, nextLocation: next }) =>
      !isDoneRef.current && (next.pathname !== here.pathname || next.search !== here.search),
  );
  return (
    <Dialog
      open={leaving.isAsked}
      question={question}
      onClose={leaving.stay}
      actions={
        <>
          <Button onClick={leaving.stay}>{stay}</Button>
          <Button kind="danger" onClick={leaving.leave}>
            {leave}
          </Button>
        </>
      }
    >
      {children}
    </Dialog>
  );
}
