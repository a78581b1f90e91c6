import { skipToken, useQuery } from '@tanstack/react-query';
import { useEffect } from 'react';
import { useSearchParams } from 'react-router-dom';
import { BeamEmpty, BeamWorking, BeamWrong } from '../../components/BeamState';
import { TextLink } from '../../components/TextLink';
import { useLab } from '../labs';
import { versionQuery } from '../versions';
import { ChooseVersion } from './ChooseVersion';
import { startableVersionsQuery } from './queries';
import { StartRunForm } from './StartRunForm';

/**
 * The version that the address names: by its protocol and number, or by its id among the newest of the lab. The list is
 * asked for only where the first way is not taken.
 */
function useNamedVersion(labId: string) {
  const [search] = useSearchParams();
  const protocolId = search.get('protocolId');
  const number = search.get('number');
  const direct = protocolId !== null && number !== null ? { protocolId, number } : null;
  const listQuery = startableVersionsQuery(labId);
  const list = useQuery({ ...listQuery, ...(direct === null ? {} : { queryFn: skipToken }) });
  const versionId = search.get('versionId');
  const listed = list.data?.items.find(({ id }) => id === versionId);
  const named =
    direct ??
    (listed === undefined ? null : { protocolId: listed.protocolId, number: String(listed.number) });
  const version = useQuery({
    ...versionQuery(labId, named?.protocolId ?? '', named?.number ?? ''),
    ...(named === null ? { queryFn: skipToken } : {}),
  });
  const waits = direct === null ? list.isPending || (named !== null && version.isPending) : version.isPending;
  return { version: version.data, list: list.data, versionId, waits, failed: list.error ?? version.error };
}

/** What will be run, what speaks against it, the caution in full, and where the dials stand: then the run starts. */
export function StartRunPage() {
  const { lab, may } = useLab();
  const { version, list, versionId, waits, failed } = useNamedVersion(lab.id);
  useEffect(() => {
    document.title = 'Start a run – Quarterturn';
  }, []);

  if (failed !== null) {
    return (
      <BeamWrong title="The version could not be fetched">
        {failed.message} <TextLink to={`/labs/${lab.id}/bench/start`}>Choose another version</TextLink>
      </BeamWrong>
    );
  }
  if (waits) return <BeamWorking doing="Fetching the version" />;
  if (!may('runs.record')) {
    return (
      <BeamEmpty title="A guest reads runs and does not start them">
        Ask an operator, a designer or the lead of {lab.name}.{' '}
        <TextLink to={`/labs/${lab.id}/bench`}>Go to the bench</TextLink>
      </BeamEmpty>
    );
  }
  return version === undefined ? (
    <ChooseVersion
      labId={lab.id}
      versions={list?.items ?? []}
      more={list !== undefined && list.nextCursor !== null}
      unknownId={versionId}
    />
  ) : (
    <StartRunForm key={version.summary.id} version={version} />
  );
}

export { StartRunPage as Component };
