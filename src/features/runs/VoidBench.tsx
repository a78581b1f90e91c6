import { listed } from '../../../shared/words';
import { Button } from '../../components/Button';

interface VoidBenchProps {
  readonly runNumber: number;
  /** Why, as parts of a sentence. */
  readonly reasons: readonly string[];
  /** With what the next person is to know. */
  readonly onPause: (note: string) => void;
  readonly onGoOn: () => void;
}

/** A run some of whose dials point anywhere since a plate was moved: nothing is confirmed before somebody says that it is known. */
export function VoidBench({ runNumber, reasons, onPause, onGoOn }: VoidBenchProps) {
  const sentence = `Its dials are void: ${listed(reasons)}.`;
  return (
    <section className="bench-pause" aria-labelledby="bench-void-title">
      <h2 id="bench-void-title" className="bench-pause-title">
        Run {runNumber} can’t go on as it is
      </h2>
      <div role="alert" className="bench-fault hatched">
        <p>{sentence}</p>
      </div>
      <p>
        What is recorded from here on is not what the version predicts. What was recorded before stays as it
        is.
      </p>
      <Button size="far" kind="filled" onClick={() => onPause(sentence)} autoFocus>
        Pause the run
      </Button>
      <Button size="far" onClick={onGoOn}>
        Go on with void dials
      </Button>
    </section>
  );
}
