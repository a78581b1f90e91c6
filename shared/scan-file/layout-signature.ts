import type { CellTable } from './table';

/** Delimiter, number of columns and normalised names with their units, as JSON: equal for files that look alike. */
export function layoutSignature({ delimiter, columnCount, header }: CellTable): string {
  return JSON.stringify([delimiter, columnCount, ...header.written.map(normalised)]);
}

function normalised(cell: string): string {
  return cell.normalize('NFC').toLowerCase().replaceAll('µ', 'μ').replace(/\s+/gu, ' ').trim();
}
