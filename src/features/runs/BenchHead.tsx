import type { RunSummary } from '../../../shared/schemas/runs';
import type { VersionContent } from '../../../shared/schemas/versions';
import { WrittenFormula } from '../../components/WrittenFormula';
import type { BenchReading } from './use-bench';
import { LaserCaution } from '../benches';

interface BenchHeadProps {
  readonly content: VersionContent;
  readonly summary: RunSummary;
  /** From 0; equal to the number of settings when all are passed. */
  readonly setting: number;
  /** What was recorded at this setting before; a new reading takes its place. */
  readonly before: BenchReading | undefined;
}

/** Which setting of how many, what it makes, and whose it is; the caution stays in view beside it. */
export function BenchHead({ content, summary, setting, before }: BenchHeadProps) {
  const target = content.targets[setting];
  const { laserClass, hazardWavelengthsNm } = content.bench;
  return (
    <header className="bench-head">
      <h1 className="bench-count">
        {target === undefined ? (
          <span className="bench-count-of">all {content.targets.length}</span>
        ) : (
          <>
            <span className="sr-only">Setting </span>
            <span className="bench-count-now font-mono">{setting + 1}</span>
            <span className="bench-count-of">
              {' '}
              of <span className="font-mono">{content.targets.length}</span>
            </span>
          </>
        )}
      </h1>
      <div className="bench-what">
        {target !== undefined && (
          <p className="bench-target">
            <b>{target.label}</b>{' '}
            <WrittenFormula
              expression={target.expression}
              kind={content.kind}
              convention={content.convention}
            />
          </p>
        )}
        <p className="bench-whose">
          {summary.protocolName}, version {summary.versionNumber}, run {summary.number}
        </p>
        {before !== undefined && (
          <p className="bench-whose">
            {before.outcome === 'done' ? 'Recorded' : `Skipped: “${before.note}”`}
            {before.recordedBy === null ? ', waits here' : ` by ${before.recordedBy}`}. A new reading takes
            its place.
          </p>
        )}
      </div>
      <div className="bench-caution">
        <LaserCaution {...{ laserClass, hazardWavelengthsNm }} variant="short" />
      </div>
    </header>
  );
}
