import { type RefObject, useLayoutEffect, useState } from 'react';

/** The width of an element in CSS pixels as it changes; `widthBefore` until it has been laid out. */
export function useBoxWidth(element: RefObject<HTMLElement | null>, widthBefore: number): number {
  const [width, setWidth] = useState(widthBefore);
  useLayoutEffect(() => {
    const box = element.current;
    if (box === null) return undefined;
    const measure = () => {
      if (box.clientWidth > 0) setWidth(box.clientWidth);
    };
    measure();
    // Without an observer the first width has to do.
    if (!('ResizeObserver' in window)) return undefined;
    const resize = new ResizeObserver(measure);
    resize.observe(box);
    return () => resize.disconnect();
  }, [element]);
  return width;
}
