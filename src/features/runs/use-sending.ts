import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import { useStore } from 'zustand';
import { ApiError } from '../../lib/api';
import type { BenchStore } from './bench-store';
import type { BenchKeeping } from './kept-entry';
import { recordReading, runQuery, showRun } from './queries';

/** Why the oldest waiting reading is still here. */
export type SendingTrouble =
  | { readonly kind: 'cut-off'; readonly since: Date }
  /** The server answered and will not have it: what it said, and which reading. */
  | { readonly kind: 'refused'; readonly key: string; readonly message: string };

export interface Sending {
  readonly trouble: SendingTrouble | null;
  /** When the server last acknowledged a reading of this page. */
  readonly savedAt: Date | null;
  readonly sendAgain: () => void;
}

const retryAfterMs = 5_000;

/** Answers that say nothing against the reading itself: the same request is worth making again. */
function isPassing(error: unknown): boolean {
  if (!(error instanceof ApiError)) return true;
  // The first try of this very reading is still being worked on.
  if (error.problem?.type.endsWith('still-working') === true) return true;
  return error.status === 0 || error.status >= 500 || [408, 425, 429].includes(error.status);
}

/**
 * Sends what waits, oldest first and one at a time, each with the key it was made with, so that a retry records nothing twice.
 * A reading leaves the queue only when the server has acknowledged it, or when the person takes it out.
 */
export function useSending(labId: string, runId: string, store: BenchStore, keeping: BenchKeeping): Sending {
  const queryClient = useQueryClient();
  const oldest = useStore(store, (state) => state.waiting[0]);
  const [trouble, setTrouble] = useState<SendingTrouble | null>(null);
  const [savedAt, setSavedAt] = useState<Date | null>(null);
  const [attempt, setAttempt] = useState(0);
  const inFlight = useRef<string | null>(null);

  useEffect(() => {
    if (oldest === undefined || inFlight.current === oldest.key) return;
    inFlight.current = oldest.key;
    recordReading(labId, runId, oldest.body, oldest.key)
      .then(
        async (run) => {
          await showRun(queryClient, labId, run);
          store.getState().acknowledged(oldest.key, run);
          setSavedAt(new Date());
          setTrouble(null);
        },
        (error: unknown) => {
          if (isPassing(error)) {
            setTrouble((before) =>
              before?.kind === 'cut-off' ? before : { kind: 'cut-off', since: new Date() },
            );
          } else {
            const message = error instanceof Error ? error.message : 'The server gave no reason.';
            setTrouble({ kind: 'refused', key: oldest.key, message });
            // Somebody else paused or finished the run, or this page is behind in another way.
            void queryClient.invalidateQueries({ queryKey: runQuery(labId, runId).queryKey });
          }
        },
      )
      .finally(() => {
        inFlight.current = null;
      });
  }, [oldest, attempt, labId, runId, store, queryClient]);

  const sendAgain = useCallback(() => setAttempt((count) => count + 1), []);

  useEffect(() => {
    if (trouble?.kind !== 'cut-off') return;
    const timer = setInterval(sendAgain, retryAfterMs);
    window.addEventListener('online', sendAgain);
    return () => {
      clearInterval(timer);
      window.removeEventListener('online', sendAgain);
    };
  }, [trouble, sendAgain]);

  useEffect(
    () =>
      keeping.watchDropped((key) => {
        if (!store.getState().waiting.some((reading) => reading.key === key)) return;
        // Refetched first, so that what another tab recorded never looks undone here.
        void queryClient
          .invalidateQueries({ queryKey: runQuery(labId, runId).queryKey })
          .finally(() => store.getState().acknowledged(key));
      }),
    [keeping, store, queryClient, labId, runId],
  );

  const stale = trouble?.kind === 'refused' && trouble.key !== oldest?.key;
  return { trouble: stale || oldest === undefined ? null : trouble, savedAt, sendAgain };
}
