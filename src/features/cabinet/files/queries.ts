import type { z } from 'zod';
import type { PlateDetail } from '../../../../shared/schemas/cabinet';
import type { attachFileSchema } from '../../../../shared/schemas/files';
import { newIdempotencyKey, request } from '../../../lib/api';

export function attachFile(labId: string, plateId: string, body: z.infer<typeof attachFileSchema>) {
  return request<Pick<PlateDetail, 'files'>>(`/labs/${labId}/plates/${plateId}/files`, {
    method: 'POST',
    body,
    // To attach a file twice is to attach it once.
    idempotencyKey: newIdempotencyKey(),
  });
}

export function takeFileOff(labId: string, plateId: string, fileId: string) {
  return request<null>(`/labs/${labId}/plates/${plateId}/files/${fileId}`, { method: 'DELETE' });
}
