/** Where a key moves from a cell, within rows of possibly different lengths; null for a key that doesn't move. */
export function nextCell(
  key: string,
  at: { readonly row: number; readonly column: number },
  lengths: readonly number[],
  withControl: boolean,
): { readonly row: number; readonly column: number } | null {
  const lastRow = lengths.length - 1;
  const clampColumn = (row: number, column: number): number =>
    Math.max(0, Math.min(column, (lengths[row] ?? 1) - 1));
  const to = (row: number, column: number) => {
    const bounded = Math.max(0, Math.min(row, lastRow));
    return { row: bounded, column: clampColumn(bounded, column) };
  };
  switch (key) {
    case 'ArrowUp':
      return to(at.row - 1, at.column);
    case 'ArrowDown':
      return to(at.row + 1, at.column);
    case 'ArrowLeft':
      return to(at.row, at.column - 1);
    case 'ArrowRight':
      return to(at.row, at.column + 1);
    case 'Home':
      return withControl ? to(0, 0) : to(at.row, 0);
    case 'End':
      return withControl ? to(lastRow, Number.MAX_SAFE_INTEGER) : to(at.row, Number.MAX_SAFE_INTEGER);
    case 'PageUp':
      return to(at.row - 10, at.column);
    case 'PageDown':
      return to(at.row + 10, at.column);
    default:
      return null;
  }
}
