import { useEffect, useRef } from 'react';
import { selectedRow } from './use-row-actions';

/** Where the selected row was when it was last looked at. */
interface Looked {
  readonly scrollTop: number;
  /** From the region's top. */
  readonly rowTop: number;
}

/** Places in px that differ by less are the same. */
const samePx = 1;

/**
 * Shows the row that was just selected, scrolling no further than it must, and keeps it in sight while rows that come in above it
 * turn out higher than they were guessed, until somebody scrolls elsewhere by whatever means. The row that a page opens with stays
 * where it is.
 */
export function useSelectedInSight(region: HTMLElement | null, selectedId: string | null): void {
  const shown = useRef<string | null>(null);
  const followed = useRef<Looked | null>(null);

  useEffect(() => {
    if (region === null) return;
    const leave = () => {
      const row = region.querySelector(selectedRow);
      const before = followed.current;
      if (row !== null && before !== null && wentElsewhere(before, lookAt(region, row)))
        followed.current = null;
    };
    region.addEventListener('scroll', leave, { passive: true });
    return () => region.removeEventListener('scroll', leave);
  }, [region]);

  // After every drawing of the table, since any may have moved the row.
  useEffect(() => {
    const row = region?.querySelector(selectedRow) ?? null;
    if (region === null || row === null) return;
    const isFirst = shown.current === null;
    const isNew = shown.current !== selectedId;
    const before = followed.current;
    shown.current = selectedId;
    if (isFirst) return;
    if (isNew) {
      row.scrollIntoView({ block: 'nearest', inline: 'nearest' });
    } else if (before === null || wentElsewhere(before, lookAt(region, row))) {
      // The event of a scroll may come behind the drawing that it caused.
      followed.current = null;
      return;
    } else {
      // Only the region: the page may have been scrolled to the sphere meanwhile.
      region.scrollBy({ top: overhangPx(region, row.parentElement ?? row) });
    }
    followed.current = lookAt(region, row);
  });
}

function lookAt(region: HTMLElement, row: Element): Looked {
  const rowTop = row.getBoundingClientRect().top - region.getBoundingClientRect().top;
  return { scrollTop: region.scrollTop, rowTop };
}

/** A scroll that makes up for rows that grew above leaves the row where it is seen: by that nobody went elsewhere. */
function wentElsewhere(before: Looked, now: Looked): boolean {
  const scrolledPx = now.scrollTop - before.scrollTop;
  const movedPx = before.rowTop - now.rowTop;
  return Math.abs(scrolledPx) >= samePx && Math.abs(scrolledPx - movedPx) < samePx;
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
