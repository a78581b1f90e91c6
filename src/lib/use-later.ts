import { useEffect, useState } from 'react';

/** A value as it was a moment ago; one that changes again sooner never shows. */
export function useLater<T>(value: T, afterMs: number): T {
  const [later, setLater] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setLater(value), afterMs);
    return () => clearTimeout(timer);
  }, [value, afterMs]);
  return later;
}
