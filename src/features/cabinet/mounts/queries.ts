import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import type {
  CabinetMount,
  MountDetail,
  mountPageSchema,
  MountQuery,
  WriteMount,
} from '../../../../shared/schemas/mounts';
import { request } from '../../../lib/api';
import { withQuery } from '../address';

type MountPage = z.infer<typeof mountPageSchema>;

/** What of the mounts is asked for; the server's defaults stand for the rest. */
export type MountSearch = Partial<Omit<MountQuery, 'cursor'>>;

export const mountPageQuery = (labId: string, search: MountSearch) =>
  queryOptions({
    queryKey: ['labs', labId, 'mounts', 'page', search],
    queryFn: ({ signal }) =>
      request<MountPage>(withQuery(`/labs/${labId}/mounts`, { ...search }), { signal }),
  });

export const mountPagesQuery = (labId: string, search: MountSearch) =>
  infiniteQueryOptions({
    queryKey: ['labs', labId, 'mounts', 'pages', search],
    queryFn: ({ signal, pageParam }) =>
      request<MountPage>(withQuery(`/labs/${labId}/mounts`, { ...search, cursor: pageParam }), { signal }),
    initialPageParam: '',
    getNextPageParam: ({ nextCursor }) => nextCursor,
  });

/** One mount with every plate that sat in it. */
export const mountQuery = (labId: string, mountId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'mounts', 'one', mountId],
    queryFn: ({ signal }) => request<MountDetail>(`/labs/${labId}/mounts/${mountId}`, { signal }),
  });

export function createMount(labId: string, body: WriteMount, idempotencyKey: string) {
  return request<CabinetMount>(`/labs/${labId}/mounts`, { method: 'POST', body, idempotencyKey });
}

export function updateMount(labId: string, mountId: string, body: WriteMount, ifMatch: number) {
  return request<CabinetMount>(`/labs/${labId}/mounts/${mountId}`, { method: 'PUT', body, ifMatch });
}

export function retireMount(labId: string, mountId: string, ifMatch: number) {
  return request<CabinetMount>(`/labs/${labId}/mounts/${mountId}/retire`, { method: 'POST', ifMatch });
}

export function returnMount(labId: string, mountId: string, ifMatch: number) {
  return request<CabinetMount>(`/labs/${labId}/mounts/${mountId}/return`, { method: 'POST', ifMatch });
}
