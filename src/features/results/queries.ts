import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import type { runPageSchema } from '../../../shared/schemas/runs';
import { request } from '../../lib/api';

type RunPage = z.infer<typeof runPageSchema>;

/** The newest runs, as many as a list at the side needs. */
export const runsQuery = (labId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'runs'],
    queryFn: ({ signal }) => request<RunPage>(`/labs/${labId}/runs`, { signal }),
  });

/** All runs, the newest first, a page at a time. */
export const runPagesQuery = (labId: string) =>
  infiniteQueryOptions({
    queryKey: ['labs', labId, 'runs', 'pages'],
    queryFn: ({ signal, pageParam }) =>
      request<RunPage>(
        `/labs/${labId}/runs?limit=50${pageParam === '' ? '' : `&cursor=${encodeURIComponent(pageParam)}`}`,
        {
          signal,
        },
      ),
    initialPageParam: '',
    getNextPageParam: ({ nextCursor }) => nextCursor,
  });
