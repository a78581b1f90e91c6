import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { VersionSummary } from '../../../shared/schemas/protocols';
import type { Version } from '../../../shared/schemas/versions';
import { request } from '../../lib/api';

interface Page {
  readonly items: readonly VersionSummary[];
  readonly nextCursor: string | null;
}

/** All versions of a lab, newest first. */
export const labVersionsQuery = (labId: string) =>
  infiniteQueryOptions({
    queryKey: ['labs', labId, 'versions'],
    queryFn: ({ signal, pageParam }) =>
      request<Page>(
        `/labs/${labId}/versions${pageParam === null ? '' : `?cursor=${encodeURIComponent(pageParam)}`}`,
        {
          signal,
        },
      ),
    initialPageParam: firstPage(),
    getNextPageParam: (page) => page.nextCursor,
  });

function firstPage(): string | null {
  return null;
}

export const protocolVersionsQuery = (labId: string, protocolId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'protocols', protocolId, 'versions'],
    queryFn: ({ signal }) =>
      request<{ readonly items: readonly VersionSummary[] }>(
        `/labs/${labId}/protocols/${protocolId}/versions`,
        { signal },
      ),
  });

/** A version never changes, so it is never fetched twice. */
export const versionQuery = (labId: string, protocolId: string, number: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'protocols', protocolId, 'versions', number],
    queryFn: ({ signal }) =>
      request<Version>(`/labs/${labId}/protocols/${protocolId}/versions/${encodeURIComponent(number)}`, {
        signal,
      }),
    staleTime: Infinity,
  });
