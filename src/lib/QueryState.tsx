import type { UseQueryResult } from '@tanstack/react-query';
import { BeamCutOff, BeamWorking, BeamWrong } from '../components/BeamState';
import { TextButton } from '../components/TextLink';
import { ApiError } from './api';

/** A part of a page that has not come yet, or did not come: what, why, and the one way on. */
export function QueryState(props: {
  readonly query: Pick<UseQueryResult, 'error' | 'isFetching' | 'refetch'>;
  /** What is fetched, as in "Fetching the cabinet". */
  readonly what: string;
}) {
  const { query, what } = props;
  const { error } = query;
  const again = <TextButton onClick={() => void query.refetch()}>Ask again</TextButton>;
  if (error === null || query.isFetching)
    return <BeamWorking doing={`Fetching ${what}`} className="max-w-md py-4" />;
  if (error instanceof ApiError && error.status === 0) {
    return (
      <BeamCutOff title={`Nothing came of ${what}: the server cannot be reached`} className="max-w-md py-4">
        Check the network. {again}
      </BeamCutOff>
    );
  }
  return (
    <BeamWrong title={`Nothing came of ${what}`} className="max-w-md py-4">
      {error instanceof ApiError ? error.message : 'This page could not read the answer.'} {again}
    </BeamWrong>
  );
}
