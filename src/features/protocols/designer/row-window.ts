/** A part of a long table: a row that is in the document, or the room that rows take which are not. */
export type WindowPart =
  | { readonly kind: 'row'; readonly place: number }
  | { readonly kind: 'gap'; readonly from: number; readonly count: number; readonly heightPx: number };

/** A row that is in the document, and where it lies from the top of the first row on. */
interface PlacedRow {
  readonly index: number;
  readonly start: number;
  readonly end: number;
}

/** The table's parts from above: the rows that are there, in order, with one gap for each run of others. */
export function windowParts(count: number, rows: readonly PlacedRow[], totalPx: number): WindowPart[] {
  const parts: WindowPart[] = [];
  let from = 0;
  let topPx = 0;
  for (const { index, start, end } of [...rows, { index: count, start: totalPx, end: totalPx }]) {
    if (index > from) parts.push({ kind: 'gap', from, count: index - from, heightPx: start - topPx });
    if (index < count) parts.push({ kind: 'row', place: index });
    from = index + 1;
    topPx = end;
  }
  return parts;
}
