import { useEffect, useState } from 'react';

interface WorkClock {
  /** Work shorter than this is never shown, so that a page doesn't flicker. */
  readonly shown: boolean;
  /** Long enough that the time left and a way out are owed. */
  readonly long: boolean;
  readonly elapsedMs: number;
}

const showAfterMs = 300;
const longAfterMs = 10_000;

/** How long something has been going on since this was first drawn. */
export function useWorkClock(): WorkClock {
  const [elapsedMs, setElapsed] = useState(0);
  useEffect(() => {
    const start = performance.now();
    const tick = (): void => {
      setElapsed(performance.now() - start);
    };
    const first = window.setTimeout(tick, showAfterMs);
    const steady = window.setInterval(tick, 1_000);
    return () => {
      window.clearTimeout(first);
      window.clearInterval(steady);
    };
  }, []);
  return { shown: elapsedMs >= showAfterMs - 1, long: elapsedMs >= longAfterMs, elapsedMs };
}

/** What is left at this pace, in words; null while it can't be told. */
export function timeLeftWords(elapsedMs: number, done: number, total: number): string | null {
  if (done <= 0 || total <= done) return null;
  const seconds = Math.round(((elapsedMs / done) * (total - done)) / 1_000);
  if (seconds < 60) return `about ${Math.max(1, seconds)} s left`;
  return `about ${Math.round(seconds / 60)} min left`;
}
