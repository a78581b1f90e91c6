import type { RefObject } from 'react';
import { Button } from '../../components/Button';
import { LeaveUnsaved } from '../../components/LeaveUnsaved';

/** A form whose changes are on this page only: `what` is "the bench", as a sentence goes on. */
export function LeaveForm(props: {
  readonly isDirty: boolean;
  readonly isDoneRef: RefObject<boolean>;
  readonly what: string;
}) {
  const { isDirty, isDoneRef, what } = props;
  return (
    <LeaveUnsaved
      isUnsaved={isDirty}
      isDoneRef={isDoneRef}
      question={`Leave ${what} unsaved?`}
      stay={`Stay with ${what}`}
      leave="Leave it unsaved"
    >
      <p>What was typed is on this page only. What was saved before stays as it is.</p>
    </LeaveUnsaved>
  );
}

/** The way back that is chosen on purpose, and asks nothing. */
export function LeaveAsItWas(props: {
  readonly isDoneRef: RefObject<boolean>;
  readonly onLeave: () => void;
}) {
  const { isDoneRef, onLeave } = props;
  return (
    <Button
      onClick={() => {
        isDoneRef.current = true;
        onLeave();
      }}
    >
      Leave it as it was
    </Button>
  );
}
