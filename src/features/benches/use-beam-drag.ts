import { type PointerEvent as ReactPointerEvent, useEffect, useRef, useState } from 'react';
import type { BenchPart } from '../../../shared/schemas/benches';
import type { Spot } from './beam-order';

/** Where a part of the beam and the middles of its plates lie on the screen, from the top of the window. */
export interface PartLayout {
  readonly part: BenchPart;
  readonly topPx: number;
  readonly middlesPx: readonly number[];
}

/** Before which place something lies that is held at this height; parts from the top of the page down. */
export function spotAt(yPx: number, layout: readonly PartLayout[]): Spot | null {
  const part = layout.findLast(({ topPx }) => topPx <= yPx) ?? layout[0];
  if (part === undefined) return null;
  return { part: part.part, index: part.middlesPx.filter((middlePx) => middlePx < yPx).length };
}

function layoutOf(list: HTMLElement): PartLayout[] {
  const parts: readonly BenchPart[] = ['preparation', 'analysis'];
  return parts.flatMap((part) => {
    const element = list.querySelector(`[data-part="${part}"]`);
    if (element === null) return [];
    const middlesPx = [...element.querySelectorAll('[data-place]')].map((row) => {
      const { top, height } = row.getBoundingClientRect();
      return top + height / 2;
    });
    return [{ part, topPx: element.getBoundingClientRect().top, middlesPx }];
  });
}

interface Drag {
  readonly key: string;
  readonly pointerId: number;
  /** On the page, so that scrolling under a still hand moves the plate along. */
  readonly fromPx: number;
}

export interface Dragged {
  readonly key: string;
  readonly byPx: number;
  readonly to: Spot | null;
}

/** Less is a press, not a drag. */
const leastDragPx = 5;
const edgePx = 72;
const scrollStepPx = 9;

/**
 * Plates moved by pointer, from their handles. Pointer events of the platform and no package: one list of at most twelve
 * rows needs no sensors or collision strategies, and mouse, pen and finger are one kind of event. A plate is shown where it
 * is held and moves in the list only when it is let go, so no row changes place under the hand. Esc leaves it where it was.
 */
export function useBeamDrag(
  list: HTMLElement | null,
  onDrop: (key: string, to: Spot) => void,
): {
  readonly dragged: Dragged | null;
  readonly grip: (key: string) => (event: ReactPointerEvent) => void;
  /** Whether the press that is ending was a drag, so that its click means nothing. */
  readonly wasDrag: () => boolean;
} {
  const [drag, setDrag] = useState<Drag | null>(null);
  const [dragged, setDragged] = useState<Dragged | null>(null);
  const moved = useRef(false);
  const drop = useRef(onDrop);
  useEffect(() => {
    drop.current = onDrop;
  });

  useEffect(() => {
    if (drag === null || list === null) return undefined;
    let yPx = drag.fromPx - window.scrollY;
    let frame = 0;
    const look = (): Spot | null => {
      const byPx = yPx + window.scrollY - drag.fromPx;
      if (!moved.current && Math.abs(byPx) < leastDragPx) return null;
      moved.current = true;
      const to = spotAt(yPx, layoutOf(list));
      setDragged({ key: drag.key, byPx, to });
      return to;
    };
    const scroll = () => {
      frame = 0;
      const step = yPx < edgePx ? -scrollStepPx : yPx > window.innerHeight - edgePx ? scrollStepPx : 0;
      if (step === 0 || !moved.current) return;
      window.scrollBy(0, step);
      look();
      frame = window.requestAnimationFrame(scroll);
    };
    const end = () => {
      setDrag(null);
      setDragged(null);
    };
    const move = (event: PointerEvent) => {
      if (event.pointerId !== drag.pointerId) return;
      yPx = event.clientY;
      look();
      if (frame === 0) frame = window.requestAnimationFrame(scroll);
    };
    const up = (event: PointerEvent) => {
      if (event.pointerId !== drag.pointerId) return;
      yPx = event.clientY;
      const to = look();
      end();
      if (to !== null) drop.current(drag.key, to);
    };
    const escape = (event: KeyboardEvent) => {
      if (event.key === 'Escape') end();
    };
    window.addEventListener('pointermove', move);
    window.addEventListener('pointerup', up);
    window.addEventListener('pointercancel', end);
    window.addEventListener('keydown', escape);
    return () => {
      window.cancelAnimationFrame(frame);
      window.removeEventListener('pointermove', move);
      window.removeEventListener('pointerup', up);
      window.removeEventListener('pointercancel', end);
      window.removeEventListener('keydown', escape);
    };
  }, [drag, list]);

  return {
    dragged,
    grip: (key) => (event) => {
      if (event.button !== 0) return;
      moved.current = false;
      setDrag({ key, pointerId: event.pointerId, fromPx: event.clientY + window.scrollY });
    },
    wasDrag: () => moved.current,
  };
}
