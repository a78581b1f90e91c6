import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { Run } from '../../../shared/schemas/runs';
import { ApiError } from '../../lib/api';
import { finishRun, pauseRun, resumeRun, runQuery, showRun } from './queries';

export interface RunStateActions {
  readonly busy: boolean;
  /** What the server said against the last one; empty when nothing. */
  readonly fault: string;
  readonly pause: (note: string) => void;
  readonly resume: () => void;
  readonly finish: () => void;
}

/** Pausing, resuming and finishing a run. What the server answers is what the page then shows. */
export function useRunState(labId: string, runId: string): RunStateActions {
  const queryClient = useQueryClient();
  const [busy, setBusy] = useState(false);
  const [fault, setFault] = useState('');
  const ask = async (call: () => Promise<Run>): Promise<void> => {
    if (busy) return;
    setBusy(true);
    setFault('');
    try {
      await showRun(queryClient, labId, await call());
      // Home and the lists count runs by their state.
      void queryClient.invalidateQueries({ queryKey: ['labs', labId], refetchType: 'none' });
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'The server gave no reason.');
      // Somebody else was faster: the page shows what the run has become.
      if (error instanceof ApiError && error.status === 409) {
        void queryClient.invalidateQueries({ queryKey: runQuery(labId, runId).queryKey });
      }
    } finally {
      setBusy(false);
    }
  };
  return {
    busy,
    fault,
    pause: (note) => void ask(() => pauseRun(labId, runId, note)),
    resume: () => void ask(() => resumeRun(labId, runId)),
    finish: () => void ask(() => finishRun(labId, runId)),
  };
}
