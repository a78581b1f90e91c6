import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import { describeConvention } from '../../../shared/optics/convention';
import type { Version } from '../../../shared/schemas/versions';
import { BeamWorking, BeamWrong } from '../../components/BeamState';
import { ButtonLink } from '../../components/Button';
import { Scientific } from '../../components/Scientific';
import { SectionHead } from '../../components/SectionHead';
import { TextButton, TextLink } from '../../components/TextLink';
import { VersionSeal } from '../../components/VersionSeal';
import { formatMoment, formatShortDate } from '../../lib/format';
import { saveFile } from '../../lib/save-file';
import { useTitle } from '../../lib/use-title';
import { useLab } from '../labs';
import { FrozenPlates } from './FrozenPlates';
import { FrozenTargets } from './FrozenTargets';
import { HashCheck } from './HashCheck';
import { OpenQuestionWarnings } from './OpenQuestionWarnings';
import { protocolVersionsQuery, versionQuery } from './queries';
import './versions.css';

/** One version: all that was frozen, and what it hangs on. */
export function Component() {
  const { lab } = useLab();
  const { protocolId = '', number = '' } = useParams();
  const version = useQuery(versionQuery(lab.id, protocolId, number));
  useTitle(
    version.isSuccess ? `${version.data.content.protocol.name}, version ${number}` : `Version ${number}`,
  );
  if (version.isPending) return <BeamWorking doing={`Fetching version ${number}`} />;
  if (version.isError) {
    return (
      <BeamWrong title={`Version ${number} could not be fetched`}>
        {version.error.message} <TextLink to={`/labs/${lab.id}/review`}>See all versions</TextLink>
      </BeamWrong>
    );
  }
  return <VersionSheet version={version.data} protocolId={protocolId} />;
}

const objectiveWords = {
  'least-expected-infidelity': 'least expected infidelity',
  'least-travel': 'least travel down the list',
  'nearest-to-present': 'nearest to where the dials stood',
} as const;

interface VersionSheetProps {
  readonly version: Version;
  readonly protocolId: string;
}

function VersionSheet({ version, protocolId }: VersionSheetProps) {
  const { lab, may } = useLab();
  const { summary, content } = version;
  const href = `/labs/${lab.id}/plan/${protocolId}`;
  return (
    <article>
      <header className="flex flex-wrap items-start justify-between gap-x-10 gap-y-3 pt-3">
        <div>
          <h1 className="m-0 flex items-center gap-4 text-title">
            <VersionSeal state="saved" number={summary.number} />
            {content.protocol.name}, version {summary.number}
          </h1>
          <p className="mt-2 mb-0">
            “{content.message}” {content.savedBy.name}, {formatMoment(new Date(content.savedAt), new Date())}.
          </p>
          <p className="mt-1 mb-0 text-s text-ink-2">
            {content.bench.name}, {content.bench.wavelengthNm} nm,{' '}
            {content.kind === 'prepare' ? `from ${content.bench.input.expression}` : 'unitaries'}; ranked by{' '}
            {objectiveWords[content.objective]}; tolerance 1 − F ≤{' '}
            <Scientific value={content.toleranceInfidelity} />; {describeConvention(content.convention)}.
          </p>
          {content.protocol.purpose !== '' && (
            <p className="mt-1 mb-0 text-s text-ink-2">{content.protocol.purpose}</p>
          )}
        </div>
        <div>
          <div className="flex flex-wrap items-center justify-end gap-6">
            <TextLink to={href}>Open the draft</TextLink>
            <SaveCanonical version={version} />
            {may('runs.record') && (
              <ButtonLink
                kind="filled"
                to={`/labs/${lab.id}/bench/start?protocolId=${protocolId}&number=${summary.number}`}
              >
                Run version {summary.number}
              </ButtonLink>
            )}
          </div>
          <VersionChain protocolId={protocolId} current={summary.number} />
        </div>
      </header>
      <SectionHead className="mt-8">Targets and dials</SectionHead>
      <FrozenTargets content={content} />
      <SectionHead className="mt-10">Plates as they were known</SectionHead>
      <FrozenPlates content={content} />
      <ul className="mt-3 list-none space-y-2 empty:hidden">
        <OpenQuestionWarnings content={content} />
      </ul>
      <HashCheck version={version} />
    </article>
  );
}

/** The seals of this protocol, oldest first, on one line. */
function VersionChain({ protocolId, current }: { readonly protocolId: string; readonly current: number }) {
  const { lab } = useLab();
  const { data } = useQuery(protocolVersionsQuery(lab.id, protocolId));
  const chain = [...(data?.items ?? [])].sort((one, other) => one.number - other.number);
  if (chain.length < 2) return null;
  return (
    <nav aria-label="Versions of this protocol" className="relative mt-4 overflow-x-auto">
      <ol className="version-chain">
        {chain.map(({ number, savedAt }) => (
          <li key={number}>
            <Link
              to={`/labs/${lab.id}/plan/${protocolId}/versions/${number}`}
              aria-current={number === current ? 'page' : undefined}
            >
              <VersionSeal state="saved" number={number} />
              {formatShortDate(new Date(savedAt))}
            </Link>
          </li>
        ))}
      </ol>
    </nav>
  );
}

/** The text that the hash covers, as a file: whoever has it can check it without us. */
function SaveCanonical({ version }: { readonly version: Version }) {
  const [fault, setFault] = useState<string | null>(null);
  const { summary, content, canonicalJson } = version;
  const save = () => {
    try {
      saveFile(`${content.protocol.name} ${summary.number}.json`, canonicalJson, 'application/json');
    } catch {
      setFault('This browser keeps no file. Copy the page instead.');
    }
  };
  return (
    <>
      <TextButton onClick={save}>Save as JSON</TextButton>
      {fault !== null && <span role="alert">{fault}</span>}
    </>
  );
}
