/** A part of a long table: a row that is in the document, or the room that rows take which are not. */
export type WindowPart =
  | { readonly kind: 'row'; readonly place: number }
  | { readonly kind: 'gap'; readonly from: number; readonly count: number; readonly heightPx: number };

/** Places of the first and the last row that are in sight, both included. */
export interface RowRange {
  readonly first: number;
  readonly last: number;
}

/** Rows that any part of the stretch from `topPx` to `bottomPx` lies on, from the top of the first row on. */
export function rowsBetween(
  count: number,
  heightPx: (place: number) => number,
  topPx: number,
  bottomPx: number,
): RowRange {
  let first = 0;
  let below = 0;
  while (first < count - 1 && below + heightPx(first) <= topPx) {
    below += heightPx(first);
    first += 1;
  }
  let last = first;
  below += count > 0 ? heightPx(first) : 0;
  while (last < count - 1 && below < bottomPx) {
    last += 1;
    below += heightPx(last);
  }
  return { first, last };
}

/** The table's parts from above: rows in the range and rows that must stay, with one gap for each run of others. */
export function windowParts(
  count: number,
  heightPx: (place: number) => number,
  { first, last }: RowRange,
  staying: ReadonlySet<number>,
): readonly WindowPart[] {
  const parts: WindowPart[] = [];
  for (let place = 0; place < count; place += 1) {
    if ((place >= first && place <= last) || staying.has(place)) {
      parts.push({ kind: 'row', place });
      continue;
    }
    const before = parts.at(-1);
    const own = heightPx(place);
    if (before?.kind === 'gap') {
      parts[parts.length - 1] = { ...before, count: before.count + 1, heightPx: before.heightPx + own };
    } else parts.push({ kind: 'gap', from: place, count: 1, heightPx: own });
  }
  return parts;
}
