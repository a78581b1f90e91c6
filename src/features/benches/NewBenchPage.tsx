import { useQuery } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { TextLink } from '../../components/TextLink';
import { useIdempotencyKey } from '../../lib/forms';
import { QueryState } from '../../lib/QueryState';
import { platePageQuery } from '../cabinet';
import { useLab } from '../labs';
import { BenchForm } from './BenchForm';
import { createBench } from './queries';

/** A new bench. It needs at least one plate of the cabinet. */
export function Component() {
  const { lab, may } = useLab();
  const navigate = useNavigate();
  const keyFor = useIdempotencyKey();
  const anyPlate = useQuery(platePageQuery(lab.id, { limit: 1 }));
  return (
    <>
      <title>New bench · Quarterturn</title>
      <h1 className="text-title pt-2 mb-6">A new bench</h1>
      {!may('benches.write') ? (
        <p>
          A designer or the lead sets up benches.{' '}
          <TextLink to={`/labs/${lab.id}/bench`}>See the benches</TextLink>
        </p>
      ) : anyPlate.data === undefined ? (
        <QueryState query={anyPlate} what="the cabinet" />
      ) : anyPlate.data.items.length === 0 ? (
        <p>
          A bench has one to six plates in its beam, and the cabinet holds none.{' '}
          <TextLink to={`/labs/${lab.id}/cabinet?do=add`}>Add a plate</TextLink>
        </p>
      ) : (
        <BenchForm
          bench={null}
          plates={[]}
          save={(body) => createBench(lab.id, body, keyFor(body))}
          onSaved={() => void navigate(`/labs/${lab.id}/bench`)}
        />
      )}
    </>
  );
}
