import { queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import type { Bench } from '../../../shared/schemas/benches';
import type { Calibration } from '../../../shared/schemas/calibrations';
import type { CalibrationDetail, RecordScan, rememberedColumnsSchema } from '../../../shared/schemas/scans';
import { ApiError, refusal, request } from '../../lib/api';
import { fileAddress } from '../../lib/upload';

/** A calibration is never changed, and neither is a file: once fetched they hold. */
const FOREVER = { staleTime: Infinity } as const;

/** One calibration with the record of its scan. */
export const calibrationQuery = (labId: string, plateId: string, calibrationId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'plates', 'calibration', plateId, calibrationId],
    queryFn: ({ signal }) =>
      request<CalibrationDetail>(`/labs/${labId}/plates/${plateId}/calibrations/${calibrationId}`, {
        signal,
      }),
    ...FOREVER,
  });

/** The bytes of a stored file. */
export const scanBytesQuery = (labId: string, fileId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'file-bytes', fileId],
    queryFn: async ({ signal }) => {
      const answer = await fetch(fileAddress(labId, fileId), { signal, credentials: 'same-origin' }).catch(
        (error: unknown) => {
          if (error instanceof DOMException && error.name === 'AbortError') throw error;
          throw new ApiError(0, null, 'The server cannot be reached. Check the network.');
        },
      );
      if (!answer.ok) throw refusal(answer.status, await answer.text());
      return new Uint8Array(await answer.arrayBuffer());
    },
    ...FOREVER,
  });

/** Which column was what in the lab's last file that looked like this one. */
export const rememberedColumnsQuery = (labId: string, signature: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'scan-columns', signature],
    queryFn: ({ signal }) =>
      request<z.infer<typeof rememberedColumnsSchema>>(
        `/labs/${labId}/scan-columns?signature=${encodeURIComponent(signature)}`,
        { signal },
      ),
  });

/** A bench that has the plate, for what it states of its polariser. */
export const scanBenchQuery = (labId: string, benchId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'scan-bench', benchId],
    queryFn: ({ signal }) => request<Bench>(`/labs/${labId}/benches/${benchId}`, { signal }),
  });

export function recordScan(labId: string, plateId: string, body: RecordScan, idempotencyKey: string) {
  return request<Calibration>(`/labs/${labId}/plates/${plateId}/scans`, {
    method: 'POST',
    body,
    idempotencyKey,
  });
}
