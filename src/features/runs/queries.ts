import { type QueryClient, queryOptions } from '@tanstack/react-query';
import type { RecordReading, Run, StartRun } from '../../../shared/schemas/runs';
import type { VersionSummary } from '../../../shared/schemas/protocols';
import { request } from '../../lib/api';

export const runQuery = (labId: string, runId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'runs', runId],
    queryFn: ({ signal }) => request<Run>(`/labs/${labId}/runs/${runId}`, { signal }),
  });

/** Shows a run as the server just answered it: a fetch that began before would put it back to what it was. */
export async function showRun(queryClient: QueryClient, labId: string, run: Run): Promise<void> {
  const { queryKey } = runQuery(labId, run.summary.id);
  await queryClient.cancelQueries({ queryKey });
  queryClient.setQueryData(queryKey, run);
}

export const startableVersionsQuery = (labId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'versions', 'startable'],
    queryFn: ({ signal }) =>
      request<{ items: VersionSummary[]; nextCursor: string | null }>(`/labs/${labId}/versions?limit=100`, {
        signal,
      }),
  });

export function startRun(labId: string, body: StartRun, idempotencyKey: string): Promise<Run> {
  return request<Run>(`/labs/${labId}/runs`, { method: 'POST', body, idempotencyKey });
}

/** A network that is half open says nothing for minutes; the person at the bench hears of it after this long. */
const recordTimeoutMs = 15_000;

export function recordReading(
  labId: string,
  runId: string,
  body: RecordReading,
  idempotencyKey: string,
): Promise<Run> {
  return request<Run>(`/labs/${labId}/runs/${runId}/readings`, {
    method: 'POST',
    body,
    idempotencyKey,
    signal: AbortSignal.timeout(recordTimeoutMs),
  });
}

export function pauseRun(labId: string, runId: string, note: string): Promise<Run> {
  return request<Run>(`/labs/${labId}/runs/${runId}/pause`, { method: 'POST', body: { note } });
}

export function resumeRun(labId: string, runId: string): Promise<Run> {
  return request<Run>(`/labs/${labId}/runs/${runId}/resume`, { method: 'POST' });
}

export function finishRun(labId: string, runId: string): Promise<Run> {
  return request<Run>(`/labs/${labId}/runs/${runId}/finish`, { method: 'POST' });
}
