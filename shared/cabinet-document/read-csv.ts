import { type CellValue, type CsvColumn, csvColumns, type CsvPart, readCell } from './csv-columns';
import { CsvParts, type CsvRow } from './csv-parts';
import { csvRecords } from './csv-records';
import type { CabinetDocument } from './document';
import { maxDocumentRows } from './limits';
import type { FaultList } from './faults';
import { readParts } from './read-parts';
import { checkDocument } from './check-document';

/** Reads a CSV text as a cabinet in the order it was written in. @returns null where there are faults. */
export function readCsv(text: string, now: Date, faults: FaultList): CabinetDocument | null {
  const records = csvRecords(text, delimiterOf(text));
  const head = records.next();
  if (head.done === true) {
    faults.add({ row: null, column: null, message: 'The file is empty. Choose the file again.' });
    return null;
  }
  if (head.value.fault !== null) {
    faults.add({ row: 1, column: null, message: head.value.fault });
    return null;
  }
  const columns = readHeader(head.value.cells, faults);
  if (columns === null) return null;
  const parts = new CsvParts(faults);
  for (const { row, cells, fault } of records) {
    if (row > maxDocumentRows + 1) {
      const message = `A file has at most ${maxDocumentRows} rows below its header. Import it in parts.`;
      faults.add({ row, column: null, message });
      break;
    }
    if (fault !== null) faults.add({ row, column: null, message: fault });
    else if (cells.some((cell) => cell.trim() !== '')) {
      const read = readRow(row, cells, columns, faults);
      if (read !== null) parts.take(read);
    }
    if (faults.isFull()) break;
  }
  if (faults.isFull()) return null;
  // Rows that can't be read hide no fault of the others; only what holds between rows is left until all are there.
  const isWhole = faults.isEmpty();
  const report = parts.report;
  const document = readParts(parts.raw(isWhole), report);
  if (document !== null && isWhole) checkDocument(document, now, report);
  return faults.isEmpty() ? document : null;
}

/** Comma, or the semicolon where the header has that and no comma: no name in it holds either. */
function delimiterOf(text: string): ',' | ';' {
  const [header = ''] = text.slice(0, 10_000).split(/[\r\n]/u, 1);
  return header.includes(';') && !header.includes(',') ? ';' : ',';
}

const shown = (text: string): string => (text.length > 40 ? `${text.slice(0, 40)}…` : text);

/** Which column stands in which place; every one once, in any order. */
function readHeader(cells: readonly string[], faults: FaultList): readonly CsvColumn[] | null {
  const columns: CsvColumn[] = [];
  for (const cell of cells) {
    const header = cell.trim();
    const known = csvColumns.find((column) => column.header === header);
    if (known === undefined) {
      const message = 'This column is not one of a cabinet’s. Take it out, or correct its name.';
      faults.add({ row: 1, column: shown(header), message });
    } else if (columns.includes(known)) {
      faults.add({ row: 1, column: header, message: 'This column stands there twice. Take one out.' });
    } else columns.push(known);
    if (faults.isFull()) return null;
  }
  const missing = csvColumns.filter((column) => !columns.includes(column));
  // Of a file that is something else altogether, that is what is to be said.
  if (missing.length === csvColumns.length) {
    const message =
      'None of the header’s columns is one of a cabinet’s. Export the cabinet to see how they are called.';
    faults.add({ row: 1, column: null, message });
  } else {
    for (const { header } of missing) {
      const message = 'This column is missing. Add it, with empty cells where nothing is known.';
      faults.add({ row: 1, column: header, message });
    }
  }
  return faults.isEmpty() ? columns : null;
}

function readRow(
  row: number,
  cells: readonly string[],
  columns: readonly CsvColumn[],
  faults: FaultList,
): CsvRow | null {
  if (cells.length !== columns.length) {
    const message = `This row has ${cells.length} cells and the header ${columns.length}. The row may be cut off, or a cell with a comma or semicolon in it not be quoted.`;
    faults.add({ row, column: null, message });
    return null;
  }
  const values = new Map<CsvColumn, CellValue>();
  const filled = new Set<CsvPart>();
  for (const [place, column] of columns.entries()) {
    const cell = cells[place] ?? '';
    if (cell.trim() !== '') filled.add(column.part);
    const read = readCell(column, cell);
    if (read.ok) values.set(column, read.value);
    else faults.add({ row, column: column.header, message: read.fault });
  }
  return { row, values, filled };
}
