import { splitCells } from './cells';
import { commentText, isRule } from './comments';
import { findDelimiter } from './delimiter';
import { shown, type FaultList } from './fault-list';
import { findHeader, type Header } from './header';
import type { ScanLine, ScanLines } from './lines';
import { cellForm, isMeantAsNumber } from './number-cell';
import { type Delimiter, MAX_SCAN_COLUMNS, MAX_SCAN_ROWS } from './types';

export interface TableRow {
  readonly line: number;
  readonly cells: readonly string[];
}

/** Rows of equally many cells under a header. */
export interface CellTable {
  readonly delimiter: Delimiter;
  readonly header: Header;
  readonly rows: readonly TableRow[];
  readonly columnCount: number;
  readonly commentLineCount: number;
}

const SAY_COMMENT = 'Begin the line with # if it is a comment.';
/** The dial and one power. */
export const FEWEST_COLUMNS = 2;
const FEWEST_ROWS = 2;

/** Finds the rows and their header; null, with the faults that say why, where there is no sound table. */
export function findTable(scan: ScanLines, faults: FaultList): CellTable | null {
  const plain = scan.lines.filter(({ text }) => commentText(text, null) === null);
  const found = findDelimiter(plain);
  if (found === null) {
    noRows(scan, plain.length > 0, faults);
    return null;
  }
  if (!found.ok) {
    faults.addLine(found.line, found.what, found.remedy);
    return null;
  }
  const { delimiter, columnCount } = found;
  const split = findRows(scan, delimiter, columnCount, faults);
  if (split.rows.length === 0 && faults.isEmpty) noRows(scan, true, faults);
  const isSound = split.rows.length > 0 && checkShape(split.rows, columnCount, faults);
  return isSound ? withHeader(split, delimiter, columnCount, faults) : null;
}

const ROW_WORDS =
  'Write one row a line: the dial’s reading, then the crossed power, the parallel one, or both.';

function noRows({ lines }: ScanLines, hasText: boolean, faults: FaultList): void {
  const line = lines.at(-1)?.number ?? 1;
  if (lines.length === 0) {
    faults.addLine(1, 'This file is empty.', 'Choose the file that the measurement wrote.');
  } else if (hasText) {
    faults.addLine(line, 'No line of this file is a row of numbers.', ROW_WORDS);
  } else {
    faults.addLine(line, 'This file holds comments only.', ROW_WORDS);
  }
}

interface Split {
  readonly preamble: readonly ScanLine[];
  readonly rows: readonly TableRow[];
  readonly commentLineCount: number;
}

function findRows(
  { lines, isLastEnded }: ScanLines,
  delimiter: Delimiter,
  columnCount: number,
  faults: FaultList,
): Split {
  const preamble: ScanLine[] = [];
  const rows: TableRow[] = [];
  let comments = 0;
  for (const [index, line] of lines.entries()) {
    const isComment = commentText(line.text, delimiter) !== null;
    if (isComment) comments += 1;
    if (isComment && rows.length > 0) continue;
    const { cells, isQuoteBroken } = isComment ? NO_CELLS : splitCells(line.text, delimiter);
    if (isComment || (rows.length === 0 && !isRow(line.text, cells, columnCount, isQuoteBroken))) {
      preamble.push(line);
      continue;
    }
    if (rows.length === MAX_SCAN_ROWS) {
      faults.addLine(line.number, `This file has more than ${MAX_SCAN_ROWS} rows.`, 'Keep one scan a file.');
      break;
    }
    rows.push({ line: line.number, cells });
    const isLast = index === lines.length - 1;
    if (isQuoteBroken) brokenQuote(line.number, isLast, faults);
    else if (cells.length !== columnCount) {
      raggedRow({ line: line.number, cells }, columnCount, isLast && !isLastEnded, faults);
    }
  }
  return { preamble, rows, commentLineCount: comments };
}

const NO_CELLS = { cells: [], isQuoteBroken: false } as const;

/** Whether a line above the first row is it: all cells are values, or as many as in a row and one of them a value. */
function isRow(text: string, cells: readonly string[], columnCount: number, isQuoteBroken: boolean): boolean {
  if (isQuoteBroken) return true;
  if (isRule(text)) return false;
  const values = cells.filter(isMeantAsNumber);
  const hasNumber = values.some((cell) => cell !== '-' && cell !== '--');
  if (!hasNumber) return false;
  return cells.length === columnCount || cells.every((cell) => cell === '' || isMeantAsNumber(cell));
}

function brokenQuote(line: number, isLast: boolean, faults: FaultList): void {
  faults.addLine(
    line,
    `A quote is not closed on this line, or text stands behind one.${isLast ? ' The file may have been cut off here.' : ''}`,
    'Close it on the same line, or delete it.',
  );
}

function raggedRow(
  { line, cells }: TableRow,
  columnCount: number,
  isCutOff: boolean,
  faults: FaultList,
): void {
  const has = `This line has ${cells.length === 1 ? '1 column' : `${cells.length} columns`}, the others have ${columnCount}.`;
  if (isCutOff && cells.length < columnCount) {
    faults.addLine(line, `${has} The file was cut off here.`, 'Copy the file again, or delete the line.');
    return;
  }
  const [first = ''] = cells;
  const isText = first !== '' && !isMeantAsNumber(first);
  faults.addLine(
    line,
    has,
    isText
      ? `${shown(first)} is no number. ${SAY_COMMENT}`
      : 'Make the columns equally many on all lines. Decimal commas and thousands separators make more of them where commas stand between the columns.',
  );
}

function checkShape(rows: readonly TableRow[], columnCount: number, faults: FaultList): boolean {
  const line = rows[0]?.line ?? 1;
  if (columnCount > MAX_SCAN_COLUMNS) {
    faults.addLine(
      line,
      `This file has ${columnCount} columns; the most is ${MAX_SCAN_COLUMNS}.`,
      'Keep the dial and the powers, with their σ where there are some.',
    );
  } else if (columnCount < FEWEST_COLUMNS && faults.isEmpty) {
    faults.addLine(
      line,
      `The rows have ${columnCount === 1 ? '1 column' : `${columnCount} columns`}; a scan has at least two.`,
      'Write the dial’s reading and a power on each line, with a semicolon between them.',
    );
  } else if (rows.length < FEWEST_ROWS && faults.isEmpty) {
    faults.addLine(line, 'This file has only one row.', 'A scan has one row for each setting of the dial.');
  }
  return faults.isEmpty;
}

function withHeader(
  { preamble, rows, commentLineCount }: Split,
  delimiter: Delimiter,
  columnCount: number,
  faults: FaultList,
): CellTable | null {
  const full = findHeader(preamble, delimiter, columnCount);
  // Some programs end each line with the delimiter; a last column that has a name is a column all the same.
  const isUnnamed = !('columns' in full) || full.line === null || full.written.at(-1) === '';
  const isEndedBySign = columnCount > FEWEST_COLUMNS && rows.every(({ cells }) => cells.at(-1) === '');
  const isShorter = isEndedBySign && isUnnamed;
  const width = isShorter ? columnCount - 1 : columnCount;
  const header = isShorter ? findHeader(preamble, delimiter, width) : full;
  if (!('columns' in header)) {
    faults.addLine(
      header.line,
      `This line names ${header.count} columns, and the rows have ${columnCount}.`,
      'Name each column once. Decimal commas and thousands separators make more columns where commas stand between them.',
    );
    return null;
  }
  const plainLines = preamble.filter(({ text }) => commentText(text, delimiter) === null && !isRule(text));
  const textAbove = plainLines.filter(({ number }) => header.line === null || number < header.line).length;
  return {
    delimiter,
    header,
    rows: isShorter ? rows.map(({ line, cells }) => ({ line, cells: cells.slice(0, width) })) : rows,
    columnCount: width,
    commentLineCount: commentLineCount + textAbove,
  };
}

/** Columns without a single number; they can't be the scan's. */
export function textColumns({ rows, columnCount }: CellTable): ReadonlySet<number> {
  const text = new Set<number>();
  for (let column = 0; column < columnCount; column += 1) {
    if (!rows.some(({ cells }) => cellForm(cells[column] ?? '') !== 'other')) text.add(column);
  }
  return text;
}
