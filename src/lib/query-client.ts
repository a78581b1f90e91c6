import { QueryClient } from '@tanstack/react-query';
import { ApiError } from './api';

/** A refusal is final; only a network that failed or a server that was not ready is worth asking again. */
function worthRetrying(failureCount: number, error: Error): boolean {
  return failureCount < 2 && error instanceof ApiError && (error.status === 0 || error.status === 503);
}

export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: { staleTime: 30_000, retry: worthRetrying, refetchOnWindowFocus: true },
      mutations: { retry: worthRetrying },
    },
  });
}
