import { useEffect, useRef } from 'react';
import { selectedRow } from './use-row-actions';

/** By these somebody goes elsewhere in the region, and the selected row is no longer followed. */
const ownWays = ['wheel', 'touchmove', 'pointerdown'] as const;
const pageKeys = new Set(['PageUp', 'PageDown', ' ']);

/**
 * Shows the row that was just selected, scrolling no further than it must, and keeps it in sight while rows that come in above it
 * turn out higher than they were guessed. The row that a page opens with stays where it is.
 */
export function useSelectedInSight(region: HTMLElement | null, selectedId: string | null): void {
  const shown = useRef<string | null>(null);
  const follows = useRef(false);

  useEffect(() => {
    if (region === null) return;
    const leave = () => {
      follows.current = false;
    };
    const press = ({ key }: KeyboardEvent) => {
      if (pageKeys.has(key)) leave();
    };
    for (const way of ownWays) region.addEventListener(way, leave, { passive: true });
    region.addEventListener('keydown', press);
    return () => {
      for (const way of ownWays) region.removeEventListener(way, leave);
      region.removeEventListener('keydown', press);
    };
  }, [region]);

  // After every drawing of the table, since any may have moved the row.
  useEffect(() => {
    const row = region?.querySelector(selectedRow) ?? null;
    if (region === null || row === null) return;
    if (shown.current !== selectedId) {
      const isFirst = shown.current === null;
      shown.current = selectedId;
      follows.current = !isFirst;
      if (!isFirst) row.scrollIntoView({ block: 'nearest', inline: 'nearest' });
    } else if (follows.current) {
      // Only the region: the page may have been scrolled to the sphere meanwhile.
      region.scrollBy({ top: overhangPx(region, row.parentElement ?? row) });
    }
  });
}

/** How far the region has to scroll for all of a row's group to be in it, under the head that stays. */
function overhangPx(region: HTMLElement, group: Element): number {
  const box = region.getBoundingClientRect();
  const row = group.getBoundingClientRect();
  const headPx = region.querySelector('thead')?.getBoundingClientRect().height ?? 0;
  const above = row.top - (box.top + headPx);
  const below = row.bottom - (box.top + region.clientHeight);
  return above < 0 ? above : Math.min(Math.max(below, 0), above);
}
