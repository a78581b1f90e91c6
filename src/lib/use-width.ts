import { type RefObject, useEffect, useRef, useState } from 'react';

/** The width of an element in CSS pixels, followed as it changes, so that a drawing's text keeps its size. */
export function useWidth<Element extends HTMLElement>(
  before: number,
): readonly [RefObject<Element | null>, number] {
  const ref = useRef<Element>(null);
  const [width, setWidth] = useState(before);
  useEffect(() => {
    const element = ref.current;
    if (element === null || typeof ResizeObserver === 'undefined') return undefined;
    const observer = new ResizeObserver(([entry]) => {
      if (entry !== undefined && entry.contentRect.width > 0) setWidth(Math.round(entry.contentRect.width));
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
