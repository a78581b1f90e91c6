import { useEffect, useRef } from 'react';

/** Moves the focus once the field that had it is gone: left alone it would fall to the page, and the next keys with it. */
export function useFocusAfter(region: HTMLElement | null): (selector: string) => void {
  const wanted = useRef<string | null>(null);
  // After every drawing, since it is the next one that takes the field away.
  useEffect(() => {
    if (wanted.current === null) return;
    region?.querySelector<HTMLElement>(wanted.current)?.focus();
    wanted.current = null;
  });
  return (selector) => {
    wanted.current = selector;
  };
}
