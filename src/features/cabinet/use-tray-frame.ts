import { type RefObject, useCallback, useEffect, useRef, useState } from 'react';

/** What a tray longer than the page does with its frame. */
export interface TrayFrame {
  readonly frame: RefObject<HTMLElement | null>;
  readonly opened: RefObject<HTMLLIElement | null>;
  /** On which sides more of it lies out of sight. */
  readonly cut: 'none' | 'left' | 'right' | 'both';
  /** To be called when it was scrolled. */
  readonly looked: () => void;
}

/** Less than this out of sight, in px, is a rounding of widths. */
const seenPx = 2;

function cutOf({ scrollLeft, clientWidth, scrollWidth }: HTMLElement): TrayFrame['cut'] {
  const [left, right] = [scrollLeft > seenPx, scrollLeft + clientWidth < scrollWidth - seenPx];
  if (left && right) return 'both';
  return left ? 'left' : right ? 'right' : 'none';
}

/** Brings the open plate to the middle of the tray, with the focus where that is in the tray, and tells where it is cut. */
export function useTrayFrame(openId: string | undefined, count: number): TrayFrame {
  const frame = useRef<HTMLElement>(null);
  const opened = useRef<HTMLLIElement>(null);
  const [cut, setCut] = useState<TrayFrame['cut']>('none');
  const looked = useCallback(() => {
    if (frame.current !== null) setCut(cutOf(frame.current));
  }, []);

  useEffect(() => {
    const [tray, item] = [frame.current, opened.current];
    if (tray === null || item === null) return;
    tray.scrollLeft = item.offsetLeft - (tray.clientWidth - item.offsetWidth) / 2;
    if (tray.contains(document.activeElement)) item.querySelector('a')?.focus({ preventScroll: true });
  }, [openId]);

  useEffect(() => {
    const tray = frame.current;
    looked();
    if (tray === null || typeof ResizeObserver === 'undefined') return undefined;
    const observer = new ResizeObserver(looked);
    observer.observe(tray);
    return () => observer.disconnect();
  }, [looked, count]);

  return { frame, opened, cut, looked };
}
