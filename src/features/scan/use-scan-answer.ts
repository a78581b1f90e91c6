import { useEffect, useState } from 'react';
import type { ScanReply, ScanRequest } from './answer-scan';

export interface ScanWork {
  /** The newest answer, which may be to the request before; null before the first. */
  readonly reply: ScanReply | null;
  /** What it answers. */
  readonly answered: ScanRequest | null;
  readonly state: 'idle' | 'working' | 'done' | 'stopped';
  /** Stops what runs. */
  readonly stop: () => void;
  readonly again: () => void;
}

function startWorker(): Worker {
  return new Worker(new URL('./scan.worker.ts', import.meta.url), { type: 'module' });
}

/** Reads and fits off the main thread: a worker lives as long as its one request, so that stopping needs nobody's consent. */
export function useScanAnswer(request: ScanRequest | null): ScanWork {
  const [answered, setAnswered] = useState<{
    readonly request: ScanRequest;
    readonly reply: ScanReply;
  } | null>(null);
  const [stopped, setStopped] = useState<ScanRequest | null>(null);
  const isStopped = request !== null && stopped === request;
  const isDone = request !== null && answered?.request === request;
  useEffect(() => {
    if (request === null || isStopped || isDone) return undefined;
    const worker = startWorker();
    worker.addEventListener('message', ({ data }: MessageEvent<ScanReply>) => {
      setAnswered({ request, reply: data });
    });
    worker.addEventListener('error', () => {
      setAnswered({ request, reply: { kind: 'failed', sentence: 'The fit stopped. Load the page again.' } });
    });
    worker.postMessage(request);
    return () => worker.terminate();
  }, [request, isStopped, isDone]);
  return {
    reply: answered?.reply ?? null,
    answered: answered?.request ?? null,
    state: request === null ? 'idle' : isDone ? 'done' : isStopped ? 'stopped' : 'working',
    stop: () => setStopped(request),
    again: () => setStopped(null),
  };
}
