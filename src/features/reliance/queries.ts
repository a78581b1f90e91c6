import { queryOptions } from '@tanstack/react-query';
import type { Draft } from '../../../shared/schemas/protocols';
import type { DraftFromVersion, Reliance } from '../../../shared/schemas/reliance';
import { request } from '../../lib/api';

/** So often a page asks while reports are worked out. */
const progressMs = 500;

/** Everything that uses a plate; asked again while something of it is being worked out. */
export const relianceQuery = (labId: string, plateId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'plates', plateId, 'reliance'],
    queryFn: ({ signal }) => request<Reliance>(`/labs/${labId}/plates/${plateId}/reliance`, { signal }),
    refetchInterval: ({ state }) =>
      state.data?.versions.some(({ progress }) => progress !== null) === true ? progressMs : false,
  });

export function draftFromVersion(
  labId: string,
  protocolId: string,
  body: DraftFromVersion,
  draftRevision: number,
): Promise<Draft> {
  return request<Draft>(`/labs/${labId}/protocols/${protocolId}/draft/from-version`, {
    method: 'POST',
    body,
    ifMatch: draftRevision,
  });
}
