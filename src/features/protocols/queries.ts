import { queryOptions } from '@tanstack/react-query';
import type {
  Draft,
  DraftContent,
  Protocol,
  ProtocolSummary,
  SaveVersion,
  VersionSummary,
} from '../../../shared/schemas/protocols';
import { request } from '../../lib/api';

interface Items<Item> {
  readonly items: readonly Item[];
}

export const protocolsQuery = (labId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'protocols'],
    queryFn: ({ signal }) => request<Items<ProtocolSummary>>(`/labs/${labId}/protocols`, { signal }),
  });

export const protocolQuery = (labId: string, protocolId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'protocols', protocolId],
    queryFn: ({ signal }) => request<Protocol>(`/labs/${labId}/protocols/${protocolId}`, { signal }),
  });

export function createProtocol(
  labId: string,
  content: DraftContent,
  idempotencyKey: string,
): Promise<Protocol> {
  return request<Protocol>(`/labs/${labId}/protocols`, { method: 'POST', body: content, idempotencyKey });
}

export function saveDraft(
  labId: string,
  protocolId: string,
  content: DraftContent,
  revision: number,
  keepalive: boolean,
): Promise<Draft> {
  return request<Draft>(`/labs/${labId}/protocols/${protocolId}/draft`, {
    method: 'PUT',
    body: content,
    ifMatch: revision,
    keepalive,
  });
}

export function saveVersion(
  labId: string,
  protocolId: string,
  body: SaveVersion,
  revision: number,
  idempotencyKey: string,
): Promise<VersionSummary> {
  return request<VersionSummary>(`/labs/${labId}/protocols/${protocolId}/versions`, {
    method: 'POST',
    body,
    ifMatch: revision,
    idempotencyKey,
  });
}
