import { useEffect, useState } from 'react';
import { drawAlone } from './draw-in-turn';

/**
 * A value a moment later, so that what is drawn of it is a task and a frame of its own and a key that is pressed meanwhile is heard
 * in between. One that changes again sooner is never drawn. No transition: rows that the solver answers are transitions too, and
 * would hold it up until the last is there.
 * @param first what stands until the first value is drawn; that value itself where it is to be there at once.
 */
export function useDrawnAlone<T>(value: T, first: T = value): T {
  const [drawn, setDrawn] = useState(first);
  useEffect(() => drawAlone(() => setDrawn(value)), [value]);
  return drawn;
}
