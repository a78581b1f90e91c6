import { useEffect } from 'react';
import type { Run } from '../../../shared/schemas/runs';
import type { Version } from '../../../shared/schemas/versions';
import { BenchNavigation } from '../../components/BenchNavigation';
import { Scientific } from '../../components/Scientific';
import { TextLink } from '../../components/TextLink';
import { VersionSeal } from '../../components/VersionSeal';
import { formatDate, formatTime } from '../../lib/format';
import { useLab } from '../labs';
import { benchTargets } from './bench-targets';
import { LeftReadings } from './LeftReadings';
import { RecordTable } from './RecordTable';

const states = { running: 'in progress', paused: 'paused', finished: 'finished' } as const;

/** What a run recorded, setting by setting, and the version it stays tied to. */
export function RunRecord({ run, version }: { readonly run: Run; readonly version: Version }) {
  const { lab } = useLab();
  const { summary } = run;
  const { content } = version;
  const started = new Date(summary.startedAt);
  const finished = summary.finishedAt === null ? null : new Date(summary.finishedAt);
  useEffect(() => {
    document.title = `Record of run ${summary.number} – Quarterturn`;
  }, [summary.number]);
  return (
    <>
      <BenchNavigation homeHref={`/labs/${lab.id}`} targets={benchTargets(lab.id)} />
      <main id="page" tabIndex={-1} className="px-5 pt-6 pb-10 sm:px-10">
        <header className="flex flex-wrap items-start gap-x-5 gap-y-2">
          <VersionSeal state="saved" number={summary.versionNumber} />
          <div className="min-w-0 flex-1">
            <h1 className="text-title">
              Run {summary.number} of {summary.protocolName}, {states[summary.state]}
            </h1>
            <p className="mt-1">
              {summary.doneCount} of {summary.settingCount} settings recorded
              {summary.skippedCount > 0 && `, ${summary.skippedCount} skipped`}, at {summary.benchName}.
              Started {formatDate(started)} {formatTime(started)} by {summary.startedBy}
              {finished !== null && `, finished ${formatDate(finished)} ${formatTime(finished)}`}.
            </p>
            <p className="mt-1 text-ink-2">
              Tied to{' '}
              <TextLink to={`/labs/${lab.id}/plan/${summary.protocolId}/versions/${summary.versionNumber}`}>
                version {summary.versionNumber}
              </TextLink>
              , content <span className="font-mono">{version.summary.contentHash.slice(0, 12)}</span>, which
              never changes.
              {summary.state !== 'finished' && (
                <>
                  {' '}
                  <TextLink to={`/labs/${lab.id}/bench/runs/${summary.id}`}>Go to the run</TextLink>
                </>
              )}
            </p>
          </div>
        </header>
        {summary.state === 'finished' && <LeftReadings runId={summary.id} />}
        <p className="mt-6 mb-0 max-w-prose text-s text-ink-2">
          The tolerance is 1 − F ≤ <Scientific value={content.toleranceInfidelity} />. <b>Not within</b>: all
          of the bar is worse than that, left of the bracket. <b>Not decided</b>: the bracket lies within the
          bar, so that the σ of these plates and mounts leave it open.
        </p>
        <RecordTable run={run} content={content} />
      </main>
    </>
  );
}
