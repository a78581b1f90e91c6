import { useCallback, useRef } from 'react';
import { newIdempotencyKey } from '../api';

/** One key for one body: a retry of the same creation keeps it, and a corrected body gets another. */
export function useIdempotencyKey(): (body: unknown) => string {
  const last = useRef<{ readonly json: string; readonly key: string } | null>(null);
  return useCallback((body: unknown) => {
    const json = JSON.stringify(body);
    if (last.current?.json !== json) last.current = { json, key: newIdempotencyKey() };
    return last.current.key;
  }, []);
}
