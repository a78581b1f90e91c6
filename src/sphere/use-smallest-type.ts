import { type RefObject, useEffect, useState } from 'react';
import { watchTheme } from './palette';

/** The smallest type that the theme around an element allows on the drawing, in CSS pixels; 0 where it sets none. */
export function useSmallestType(element: RefObject<HTMLElement | null>): number {
  const [smallestPx, setSmallest] = useState(0);
  useEffect(() => {
    const box = element.current;
    if (box === null) return undefined;
    const read = () => {
      const value = Number.parseFloat(getComputedStyle(box).getPropertyValue('--sphere-smallest-type'));
      setSmallest(Number.isFinite(value) ? value : 0);
    };
    read();
    return watchTheme(box, read);
  }, [element]);
  return smallestPx;
}
