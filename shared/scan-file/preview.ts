import type { CellTable } from './table';
import { type DecimalSign, PREVIEW_ROWS, type ScanEncoding, type ScanPreview } from './types';

/** The file as it was understood. */
export function previewOf(table: CellTable, encoding: ScanEncoding, decimalSign: DecimalSign): ScanPreview {
  return {
    encoding,
    delimiter: table.delimiter,
    decimalSign,
    commentLineCount: table.commentLineCount,
    headerLine: table.header.line,
    rowCount: table.rows.length,
    columns: table.header.columns.map(({ name, unit }, at) => ({
      number: at + 1,
      name,
      unit: unit?.text ?? null,
    })),
    rows: table.rows.slice(0, PREVIEW_ROWS),
  };
}
