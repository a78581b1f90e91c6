import type { Bench } from '../../../shared/schemas/benches';
import type { Version } from '../../../shared/schemas/versions';
import { useLab } from '../labs';
import { OpenQuestionWarnings } from '../versions';
import { benchChanges, frozenElsewhere } from './bench-changes';

interface VersionWarningsProps {
  readonly version: Version;
  /** The bench as it stands now; undefined while it is being fetched. */
  readonly live: Bench | undefined;
  /** The bench could not be fetched. */
  readonly unknown: boolean;
}

/** What speaks against running this version as it is, in words. None of it stops the run. */
export function VersionWarnings({ version, live, unknown }: VersionWarningsProps) {
  const { lab } = useLab();
  const { summary, content } = version;
  const changes = live === undefined ? [] : benchChanges(content, live, lab.convention);
  const warnings = [...frozenElsewhere(content), ...changes];
  return (
    <section aria-label="What to know about this version" className="border-t-[1.5px] border-ink pt-3">
      <ul className="list-none space-y-2">
        <li>Version {summary.number} is saved, not released: nobody has reviewed it.</li>
        {warnings.map((warning) => (
          <li key={warning} className="font-strong text-fault">
            {warning}
          </li>
        ))}
        <OpenQuestionWarnings content={content} />
        {unknown && (
          <li className="font-strong text-fault">
            The bench could not be fetched, so that this page cannot say what was changed at it since.
          </li>
        )}
      </ul>
    </section>
  );
}
