import { Button } from '../../components/Button';
import type { Bench } from './use-bench';

interface PassedBenchProps {
  readonly bench: Bench;
  readonly labels: readonly string[];
  readonly mayRecord: boolean;
  readonly finishWaitsFor?: string | undefined;
  readonly fault: string;
  readonly onFinish: () => void;
}

/** All settings are passed: what was skipped can still be done, then the run is finished. */
export function PassedBench({ bench, labels, mayRecord, finishWaitsFor, fault, onFinish }: PassedBenchProps) {
  const skipped = bench.outcomes.flatMap((outcome, index) => (outcome === 'skipped' ? [index] : []));
  const recorded = bench.outcomes.filter((outcome) => outcome === 'done').length;
  return (
    <section className="bench-pause" aria-labelledby="bench-passed-title">
      <h2 id="bench-passed-title" className="bench-pause-title">
        {recorded} of {bench.settingCount} settings are recorded
        {skipped.length > 0 && `, ${skipped.length} skipped`}
      </h2>
      {skipped.length > 0 && (
        <ul className="bench-skipped">
          {skipped.map((index) => (
            <li key={index}>
              <span>
                {index + 1} {labels[index]}: “{bench.newest[index]?.note}”
              </span>
              {mayRecord && (
                <Button size="far" onClick={() => bench.goTo(index)}>
                  Do setting {index + 1}
                </Button>
              )}
            </li>
          ))}
        </ul>
      )}
      <p>A finished run takes no more readings. Its record stays tied to its version.</p>
      {fault !== '' && (
        <p role="alert" className="bench-fault hatched">
          {fault}
        </p>
      )}
      {mayRecord && (
        <Button size="far" kind="filled" onClick={onFinish} waitsFor={finishWaitsFor}>
          Finish the run
        </Button>
      )}
    </section>
  );
}
