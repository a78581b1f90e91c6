import { Button } from '../../components/Button';

interface VoidBenchProps {
  readonly runNumber: number;
  /** A sentence for each plate. */
  readonly voids: readonly string[];
  readonly onPause: () => void;
  readonly onGoOn: () => void;
}

/** A run some of whose dials point anywhere since a plate was moved: nothing is confirmed before somebody says that it is known. */
export function VoidBench({ runNumber, voids, onPause, onGoOn }: VoidBenchProps) {
  return (
    <section className="bench-pause" aria-labelledby="bench-void-title">
      <h2 id="bench-void-title" className="bench-pause-title">
        Dials of run {runNumber} are void
      </h2>
      <div role="alert" className="bench-fault hatched">
        {voids.map((sentence) => (
          <p key={sentence}>{sentence}</p>
        ))}
      </div>
      <p>
        What is recorded from here on is not what the version predicts. What was recorded before stays as it
        is.
      </p>
      <Button size="far" kind="filled" onClick={onPause} autoFocus>
        Pause the run
      </Button>
      <Button size="far" onClick={onGoOn}>
        Go on with void dials
      </Button>
    </section>
  );
}
