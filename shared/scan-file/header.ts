import { splitCells } from './cells';
import { commentText, isRule } from './comments';
import { type ColumnName, readColumnName } from './column-name';
import type { ScanLine } from './lines';
import type { Delimiter } from './types';
import { knownUnit, type WrittenUnit } from './units';

export interface Header {
  /** Null where no line names the columns. */
  readonly line: number | null;
  /** One for each column; without names where there is no header. */
  readonly columns: readonly HeaderColumn[];
  /** A header's cells as they were written, for the signature. */
  readonly written: readonly string[];
}

export interface HeaderColumn extends ColumnName {
  /** The unit may stand on a line of its own. */
  readonly unit: WrittenUnit | null;
}

/** A line that names columns, but not as many as the rows have. */
export interface HeaderMismatch {
  readonly line: number;
  readonly count: number;
}

interface Named {
  readonly line: number;
  readonly cells: readonly string[];
}

/** Comments that are searched for a header, from the first row up. */
const MOST_COMMENTS = 20;

/**
 * The header among the lines above the first row: the lowest of the plain lines where it has a cell for each column, else the
 * lowest comment that has and that speaks of an angle or a power. Units may stand on a line of their own below the names.
 */
export function findHeader(
  preamble: readonly ScanLine[],
  delimiter: Delimiter,
  columnCount: number,
): Header | HeaderMismatch {
  const plain = preamble.filter(({ text }) => commentText(text, delimiter) === null && !isRule(text));
  const lowest = plain.slice(-2).map(({ number, text }) => ({
    line: number,
    cells: headerCells(text, delimiter, columnCount),
  }));
  const fitting = lowest.filter(({ cells }) => cells.length === columnCount);
  const last = lowest.at(-1);
  if (last?.cells.length === columnCount) return fromLines(fitting, columnCount);
  const comments = preamble
    .slice(-MOST_COMMENTS)
    .map(({ number, text }) => ({ number, text: commentText(text, delimiter) }));
  const named = comments.flatMap(({ number, text }) => {
    if (text === null) return [];
    const cells = headerCells(text, delimiter, columnCount);
    return cells.length === columnCount && (speaks(cells) > 0 || areUnits(cells))
      ? [{ line: number, cells }]
      : [];
  });
  if (named.length > 0) return fromLines(named.slice(-2), columnCount);
  if (last !== undefined && last.cells.length > 1 && speaks(last.cells) > 1) {
    return { line: last.line, count: last.cells.length };
  }
  return fromLines([], columnCount);
}

/** The lowest line, or the one above it where the lowest holds units only. */
function fromLines(lines: readonly Named[], columnCount: number): Header {
  const last = lines.at(-1);
  if (last === undefined) {
    const columns = Array.from({ length: columnCount }, () => readColumnName(''));
    return { line: null, columns, written: [] };
  }
  const above = lines.at(-2);
  if (above === undefined && hasAngle(last.cells)) {
    const columns = last.cells.map((cell) => ({ ...readColumnName(''), unit: bareUnit(cell) }));
    return { line: last.line, columns, written: last.cells };
  }
  if (above === undefined || !areUnits(last.cells)) {
    return { line: last.line, columns: last.cells.map(readColumnName), written: last.cells };
  }
  const columns = above.cells.map((cell, at) => {
    const named = readColumnName(cell);
    return { ...named, unit: named.unit ?? bareUnit(last.cells[at] ?? '') };
  });
  const written = above.cells.map((cell, at) => `${cell} ${last.cells[at] ?? ''}`.trim());
  return { line: above.line, columns, written };
}

function areUnits(cells: readonly string[]): boolean {
  const units = cells.map(bareUnit);
  return units.some((unit) => unit !== null) && cells.every((cell, at) => cell === '' || units[at] !== null);
}

/** Whether a line without names is one of units: letters like A and V alone could be names. */
function hasAngle(cells: readonly string[]): boolean {
  return areUnits(cells) && cells.some((cell) => bareUnit(cell)?.kind === 'angle');
}

function bareUnit(cell: string): WrittenUnit | null {
  return knownUnit(/^[([].*[)\]]$/u.test(cell) ? cell.slice(1, -1) : cell);
}

/** How many cells speak of an angle, a power or a σ. */
function speaks(cells: readonly string[]): number {
  return cells.filter((cell) => {
    const { quantity, isSigma } = readColumnName(cell).subject;
    return quantity !== null || isSigma;
  }).length;
}

function headerCells(text: string, delimiter: Delimiter, columnCount: number): readonly string[] {
  if (delimiter === 'spaces') return spacedCells(text, columnCount);
  const { cells } = splitCells(text, delimiter);
  return cells.length === columnCount + 1 && cells.at(-1) === '' ? cells.slice(0, -1) : cells;
}

/** Names over aligned columns may hold single spaces: "dial (deg)  power crossed (mW)". */
function spacedCells(text: string, columnCount: number): readonly string[] {
  const words = splitCells(text, 'spaces').cells;
  if (words.length === columnCount) return words;
  const apart = text
    .trim()
    .split(/\t| {2,}/u)
    .map((cell) => cell.trim())
    .filter((cell) => cell !== '');
  if (apart.length === columnCount) return apart;
  const bracketed = joined(words, (word) => word.startsWith('(') || word.startsWith('['));
  if (bracketed.length === columnCount) return bracketed;
  const withUnits = joined(bracketed, (word) => knownUnit(word) !== null);
  return withUnits.length === columnCount ? withUnits : words;
}

/** Words put together with the one before them where they only add to it, and over an open bracket. */
function joined(words: readonly string[], addsToLast: (word: string) => boolean): readonly string[] {
  const cells: string[] = [];
  for (const word of words) {
    const last = cells.at(-1);
    const isOpen = last !== undefined && /[([][^)\]]*$/u.test(last);
    if (last !== undefined && (isOpen || addsToLast(word))) cells[cells.length - 1] = `${last} ${word}`;
    else cells.push(word);
  }
  return cells;
}
