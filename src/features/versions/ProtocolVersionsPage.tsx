import { useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { BeamEmpty, BeamWorking, BeamWrong } from '../../components/BeamState';
import { TextLink } from '../../components/TextLink';
import { useTitle } from '../../lib/use-title';
import { useLab } from '../labs';
import { protocolVersionsQuery } from './queries';
import { VersionsTable } from './VersionsTable';

/** The versions of one protocol. */
export function Component() {
  const { lab } = useLab();
  const { protocolId = '' } = useParams();
  const versions = useQuery(protocolVersionsQuery(lab.id, protocolId));
  const all = versions.data?.items ?? [];
  const name = all[0]?.protocolName ?? 'this protocol';
  useTitle(`Versions of ${name}`);
  const draftHref = `/labs/${lab.id}/plan/${protocolId}`;
  return (
    <>
      <div className="flex flex-wrap items-baseline gap-x-6 pt-3">
        <h1 className="m-0 text-title">Versions of {name}</h1>
        <TextLink to={draftHref}>Open the draft</TextLink>
      </div>
      {versions.isPending && <BeamWorking doing="Fetching the versions" />}
      {versions.isError && (
        <BeamWrong title="The versions could not be fetched">{versions.error.message}</BeamWrong>
      )}
      {versions.isSuccess && all.length === 0 && (
        <BeamEmpty title="No versions yet">
          Saving one freezes its targets, plates, angles and dials for good.{' '}
          <TextLink to={draftHref}>Open the draft</TextLink>
        </BeamEmpty>
      )}
      {all.length > 0 && <VersionsTable labId={lab.id} versions={all} namesProtocol={false} />}
    </>
  );
}
