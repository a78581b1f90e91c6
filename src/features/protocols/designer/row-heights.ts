/** A plain row's, until one is measured. */
const plainRowPx = 39;

/** Heights of rows as they were measured, by the row's id, and what is taken for a row that never was. */
export interface RowHeights {
  readonly byId: ReadonlyMap<string, number>;
  /** Null until rows were measured. Taken once and kept: a guess that moved would move all that is below unseen rows. */
  readonly guessPx: number | null;
}

export const unmeasured: RowHeights = { byId: new Map(), guessPx: null };

export function heightOf({ byId, guessPx }: RowHeights, id: string): number {
  return byId.get(id) ?? guessPx ?? plainRowPx;
}

/** With what was just measured; the very same object where that is what was taken for these rows already. */
export function withMeasured(heights: RowHeights, measured: ReadonlyMap<string, number>): RowHeights {
  const known = heights.guessPx !== null;
  const changed = [...measured].filter(([id, heightPx]) => heightOf(heights, id) !== heightPx);
  if (measured.size === 0 || (known && changed.length === 0)) return heights;
  const sorted = [...measured.values()].sort((a, b) => a - b);
  return {
    byId: new Map([...heights.byId, ...changed]),
    guessPx: heights.guessPx ?? sorted[Math.floor(sorted.length / 2)] ?? null,
  };
}
