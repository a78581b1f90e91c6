import { type MouseEvent, type PointerEvent, useEffect, useRef } from 'react';

const longMs = 600;

/** A press, and what a longer one does instead; the click that ends a long press does nothing more. */
export function useLongPress(onPress: () => void, onLongPress: () => void) {
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null);
  const wasLong = useRef(false);
  const stop = (): void => {
    if (timer.current !== null) clearTimeout(timer.current);
    timer.current = null;
  };
  useEffect(() => stop, []);
  return {
    onPointerDown: (event: PointerEvent) => {
      if (event.button !== 0) return;
      wasLong.current = false;
      stop();
      timer.current = setTimeout(() => {
        wasLong.current = true;
        onLongPress();
      }, longMs);
    },
    onPointerUp: stop,
    onPointerLeave: stop,
    onPointerCancel: stop,
    // The long press of a touch screen would open the browser's own menu.
    onContextMenu: (event: MouseEvent) => event.preventDefault(),
    onClick: () => {
      stop();
      if (wasLong.current) {
        wasLong.current = false;
        return;
      }
      onPress();
    },
  };
}
