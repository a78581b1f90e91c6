import { useCallback, useEffect, useState } from 'react';
import { heightOf, type RowHeights, unmeasured, withMeasured } from './row-heights';
import { rowsBetween, type WindowPart, windowParts } from './row-window';

/** How far out of sight rows are in the document already, so that a turn of the wheel meets drawn ones. */
const marginPx = 240;
/** Where a region stands is noted in steps of this, so that not every pixel of scrolling draws the table. */
const stepPx = 120;

/** The stretch of the region's content that is in sight. */
interface Sight {
  readonly topPx: number;
  readonly heightPx: number;
}

const firstSight: Sight = { topPx: 0, heightPx: 480 };

export interface RowWindow {
  readonly parts: readonly WindowPart[];
  /** Of each row's group, to be measured while it is in the document. */
  readonly measure: (group: HTMLElement | null) => (() => void) | undefined;
}

/**
 * Which of a long table's rows are in the document: those in sight of the region that scrolls, a little more, and those that
 * must stay. A row's group names its row in `data-row`. Rows may have any height: each is measured as long as it is there.
 * @param region null until it is in the document itself.
 */
export function useRowWindow(
  region: HTMLElement | null,
  ids: readonly string[],
  staying: ReadonlySet<number>,
): RowWindow {
  const { topPx, heightPx } = useSight(region);
  const { heights, measure } = useMeasured();
  const heightAt = (place: number) => heightOf(heights, ids[place] ?? '');
  const range = rowsBetween(ids.length, heightAt, topPx - marginPx, topPx + heightPx + marginPx);
  return { parts: windowParts(ids.length, heightAt, range, staying), measure };
}

function useSight(region: HTMLElement | null): Sight {
  const [sight, setSight] = useState(firstSight);
  useEffect(() => {
    if (region === null) return;
    const look = () => {
      const topPx = Math.floor(region.scrollTop / stepPx) * stepPx;
      // Without a layout, as in a test, it keeps the height that it is thought to have.
      const heightPx = (region.clientHeight === 0 ? firstSight.heightPx : region.clientHeight) + stepPx;
      setSight((before) =>
        before.topPx === topPx && before.heightPx === heightPx ? before : { topPx, heightPx },
      );
    };
    region.addEventListener('scroll', look, { passive: true });
    const resized = typeof ResizeObserver === 'undefined' ? null : new ResizeObserver(look);
    resized?.observe(region);
    return () => {
      region.removeEventListener('scroll', look);
      resized?.disconnect();
    };
  }, [region]);
  return sight;
}

/** Heights of the groups that are in the document, and of those that were. */
function useMeasured(): { readonly heights: RowHeights; readonly measure: RowWindow['measure'] } {
  const [heights, setHeights] = useState(unmeasured);
  const [observer] = useState(() =>
    typeof ResizeObserver === 'undefined'
      ? null
      : new ResizeObserver((entries) => {
          const measured = entries.flatMap(({ target }): [string, number][] => {
            const id = target instanceof HTMLElement ? target.dataset['row'] : undefined;
            const heightPx = target.getBoundingClientRect().height;
            // What was just taken out of the document has no height; its last one stands.
            return id === undefined || heightPx === 0 ? [] : [[id, heightPx]];
          });
          setHeights((before) => withMeasured(before, new Map(measured)));
        }),
  );
  const measure = useCallback(
    (group: HTMLElement | null) => {
      if (group === null || observer === null) return undefined;
      observer.observe(group);
      return () => observer.unobserve(group);
    },
    [observer],
  );
  return { heights, measure };
}
