import { type RefObject, startTransition, useLayoutEffect, useState } from 'react';
import { drawAlone } from '../lib/draw-in-turn';

/**
 * The width of an element in CSS pixels as it changes, null until it has been laid out. It is not asked for before the browser
 * lays the page out anyway: that would be one more layout of the whole page, in the same task as what is drawn.
 * @param widthWithoutObserver the width for good where nothing tells it.
 */
export function useBoxWidth(
  element: RefObject<HTMLElement | null>,
  widthWithoutObserver: number,
): number | null {
  const [width, setWidth] = useState(() => ('ResizeObserver' in window ? null : widthWithoutObserver));
  useLayoutEffect(() => {
    const box = element.current;
    if (box === null || !('ResizeObserver' in window)) return undefined;
    let takeBack: (() => void) | null = null;
    const resize = new ResizeObserver(() => {
      const next = box.clientWidth;
      if (next === 0) return;
      // What is drawn for the first time is much: in its turn, and in slices. What follows a width that changes is drawn at once.
      if (takeBack === null) takeBack = drawAlone(() => startTransition(() => setWidth(box.clientWidth)));
      else setWidth(next);
    });
    resize.observe(box);
    return () => {
      resize.disconnect();
      takeBack?.();
    };
  }, [element]);
  return width;
}
