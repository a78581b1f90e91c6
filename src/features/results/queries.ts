import { queryOptions } from '@tanstack/react-query';
import type { RunSummary } from '../../../shared/schemas/runs';
import { request } from '../../lib/api';

export const runsQuery = (labId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'runs'],
    queryFn: ({ signal }) => request<{ items: RunSummary[] }>(`/labs/${labId}/runs`, { signal }),
  });
