import { useQuery } from '@tanstack/react-query';
import { useEffect } from 'react';
import { useSearchParams } from 'react-router-dom';
import { BeamEmpty, BeamWorking, BeamWrong } from '../../components/BeamState';
import { TextLink } from '../../components/TextLink';
import { useLab } from '../labs';
import { ChooseVersion } from './ChooseVersion';
import { startableVersionsQuery, versionQuery } from './queries';
import { StartRunForm } from './StartRunForm';

/** What will be run, what speaks against it, the caution in full, and where the dials stand: then the run starts. */
export function StartRunPage() {
  const { lab, may } = useLab();
  const [search] = useSearchParams();
  const versionId = search.get('versionId');
  const versions = useQuery(startableVersionsQuery(lab.id));
  const summary = versions.data?.items.find(({ id }) => id === versionId);
  const version = useQuery({
    ...versionQuery(lab.id, summary?.protocolId ?? '', summary?.number ?? 0),
    enabled: summary !== undefined,
  });
  useEffect(() => {
    document.title = 'Start a run – Quarterturn';
  }, []);

  const failed = versions.error ?? version.error;
  if (failed !== null) {
    return <BeamWrong title="The version could not be fetched">{failed.message}</BeamWrong>;
  }
  if (versions.data === undefined || (summary !== undefined && version.data === undefined)) {
    return <BeamWorking doing="Fetching the version" />;
  }
  if (!may('runs.record')) {
    return (
      <BeamEmpty title="A guest reads runs and does not start them">
        Ask an operator, a designer or the lead of {lab.name}.{' '}
        <TextLink to={`/labs/${lab.id}/bench`}>Go to the bench</TextLink>
      </BeamEmpty>
    );
  }
  return version.data === undefined ? (
    <ChooseVersion labId={lab.id} versions={versions.data.items} unknownId={versionId} />
  ) : (
    <StartRunForm key={version.data.summary.id} version={version.data} />
  );
}

export { StartRunPage as Component };
