import type { RunSummary } from '../../../shared/schemas/runs';
import { Button } from '../../components/Button';

interface PausedBenchProps {
  readonly summary: RunSummary;
  /** Counted from 1; null when all settings are passed. */
  readonly settingNumber: number | null;
  readonly mayRecord: boolean;
  readonly busy: boolean;
  readonly fault: string;
  readonly onResume: () => void;
}

/** A run that stands still: why, where, and the way on. */
export function PausedBench({ summary, settingNumber, mayRecord, busy, fault, onResume }: PausedBenchProps) {
  const at = settingNumber === null ? 'after its last setting' : `before setting ${settingNumber}`;
  return (
    <section className="bench-pause" aria-labelledby="bench-pause-title">
      <h2 id="bench-pause-title" className="bench-pause-title">
        Run {summary.number} is paused {at}
      </h2>
      {summary.pauseNote !== '' && <p className="bench-pause-note">“{summary.pauseNote}”</p>}
      <p>
        {summary.doneCount} of {summary.settingCount} settings are recorded
        {summary.skippedCount > 0 && `, ${summary.skippedCount} skipped`}. Where the dials stand is taken from
        the last reading. If somebody has turned a plate since, its dial says so: go by the number, not by the
        way.
      </p>
      {fault !== '' && (
        <p role="alert" className="bench-fault hatched">
          {fault}
        </p>
      )}
      {mayRecord ? (
        <Button
          size="far"
          kind="filled"
          onClick={onResume}
          waitsFor={busy ? 'the server to answer' : undefined}
          autoFocus
        >
          {settingNumber === null ? 'Resume the run' : `Resume at setting ${settingNumber}`}
        </Button>
      ) : (
        <p>An operator, a designer or the lead can resume it.</p>
      )}
    </section>
  );
}
