/*
 * A spreadsheet takes a cell that begins with one of these for a formula, and a text for one that begins with an apostrophe. A
 * written file holds an apostrophe before each, a read one loses it, and a text that has one of its own gets a second: exact
 * both ways.
 */
const dangerous = /^[=+\-@\t\r\n\0]/u;

export const isFormulaLike = (cell: string): boolean => dangerous.test(cell);

/** A text as a cell holds it. */
export function guarded(text: string): string {
  return text.startsWith("'") || isFormulaLike(text) ? `'${text}` : text;
}

/** The text of a cell; the other way of `guarded`. */
export function unguarded(cell: string): string {
  return cell.startsWith("'") ? cell.slice(1) : cell;
}

const number = /^-?\d+(?:\.\d+)?(?:e[+-]?\d+)?$/iu;

/** The shortest text that reads back as the very same number, with the plain minus. */
export function numberCell(value: number): string {
  return String(value);
}

/** @returns null where the cell holds no finite number written with a decimal point. */
export function readNumberCell(cell: string): number | null {
  const plain = cell.replace(/^\u2212/u, '-');
  if (!number.test(plain)) return null;
  const value = Number(plain);
  // There is one zero.
  return Number.isFinite(value) ? value + 0 : null;
}

/** A cell as RFC 4180 writes it. */
export function quotedCell(cell: string): string {
  return /[",;\r\n\t]|^ | $/u.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;
}
