import { useQuery } from '@tanstack/react-query';
import { useNavigate, useParams } from 'react-router-dom';
import { TextLink } from '../../components/TextLink';
import { QueryState } from '../../lib/QueryState';
import { useLab } from '../labs';
import { BenchForm } from './BenchForm';
import { benchPlatesQuery, benchQuery, updateBench } from './queries';

/** A bench as it is, to be changed. Drafts solve for the new one; versions and runs keep the bench they were made for. */
export function Component() {
  const { lab, may } = useLab();
  const { benchId = '' } = useParams();
  const navigate = useNavigate();
  const bench = useQuery(benchQuery(lab.id, benchId));
  const plates = useQuery(benchPlatesQuery(lab.id, benchId));
  const loaded = bench.data;
  return (
    <>
      <title>{`${loaded?.name ?? 'Bench'} · Quarterturn`}</title>
      <h1 className="text-title pt-2 mb-1">{loaded?.name ?? 'Bench'}</h1>
      <p className="text-ink-2 mb-6">
        Drafts solve for the bench as you save it. Versions and runs keep the bench they were made for.
      </p>
      {!may('benches.write') ? (
        <p>
          A designer or the lead changes benches.{' '}
          <TextLink to={`/labs/${lab.id}/bench`}>See the benches</TextLink>
        </p>
      ) : loaded === undefined ? (
        <QueryState query={bench} what="the bench" />
      ) : plates.data === undefined ? (
        <QueryState query={plates} what="the plates of its beam" />
      ) : (
        <BenchForm
          bench={loaded}
          plates={plates.data.items}
          save={(body, revision) => updateBench(lab.id, loaded.id, body, revision)}
          onSaved={() => void navigate(`/labs/${lab.id}/bench`)}
        />
      )}
    </>
  );
}
