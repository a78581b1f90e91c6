import { useEffect, useState } from 'react';

/**
 * A value as it was a moment ago, so that what is drawn of it is a task of its own and a key that is pressed meanwhile is heard in
 * between. A value that changes again sooner is never drawn. No transition: rows that the solver answers are transitions too, and
 * would hold it up until the last is there.
 * @param first what stands until the first value is drawn; that value itself where it is to be there at once.
 */
export function useLater<T>(value: T, afterMs: number, first: T = value): T {
  const [later, setLater] = useState(first);
  useEffect(() => {
    const timer = setTimeout(() => setLater(value), afterMs);
    return () => clearTimeout(timer);
  }, [value, afterMs]);
  return later;
}
