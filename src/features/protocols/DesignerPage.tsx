import { useQuery } from '@tanstack/react-query';
import { useDeferredValue } from 'react';
import { useParams } from 'react-router-dom';
import { BeamWorking, BeamWrong } from '../../components/BeamState';
import { TextLink } from '../../components/TextLink';
import { useTitle } from '../../lib/use-title';
import { benchesQuery } from '../benches';
import { useLab } from '../labs';
import { Designer } from './designer/Designer';
import { protocolQuery } from './queries';

/** A protocol's draft under edit: the draft and the lab's benches are fetched before anything is drawn. */
export function Component() {
  const { lab } = useLab();
  const { protocolId = '' } = useParams();
  const protocol = useQuery({ ...protocolQuery(lab.id, protocolId), staleTime: 0 });
  const benches = useQuery(benchesQuery(lab.id));
  // A draft that was fetched before may be older than what somebody saved since: wait for the fresh one.
  const isFresh =
    protocol.isSuccess && benches.isSuccess && (!protocol.isFetching || protocol.isFetchedAfterMount);
  // What a query answers is drawn in one go; the designer is too much for that, and follows in slices.
  const isOpen = useDeferredValue(isFresh, false);
  useTitle(protocol.data?.draft.content.name ?? 'Protocol');

  if (protocol.isError) {
    return (
      <BeamWrong title="This protocol could not be fetched">
        {protocol.error.message} <TextLink to={`/labs/${lab.id}/plan`}>See all protocols</TextLink>
      </BeamWrong>
    );
  }
  if (benches.isError) {
    return <BeamWrong title="The benches could not be fetched">{benches.error.message}</BeamWrong>;
  }
  if (protocol.isPending || benches.isPending || !isFresh || !isOpen) {
    return <BeamWorking doing="Fetching the protocol" />;
  }
  return <Designer key={protocolId} protocol={protocol.data} benches={benches.data.items} />;
}
