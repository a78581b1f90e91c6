import type { RefObject } from 'react';
import { LeaveUnsaved } from '../../components/LeaveUnsaved';

/** A form whose changes are on this page only: `what` is "the bench", as a sentence goes on. */
export function LeaveForm(props: {
  readonly isDirty: boolean;
  readonly isDone: RefObject<boolean>;
  readonly what: string;
}) {
  const { isDirty, isDone, what } = props;
  return (
    <LeaveUnsaved
      isUnsaved={isDirty}
      isDone={isDone}
      question={`Leave ${what} unsaved?`}
      stay={`Stay with ${what}`}
      leave="Leave it unsaved"
    >
      <p>What was typed is on this page only. What was saved before stays as it is.</p>
    </LeaveUnsaved>
  );
}
