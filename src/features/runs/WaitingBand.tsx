import { TextButton } from '../../components/TextLink';
import { formatTime } from '../../lib/format';
import type { WaitingReading } from './kept-entry';
import type { Sending } from './use-sending';

interface WaitingBandProps {
  readonly waiting: readonly WaitingReading[];
  /** Whether they outlive this page. */
  readonly kept: boolean;
  readonly sending: Sending;
  readonly onDiscard: (key: string) => void;
}

const counts = ['No', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven', 'Eight', 'Nine'] as const;

function readingsWait(count: number): string {
  return count === 1
    ? 'one reading waits'
    : `${(counts[count] ?? String(count)).toLowerCase()} readings wait`;
}

/** Says why readings are still on this device, that they are not lost, and what can be done. Nothing while all is well. */
export function WaitingBand({ waiting, kept, sending, onDiscard }: WaitingBandProps) {
  const { trouble, sendAgain } = sending;
  const [oldest] = waiting;
  if (oldest === undefined) return null;
  if (trouble === null) return null;
  const place = kept
    ? 'on this device'
    : 'in this page only, since the browser keeps nothing: do not close it';
  if (trouble.kind === 'cut-off') {
    return (
      <section role="status" className="bench-band hatched">
        <GapSign />
        <p>
          No answer from the server since {formatTime(trouble.since)}. Carry on:{' '}
          {readingsWait(waiting.length)} {place} and {waiting.length === 1 ? 'goes' : 'go'} out by{' '}
          {waiting.length === 1 ? 'itself' : 'themselves'}.
        </p>
        <TextButton onClick={sendAgain}>Send now</TextButton>
      </section>
    );
  }
  return (
    <section role="alert" className="bench-band hatched">
      <GapSign />
      <p>
        The server did not take the reading of setting {oldest.body.settingIndex + 1}: {trouble.message}{' '}
        {readingsWait(waiting.length).replace(/^\w/u, (first) => first.toUpperCase())} {place}.
      </p>
      <span className="flex flex-wrap gap-4">
        <TextButton onClick={sendAgain}>Send again</TextButton>
        <TextButton onClick={() => onDiscard(oldest.key)}>
          Drop setting {oldest.body.settingIndex + 1}’s reading
        </TextButton>
      </span>
    </section>
  );
}

/** A beam broken by a gap. */
function GapSign() {
  return (
    <svg viewBox="0 0 78 26" width="78" height="26" aria-hidden="true">
      <path d="M0 13H26M52 13H78M26 2V24M52 2V24" fill="none" stroke="currentColor" strokeWidth="2.6" />
      <path d="M33 13H46" fill="none" stroke="currentColor" strokeWidth="2.6" strokeDasharray="3 2.2" />
    </svg>
  );
}
