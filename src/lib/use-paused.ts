import { useLater } from './use-later';

const typingPauseMs = 200;

/** A text as it stood when its typing last paused, so that not every letter is asked for. */
export function usePaused(text: string): string {
  return useLater(text, typingPauseMs);
}
