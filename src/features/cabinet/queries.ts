import { queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import type {
  Calibration,
  CalibrationInput,
  CreatePlate,
  Plate,
  plateDetailSchema,
  plateListSchema,
  UpdatePlate,
} from '../../../shared/schemas/cabinet';
import { request } from '../../lib/api';

export type PlateDetail = z.infer<typeof plateDetailSchema>;

/** Every plate of a lab, the retired ones too. */
export const platesQuery = (labId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'plates'],
    queryFn: ({ signal }) => request<z.infer<typeof plateListSchema>>(`/labs/${labId}/plates`, { signal }),
  });

export const plateQuery = (labId: string, plateId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'plates', plateId],
    queryFn: ({ signal }) => request<PlateDetail>(`/labs/${labId}/plates/${plateId}`, { signal }),
  });

export function createPlate(labId: string, body: CreatePlate, idempotencyKey: string) {
  return request<Plate>(`/labs/${labId}/plates`, { method: 'POST', body, idempotencyKey });
}

export function updatePlate(labId: string, plateId: string, body: UpdatePlate, ifMatch: number) {
  return request<Plate>(`/labs/${labId}/plates/${plateId}`, { method: 'PUT', body, ifMatch });
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
  return request<Plate>(`/labs/${labId}/plates/${plateId}/retire`, { method: 'POST', ifMatch });
}

export function returnPlate(labId: string, plateId: string, ifMatch: number) {
  return request<Plate>(`/labs/${labId}/plates/${plateId}/return`, { method: 'POST', ifMatch });
}
