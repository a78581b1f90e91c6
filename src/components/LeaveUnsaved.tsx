import { type ReactNode, type RefObject, useEffect } from 'react';
import { useBlocker } from 'react-router-dom';
import { Button } from './Button';
import { Dialog } from './Dialog';

interface LeaveUnsavedProps {
  /** Something is typed or chosen that no server has. */
  readonly isUnsaved: boolean;
  /** Set once it is saved, or left on purpose, before the page is left. */
  readonly isDone: RefObject<boolean>;
  readonly question: string;
  readonly stay: string;
  readonly leave: string;
  /** What is lost, and what stays. */
  readonly children: ReactNode;
}

/** What is on this page only is not lost to a link or to Back: leaving asks once. */
export function LeaveUnsaved({ isUnsaved, isDone, question, stay, leave, children }: LeaveUnsavedProps) {
  const blocker = useBlocker(
    ({ currentLocation: here, nextLocation: next }) =>
      isUnsaved && !isDone.current && (next.pathname !== here.pathname || next.search !== here.search),
  );
  useEffect(() => {
    if (!isUnsaved) return undefined;
    const ask = (event: BeforeUnloadEvent): void => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [isUnsaved]);
  const onStay = () => blocker.reset?.();
  return (
    <Dialog
      open={blocker.state === 'blocked'}
      question={question}
      onClose={onStay}
      actions={
        <>
          <Button onClick={onStay}>{stay}</Button>
          <Button kind="danger" onClick={() => blocker.proceed?.()}>
            {leave}
          </Button>
        </>
      }
    >
      {children}
    </Dialog>
  );
}
