import { defaultRangeExtractor, measureElement, useVirtualizer } from '@tanstack/react-virtual';
import { useDrawnAlone } from '../../../lib/use-drawn-alone';
import { type WindowPart, windowParts } from './row-window';

/** A plain row's height, until one is measured. */
const plainRowPx = 39;
/** Rows that are in the document before they come into sight, so that a turn of the wheel meets drawn ones. */
const rowsAhead = 6;

export interface RowWindow {
  readonly parts: readonly WindowPart[];
  /** Of each row's group, which names its place in `data-index`, to be measured while it is in the document. */
  readonly measure: (group: HTMLElement | null) => void;
}

/**
 * Which of a long table's rows are in the document: those in sight of the region that scrolls, a few more, and those that
 * must stay. Rows may have any height: each is measured as long as it is there.
 * @param region null until it is in the document itself.
 */
export function useRowWindow(
  region: HTMLElement | null,
  ids: readonly string[],
  staying: ReadonlySet<number>,
): RowWindow {
  // A table that opens has the rows in sight laid out first, and those ahead in a frame of their own.
  const ahead = useDrawnAlone(region === null ? 0 : rowsAhead);
  // eslint-disable-next-line react-hooks/incompatible-library -- it warns of React's compiler, which does not run here
  const rows = useVirtualizer({
    count: ids.length,
    getScrollElement: () => region,
    getItemKey: (place) => ids[place] ?? place,
    estimateSize: () => plainRowPx,
    // Taken for plain until the browser has laid it out: to ask for its height as it comes in would be one more layout for each.
    measureElement: (group, laidOut, table) =>
      laidOut === undefined
        ? (table.itemSizeCache.get(ids[table.indexFromElement(group)] ?? '') ?? plainRowPx)
        : measureElement(group, laidOut, table),
    overscan: ahead,
    // Drawn in its turn: a scroll event that waits for the table would keep the wheel waiting.
    useFlushSync: false,
    rangeExtractor: (range) =>
      [...new Set([...defaultRangeExtractor(range), ...staying])].sort((a, b) => a - b),
  });
  const parts = windowParts(ids.length, rows.getVirtualItems(), rows.getTotalSize());
  return { parts, measure: rows.measureElement };
}
