import { type RefCallback, type RefObject, useCallback, useEffect, useRef } from 'react';
import { edgeFade } from '../../components/edge-fade';

/** Where a tray that may be longer than the page stands. */
interface TrayFrame {
  readonly frame: RefCallback<HTMLElement>;
  readonly opened: RefObject<HTMLLIElement | null>;
}

/** Brings the open plate to the middle of the tray, with the focus where that is in the tray. */
export function useTrayFrame(openId: string | undefined): TrayFrame {
  const tray = useRef<HTMLElement>(null);
  const opened = useRef<HTMLLIElement>(null);
  const frame = useCallback((element: HTMLElement | null) => {
    tray.current = element;
    return edgeFade(element);
  }, []);
  useEffect(() => {
    const [box, item] = [tray.current, opened.current];
    if (box === null || item === null) return;
    box.scrollLeft = item.offsetLeft - (box.clientWidth - item.offsetWidth) / 2;
    if (box.contains(document.activeElement)) item.querySelector('a')?.focus({ preventScroll: true });
  }, [openId]);
  return { frame, opened };
}
