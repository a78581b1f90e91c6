import { startTransition, useEffect, useState } from 'react';

/**
 * A value as it was a moment ago, so that what is drawn of it is a task of its own, in slices, and a key that is pressed meanwhile
 * is heard in between. A value that changes again sooner is never drawn.
 */
export function useLater<T>(value: T, afterMs: number): T {
  const [later, setLater] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => startTransition(() => setLater(value)), afterMs);
    return () => clearTimeout(timer);
  }, [value, afterMs]);
  return later;
}
