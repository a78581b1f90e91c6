import { useQuery } from '@tanstack/react-query';
import { useId } from 'react';
import { listed } from '../../../shared/words';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import type { Reliance, ReliantVersion } from '../../../shared/schemas/reliance';
import { BeamWorking } from '../../components/BeamState';
import { classNames } from '../../components/class-names';
import { SectionHead } from '../../components/SectionHead';
import { TextLink } from '../../components/TextLink';
import { QueryState } from '../../lib/QueryState';
import { useLab } from '../labs';
import { relianceQuery } from './queries';
import { reportWords } from './report-words';
import { ResolveInDraft } from './ResolveInDraft';

type RelyingPlate = Pick<CabinetPlate, 'id' | 'name' | 'seat'>;

/** Every bench, draft and newest version that uses a plate, and what its last change does to each. */
export function ReliesOnPlate({ plate }: { readonly plate: RelyingPlate }) {
  const { lab } = useLab();
  const headId = useId();
  const reliance = useQuery(relianceQuery(lab.id, plate.id));
  return (
    <section aria-labelledby={headId} className="mt-6">
      <SectionHead id={headId} level={3} className="pt-3">
        What relies on {plate.name}
      </SectionHead>
      {reliance.data === undefined ? (
        <QueryState query={reliance} what={`what relies on ${plate.name}`} />
      ) : (
        <Relying reliance={reliance.data} plate={plate} />
      )}
    </section>
  );
}

function Relying({
  reliance: { benches, drafts, versions },
  plate,
}: {
  readonly reliance: Reliance;
  readonly plate: RelyingPlate;
}) {
  const { lab } = useLab();
  if (benches.length === 0 && versions.length === 0) {
    return <p className="text-ink-2">No bench has it in its beam, and no version was saved with it.</p>;
  }
  return (
    <>
      <p className="text-s text-ink-2">{summary(versions, plate)}</p>
      {versions.length > 0 && (
        <ul aria-label={`Versions that rely on ${plate.name}`}>
          {versions.map((version) => (
            <VersionRow key={version.versionId} version={version} />
          ))}
        </ul>
      )}
      {benches.length > 0 && (
        <p className="text-s text-ink-2 mt-3">
          {plate.seat === null ? 'It has a place, empty now, in' : 'It stands in'} the beam of{' '}
          {listed(benches.map(({ name }) => name))}
          {drafts.length === 0 ? '.' : '; these drafts solve with its newest calibration by themselves: '}
          {drafts.map(({ protocolId, protocolName }, index) => (
            <span key={protocolId}>
              {index > 0 && ', '}
              <TextLink to={`/labs/${lab.id}/plan/${protocolId}`}>{protocolName}</TextLink>
              {index === drafts.length - 1 && '.'}
            </span>
          ))}
        </p>
      )}
    </>
  );
}

function summary(versions: readonly ReliantVersion[], plate: RelyingPlate) {
  const unseated = versions.some(({ report }) =>
    report?.voids.some(({ why, plateId }) => why === 'seat-ended' && plateId === plate.id),
  );
  if (unseated)
    return `The old seat’s angles are void: every dial of ${plate.name} is wrong until re-solved.`;
  const stale = versions.filter(({ report }) => report?.stale === true).length;
  if (versions.length === 0) return 'No version was saved with it yet.';
  if (stale === 0) return 'Nothing has changed since these versions were saved.';
  return versions.length === 1
    ? 'The version with it holds angles from before its last change.'
    : `${stale} of ${versions.length} versions hold angles from before a change of what they rely on.`;
}

/** One version: its name, what is known of it in words, and one way on. */
function VersionRow({ version }: { readonly version: ReliantVersion }) {
  const { lab, may } = useLab();
  const { protocolId, protocolName, number, progress, report } = version;
  const stale = report?.stale === true;
  return (
    <li className="border-hair flex flex-wrap items-start justify-between gap-x-4 gap-y-1 border-b py-2.5">
      <div className="min-w-0 flex-1 basis-60">
        <p>
          <TextLink
            to={`/labs/${lab.id}/plan/${protocolId}/versions/${number}`}
            className="font-strong border-b-0!"
          >
            {protocolName}
          </TextLink>{' '}
          {number}
        </p>
        <ReportSentences version={version} />
        {progress !== null && (
          <BeamWorking
            doing="Working out what its dials make now"
            unit="row"
            done={progress.done}
            total={progress.total}
            className="max-w-72 py-1"
          />
        )}
      </div>
      {stale && report.resolved !== null && may('protocols.write') && (
        <div className="shrink-0">
          <ResolveInDraft labId={lab.id} version={version} />
        </div>
      )}
    </li>
  );
}

function ReportSentences({ version: { report, progress } }: { readonly version: ReliantVersion }) {
  if (report === null)
    return progress === null ? <p className="text-s text-ink-2">As it was saved: its dials hold.</p> : null;
  if (!report.stale) return <p className="text-s text-ink-2">Its dials make what they made.</p>;
  const { now, resolved, wrong } = reportWords(report);
  return (
    // While new numbers are worked out the old ones stay, in the ink of what was.
    <div className={classNames('text-s', progress === null ? 'text-ink-2' : 'text-ink-3')}>
      <p className={classNames(wrong && progress === null && 'text-fault font-strong')}>{now}</p>
      <p>{resolved}</p>
    </div>
  );
}
