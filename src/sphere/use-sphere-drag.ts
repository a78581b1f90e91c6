import { type PointerEvent, useRef } from 'react';
import type { Placement } from './view';
import type { SphereViewStore } from './view-store';

interface Hold {
  readonly pointer: number;
  /** Taken by the limb ring, the view turns about the pole; taken by the body, it follows the pointer. */
  readonly by: 'ring' | 'body';
  x: number;
  y: number;
}

const DEGREES = 180 / Math.PI;
/** In radii: from here on outwards the pointer holds the ring. */
const RING_FROM = 1.0;
const RING_TO = 1.25;

/** Turning by pointer. Keys and buttons do all of it too. */
export function useSphereDrag(store: SphereViewStore, place: Placement) {
  const hold = useRef<Hold | null>(null);
  const at = (event: PointerEvent<HTMLElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    return {
      x: (event.clientX - box.left - place.centreX) / place.radius,
      y: (event.clientY - box.top - place.centreY) / place.radius,
    };
  };
  const end = () => {
    hold.current = null;
  };
  return {
    onPointerDown: (event: PointerEvent<HTMLElement>) => {
      const point = at(event);
      const reach = Math.hypot(point.x, point.y);
      if (event.button !== 0 || reach > RING_TO) return;
      hold.current = { pointer: event.pointerId, by: reach > RING_FROM ? 'ring' : 'body', ...point };
      event.currentTarget.setPointerCapture(event.pointerId);
    },
    onPointerMove: (event: PointerEvent<HTMLElement>) => {
      const held = hold.current;
      if (held?.pointer !== event.pointerId) return;
      const point = at(event);
      if (held.by === 'body') {
        store.getState().turnBy(-(point.x - held.x) * DEGREES, (point.y - held.y) * DEGREES);
      } else {
        const before = Math.atan2(-held.y, held.x);
        const now = Math.atan2(-point.y, point.x);
        const turned = Math.atan2(Math.sin(now - before), Math.cos(now - before));
        // Seen from above the north pole the body turns with the ring; from below it would turn against it.
        const sign = store.getState().view.latitudeDeg < 0 ? -1 : 1;
        store.getState().turnBy(-sign * turned * DEGREES, 0);
      }
      held.x = point.x;
      held.y = point.y;
    },
    onPointerUp: end,
    onPointerCancel: end,
  };
}
