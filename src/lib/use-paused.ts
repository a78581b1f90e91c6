import { useEffect, useState } from 'react';

const typingPauseMs = 200;

/** A text as it stood when its typing last paused, so that not every letter is asked for. */
export function usePaused(text: string): string {
  const [paused, setPaused] = useState(text);
  useEffect(() => {
    const timer = window.setTimeout(() => setPaused(text), typingPauseMs);
    return () => window.clearTimeout(timer);
  }, [text]);
  return paused;
}
