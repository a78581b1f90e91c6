import { queryOptions } from '@tanstack/react-query';
import type { Lab } from '../../../shared/schemas/labs';
import { request } from '../../lib/api';

export const labQuery = (labId: string) =>
  queryOptions({
    queryKey: ['labs', labId],
    queryFn: ({ signal }) => request<Lab>(`/labs/${labId}`, { signal }),
  });
