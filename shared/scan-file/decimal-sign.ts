import { shown } from './fault-list';
import { cellForm, withPlainMinus } from './number-cell';
import type { CellTable } from './table';
import type { DecimalSign } from './types';

export interface SignReading {
  readonly sign: DecimalSign;
  /** The first cell of which nobody can tell whether its sign groups thousands; null where there is none. */
  readonly doubt: SignDoubt | null;
}

export interface SignDoubt {
  readonly line: number;
  /** From 0. */
  readonly column: number;
  readonly what: string;
  readonly remedy: string;
}

interface ColumnForms {
  readonly comma: SignForms;
  readonly point: SignForms;
  /** Whole numbers below a thousand, and from there on. */
  small: number;
  large: number;
}

interface SignForms {
  count: number;
  /** Those with one to three digits before the sign, three behind it, and no zero in front: "1,234". */
  grouped: number;
  first: { readonly line: number; readonly cell: string } | null;
}

const LIKE_THOUSANDS = /^[+-]?[1-9]\d{0,2}[.,]\d{3}$/u;

/**
 * The decimal sign that most numbers have; the others are faults where they stand. Thousands are never guessed: where each comma
 * of the file could group them, and where a column mixes "1,234" or "1.234" only with whole numbers below a thousand, it is asked.
 * A single point is a decimal one everywhere else.
 */
export function findDecimalSign(table: CellTable, skipped: ReadonlySet<number>): SignReading {
  const columns = new Map<number, ColumnForms>();
  for (let column = 0; column < table.columnCount; column += 1) {
    if (!skipped.has(column)) columns.set(column, formsOf(table, column));
  }
  const total = (sign: 'comma' | 'point', what: 'count' | 'grouped'): number =>
    [...columns.values()].reduce((sum, forms) => sum + forms[sign][what], 0);
  const [commas, points] = [total('comma', 'count'), total('point', 'count')];
  if (commas === 0 && points === 0) return { sign: 'none', doubt: null };
  const sign = commas > points ? 'comma' : 'point';
  const areAllGrouped = sign === 'comma' && total('comma', 'grouped') === commas;
  for (const [column, forms] of columns) {
    const { count, grouped, first } = forms[sign];
    const isMixed = count > 0 && grouped === count && forms.small > 0 && forms.large === 0;
    if (first !== null && (isMixed || areAllGrouped)) return { sign, doubt: doubtOf(column, first, sign) };
  }
  return { sign, doubt: null };
}

function doubtOf(
  column: number,
  { line, cell }: { readonly line: number; readonly cell: string },
  sign: 'comma' | 'point',
): SignDoubt {
  return {
    line,
    column,
    what: `The ${sign} in ${shown(cell)} may be a decimal sign or stand between thousands: each one here has three digits behind it.`,
    remedy:
      sign === 'comma'
        ? 'Write the file with decimal points and without thousands separators.'
        : 'Write the numbers of this column with equally many decimals, and without thousands separators.',
  };
}

function formsOf({ rows }: CellTable, column: number): ColumnForms {
  const forms: ColumnForms = {
    comma: { count: 0, grouped: 0, first: null },
    point: { count: 0, grouped: 0, first: null },
    small: 0,
    large: 0,
  };
  for (const { line, cells } of rows) {
    const cell = cells[column] ?? '';
    const form = cellForm(cell);
    if (form === 'whole') {
      if (Math.abs(Number(withPlainMinus(cell))) < 1000) forms.small += 1;
      else forms.large += 1;
    } else if (form !== 'other') {
      const sign = forms[form];
      sign.count += 1;
      if (LIKE_THOUSANDS.test(withPlainMinus(cell))) sign.grouped += 1;
      sign.first ??= { line, cell };
    }
  }
  return forms;
}
