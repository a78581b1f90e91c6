import { useQuery } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { TextLink } from '../../components/TextLink';
import { useIdempotencyKey } from '../../lib/forms';
import { platesQuery } from '../cabinet';
import { useLab } from '../labs';
import { BenchForm } from './BenchForm';
import { createBench } from './queries';
import { QueryState } from '../../lib/QueryState';

/** A new bench. It needs at least one plate of the cabinet. */
export function Component() {
  const { lab, may } = useLab();
  const navigate = useNavigate();
  const keyFor = useIdempotencyKey();
  const plates = useQuery(platesQuery(lab.id));
  const seated = plates.data?.items.filter(({ retiredAt }) => retiredAt === null) ?? [];
  return (
    <>
      <title>New bench · Quarterturn</title>
      <h1 className="text-title pt-2 mb-6">A new bench</h1>
      {!may('benches.write') ? (
        <p>
          A designer or the lead sets up benches.{' '}
          <TextLink to={`/labs/${lab.id}/bench`}>See the benches</TextLink>
        </p>
      ) : plates.data === undefined ? (
        <QueryState query={plates} what="the cabinet" />
      ) : seated.length === 0 ? (
        <p>
          A bench has one to six plates in its beam, and the cabinet holds none.{' '}
          <TextLink to={`/labs/${lab.id}/cabinet?do=add`}>Add a plate</TextLink>
        </p>
      ) : (
        <BenchForm
          bench={null}
          plates={seated}
          save={(body) => createBench(lab.id, body, keyFor(body))}
          onSaved={() => void navigate(`/labs/${lab.id}/bench`)}
        />
      )}
    </>
  );
}
