import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type {
  CabinetCounts,
  CabinetPlate,
  CreatePlate,
  PlateDetail,
  PlatePage,
  PlateQuery,
  UpdatePlate,
} from '../../../shared/schemas/cabinet';
import type { Calibration, CalibrationInput } from '../../../shared/schemas/calibrations';
import { request } from '../../lib/api';
import { withQuery } from './address';

/** What of the cabinet is asked for; the server's defaults stand for the rest. */
export type PlateSearch = Partial<Omit<PlateQuery, 'cursor'>>;

const platesPath = (labId: string, search: PlateSearch, cursor = '') =>
  withQuery(`/labs/${labId}/plates`, { ...search, cursor });

/** One page of the plates that a search finds. */
export const platePageQuery = (labId: string, search: PlateSearch) =>
  queryOptions({
    queryKey: ['labs', labId, 'plates', 'page', search],
    queryFn: ({ signal }) => request<PlatePage>(platesPath(labId, search), { signal }),
  });

/** The same, page after page. */
export const platePagesQuery = (labId: string, search: PlateSearch) =>
  infiniteQueryOptions({
    queryKey: ['labs', labId, 'plates', 'pages', search],
    queryFn: ({ signal, pageParam }) => request<PlatePage>(platesPath(labId, search, pageParam), { signal }),
    initialPageParam: '',
    getNextPageParam: ({ nextCursor }) => nextCursor,
  });

/** How many plates that a search finds are in which state. */
export const countsQuery = (labId: string, search = '') =>
  queryOptions({
    queryKey: ['labs', labId, 'cabinet', search],
    queryFn: ({ signal }) =>
      request<CabinetCounts>(withQuery(`/labs/${labId}/cabinet`, { search }), { signal }),
  });

/** One plate with all its seats, calibrations and files. */
export const plateQuery = (labId: string, plateId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'plates', 'one', plateId],
    queryFn: ({ signal }) => request<PlateDetail>(`/labs/${labId}/plates/${plateId}`, { signal }),
  });

export function createPlate(labId: string, body: CreatePlate, idempotencyKey: string) {
  return request<CabinetPlate>(`/labs/${labId}/plates`, { method: 'POST', body, idempotencyKey });
}

export function updatePlate(labId: string, plateId: string, body: UpdatePlate, ifMatch: number) {
  return request<CabinetPlate>(`/labs/${labId}/plates/${plateId}`, { method: 'PUT', body, ifMatch });
}

export function recordCalibration(
  labId: string,
  plateId: string,
  body: CalibrationInput,
  idempotencyKey: string,
) {
  return request<Calibration>(`/labs/${labId}/plates/${plateId}/calibrations`, {
    method: 'POST',
    body,
    idempotencyKey,
  });
}

export function retirePlate(labId: string, plateId: string, ifMatch: number) {
  return request<CabinetPlate>(`/labs/${labId}/plates/${plateId}/retire`, { method: 'POST', ifMatch });
}

export function returnPlate(labId: string, plateId: string, ifMatch: number) {
  return request<CabinetPlate>(`/labs/${labId}/plates/${plateId}/return`, { method: 'POST', ifMatch });
}
