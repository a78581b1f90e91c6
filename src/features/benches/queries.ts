import { queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import type { Bench, benchListSchema, BenchPlates, CreateBench } from '../../../shared/schemas/benches';
import { request } from '../../lib/api';

export const benchesQuery = (labId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'benches'],
    queryFn: ({ signal }) => request<z.infer<typeof benchListSchema>>(`/labs/${labId}/benches`, { signal }),
  });

export const benchQuery = (labId: string, benchId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'benches', benchId],
    queryFn: ({ signal }) => request<Bench>(`/labs/${labId}/benches/${benchId}`, { signal }),
  });

/** Every plate of a bench's beam, ready or not, in the order that light meets them. */
export const benchPlatesQuery = (labId: string, benchId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'benches', benchId, 'plates'],
    queryFn: ({ signal }) => request<BenchPlates>(`/labs/${labId}/benches/${benchId}/plates`, { signal }),
  });

export function createBench(labId: string, body: CreateBench, idempotencyKey: string) {
  return request<Bench>(`/labs/${labId}/benches`, { method: 'POST', body, idempotencyKey });
}

export function updateBench(labId: string, benchId: string, body: CreateBench, ifMatch: number) {
  return request<Bench>(`/labs/${labId}/benches/${benchId}`, { method: 'PUT', body, ifMatch });
}

export function retireBench(labId: string, benchId: string, ifMatch: number) {
  return request<Bench>(`/labs/${labId}/benches/${benchId}/retire`, { method: 'POST', ifMatch });
}

export function returnBench(labId: string, benchId: string, ifMatch: number) {
  return request<Bench>(`/labs/${labId}/benches/${benchId}/return`, { method: 'POST', ifMatch });
}
