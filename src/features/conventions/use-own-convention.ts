import { skipToken, useQuery } from '@tanstack/react-query';
import { labQuery } from '../labs';
import { sessionQuery } from '../session';
import type { OwnConvention } from './compared-rows';

/** The convention of the first of a person's labs; null for a stranger, and for everyone where the server can't be asked. */
export function useOwnConvention(): { readonly own: OwnConvention | null; readonly settled: boolean } {
  const session = useQuery(sessionQuery);
  const labId = session.data?.labs[0]?.id;
  const lab = useQuery({
    ...labQuery(labId ?? ''),
    ...(labId === undefined ? { queryFn: skipToken } : {}),
  });
  return {
    own: lab.data === undefined ? null : { name: lab.data.name, convention: lab.data.convention },
    settled: !session.isPending && (labId === undefined || !lab.isPending),
  };
}
