import type { Bench } from '../../../shared/schemas/benches';
import type { Version } from '../../../shared/schemas/versions';
import { formatDate } from '../../lib/format';
import { stalePlates } from './recalibrated-plates';

interface VersionWarningsProps {
  readonly version: Version;
  /** The bench as it stands now; undefined while it is being fetched. */
  readonly live: Bench | undefined;
  /** The bench could not be fetched. */
  readonly unknown: boolean;
}

/** What speaks against running this version as it is, in words. None of it stops the run. */
export function VersionWarnings({ version, live, unknown }: VersionWarningsProps) {
  const { summary, content } = version;
  const stale = live === undefined ? [] : stalePlates(content, live);
  const wavelengthMoved = live !== undefined && live.wavelengthNm !== content.bench.wavelengthNm;
  const inputMoved = live !== undefined && live.inputExpression !== content.bench.input.expression;
  return (
    <section aria-label="What to know about this version" className="border-t-[1.5px] border-ink pt-3">
      <ul className="list-none space-y-2">
        <li>Version {summary.number} is saved, not released: nobody has reviewed it.</li>
        {stale.map(({ name, reason, measuredAt }) => (
          <li key={name} className="font-strong text-fault">
            {reason === 'recalibrated' && measuredAt !== null
              ? `${name} has a newer calibration, of ${formatDate(new Date(measuredAt))}. This version’s dials are for the older one: save a new version to use it.`
              : `${name} no longer stands in its place at ${content.bench.name}. This version’s dials are for it.`}
          </li>
        ))}
        {wavelengthMoved && (
          <li className="font-strong text-fault">
            {content.bench.name} now works at {live.wavelengthNm} nm. This version’s dials are for{' '}
            {content.bench.wavelengthNm} nm.
          </li>
        )}
        {inputMoved && (
          <li className="font-strong text-fault">
            The input of {content.bench.name} is now {live.inputExpression}. This version’s dials are for{' '}
            {content.bench.input.expression}.
          </li>
        )}
        {unknown && (
          <li className="font-strong text-fault">
            The bench could not be fetched, so that this page cannot say whether a plate was recalibrated
            since.
          </li>
        )}
      </ul>
    </section>
  );
}
