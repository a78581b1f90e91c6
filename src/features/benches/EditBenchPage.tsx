import { useQuery } from '@tanstack/react-query';
import { useNavigate, useParams } from 'react-router-dom';
import { TextLink } from '../../components/TextLink';
import { platesQuery } from '../cabinet';
import { useLab } from '../labs';
import { BenchForm } from './BenchForm';
import { benchQuery, updateBench } from './queries';
import { QueryState } from '../../lib/QueryState';

/** A bench as it is, to be changed. Drafts solve for the new one; versions and runs keep the bench they were made for. */
export function Component() {
  const { lab, may } = useLab();
  const { benchId = '' } = useParams();
  const navigate = useNavigate();
  const bench = useQuery(benchQuery(lab.id, benchId));
  const plates = useQuery(platesQuery(lab.id));
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
        <QueryState query={plates} what="the cabinet" />
      ) : (
        <BenchForm
          bench={loaded}
          plates={plates.data.items.filter(
            ({ id, retiredAt }) => retiredAt === null || loaded.plates.some((plate) => plate.id === id),
          )}
          save={(body, revision) => updateBench(lab.id, loaded.id, body, revision)}
          onSaved={() => void navigate(`/labs/${lab.id}/bench`)}
        />
      )}
    </>
  );
}
