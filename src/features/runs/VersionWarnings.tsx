import { useQuery } from '@tanstack/react-query';
import type { Bench } from '../../../shared/schemas/benches';
import type { Version } from '../../../shared/schemas/versions';
import { TextLink } from '../../components/TextLink';
import { formatMoment } from '../../lib/format';
import { useLab } from '../labs';
import { OpenQuestionWarnings, protocolVersionsQuery } from '../versions';
import { benchChanges, frozenElsewhere } from './bench-changes';
import { startHref } from './start-href';

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
        <NewerVersion {...summary} />
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

/** That the protocol has a newer version, and the way to run that one. */
function NewerVersion({ protocolId, number }: { readonly protocolId: string; readonly number: number }) {
  const { lab } = useLab();
  // As the protocol stands now: the newest may have been saved a minute ago.
  const versions = useQuery({ ...protocolVersionsQuery(lab.id, protocolId), staleTime: 0 });
  const newest = versions.data?.items.find((other) => other.number > number);
  if (newest === undefined) return null;
  return (
    <li className="font-strong text-fault">
      Version {newest.number} of this protocol is newer: saved{' '}
      {formatMoment(new Date(newest.savedAt), new Date())} by {newest.savedBy}.{' '}
      <TextLink to={startHref(lab.id, newest)}>Run version {newest.number}</TextLink>
    </li>
  );
}
