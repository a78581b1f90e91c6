import Papa from 'papaparse';
import { type Convention, conventionTag, readConventionTag, sameConvention } from '../optics/convention';
import { MAX_LENGTH } from '../optics/expression';
import { maxLabelLength, maxTargets } from '../schemas/protocols';
import { type Delimiter, findDelimiter, joinedCells } from './csv-shape';
import { readRow, type RowReading } from './solve-row';
import { translateExpression } from './translate-expression';

/** The longest text that is read, in bytes as UTF-8. */
export const MAX_CSV_BYTES = 1_000_000;

/** A text that goes on being wrong isn't one of targets. */
const MOST_PROBLEMS = 2 * maxTargets;

export interface CsvRow {
  /** The line of the text on which the row begins, from 1. */
  readonly line: number;
  readonly label: string;
  readonly expression: string;
  /** The expression read as what the protocol holds; null where it can't be, and a problem says why. */
  readonly reading: RowReading | null;
}

export interface CsvProblem {
  readonly line: number;
  /** One sentence or two, with the column inside the expression where that is what is wrong. */
  readonly message: string;
}

export interface CsvReading {
  /** The convention that the file names, where it is another than the lab's: its rows were translated out of it. */
  readonly translatedFrom: Convention | null;
  readonly rows: readonly CsvRow[];
  readonly problems: readonly CsvProblem[];
  /** Lines that hold something and gave no row; a problem names each. */
  readonly leftOut: number;
}

export interface CsvTarget {
  readonly kind: 'state' | 'unitary';
  readonly convention: Convention;
}

/**
 * Reads pasted or uploaded targets: a label and an expression a line, or expressions alone. Comma, semicolon or tab between
 * them, quotes as in RFC 4180, lines that begin with # left out, a header with the word "expression" optional. Commas inside an
 * expression's brackets need no quotes. Cells are text and nothing else, whatever a spreadsheet would make of them.
 * Never throws. At most `maxTargets` rows, twice as many problems and `MAX_CSV_BYTES`, with a problem that says what was left out;
 * nothing behind them is read.
 */
export function readTargetCsv(text: string, target: CsvTarget): CsvReading {
  if (isLongerThan(text, MAX_CSV_BYTES)) {
    const message = 'This text is longer than 1 MB. Read it in parts.';
    return { translatedFrom: null, rows: [], problems: [{ line: 1, message }], leftOut: 0 };
  }
  const plain = text.startsWith('\ufeff') ? text.slice(1) : text;
  const reader = new Reader(target, namedConvention(plain));
  takeRecords(plain, (record) => reader.take(record));
  return reader.reading();
}

interface NamedConvention {
  readonly line: number;
  /** Null where the words are no convention's. */
  readonly convention: Convention | null;
}

const NAMES_CONVENTION = /^#\s*convention:(?<words>.*)$/iu;

/** What the comment lines at the head of a text say of its convention. */
function namedConvention(text: string): NamedConvention | null {
  for (const [index, line] of text
    .slice(0, 2000)
    .split(/\r\n|\n|\r/u)
    .entries()) {
    if (!line.startsWith('#')) return null;
    const words = NAMES_CONVENTION.exec(line)?.groups?.['words'];
    if (words !== undefined) return { line: index + 1, convention: readConventionTag(words) };
  }
  return null;
}

interface CsvRecord {
  readonly line: number;
  readonly cells: readonly string[];
  readonly delimiter: Delimiter;
  readonly fault: string | null;
}

/** Gives one record after the other until no more are wanted. */
function takeRecords(text: string, take: (record: CsvRecord) => boolean): void {
  const delimiter = findDelimiter(text);
  const newline = text.includes('\r\n') ? '\r\n' : text.includes('\n') ? '\n' : '\r';
  let at = 0;
  let line = 1;
  let taken = 0;
  Papa.parse<string[]>(text, {
    delimiter,
    newline,
    comments: '#',
    step: ({ data, errors, meta }, parser) => {
      const end = meta.cursor;
      const ended = text.startsWith(newline, end - newline.length) && end > at ? 1 : 0;
      const before = line;
      line += occurrences(text, newline, at, end);
      at = end;
      const inside = data.reduce((sum, cell) => sum + occurrences(cell, newline, 0, cell.length), 0);
      const fault = errors.some(({ type }) => type === 'Quotes')
        ? 'A quote is not closed, or text stands behind one. Double the quotes inside a quoted cell.'
        : null;
      taken += 1;
      const wanted = take({ line: Math.max(before, line - ended - inside), cells: data, delimiter, fault });
      if (!wanted || taken > 50 * maxTargets) parser.abort();
    },
  });
}

function occurrences(text: string, part: string, from: number, to: number): number {
  let count = 0;
  for (let at = text.indexOf(part, from); at !== -1 && at < to; at = text.indexOf(part, at + part.length))
    count += 1;
  return count;
}

/** Where the two columns are, of how many. */
interface Layout {
  readonly label: number | null;
  readonly expression: number;
  readonly count: number;
  /** The header that `writeTargetCsv` writes: its cells are taken as they are, to the last space. */
  readonly isOurs: boolean;
}

class Reader {
  private readonly rows: CsvRow[] = [];
  private readonly problems: CsvProblem[] = [];
  private layout: Layout | null = null;
  private isFirst = true;
  private leftOut = 0;

  private readonly translatedFrom: Convention | null;

  constructor(
    private readonly target: CsvTarget,
    named: NamedConvention | null,
  ) {
    const { convention = null } = named ?? {};
    this.translatedFrom =
      convention === null || sameConvention(convention, target.convention) ? null : convention;
    if (named !== null && convention === null) {
      this.problem(
        named.line,
        'This line names a convention in words that are not known; the rows are read in your lab’s. Write it as kz-wt receiver L.',
      );
    }
  }

  reading(): CsvReading {
    return {
      translatedFrom: this.translatedFrom,
      rows: this.rows,
      problems: this.problems,
      leftOut: this.leftOut,
    };
  }

  /** @returns whether there is room for more. */
  take(record: CsvRecord): boolean {
    const { line, cells, fault } = record;
    if (cells.every((cell) => cell.trim() === '')) return true;
    if (this.isFirst) {
      this.isFirst = false;
      this.layout = headerOf(cells);
      if (this.layout !== null) return true;
    }
    if (this.rows.length === maxTargets) {
      this.problem(
        line,
        `A protocol has at most ${maxTargets} targets; this row and those below are left out.`,
      );
      return false;
    }
    if (this.problems.length >= MOST_PROBLEMS) {
      this.problem(line, 'So many lines can’t be read that this row and those below are left out.');
      return false;
    }
    if (fault !== null) this.leave(line, fault);
    else this.row(record);
    return true;
  }

  private row({ line, cells, delimiter }: CsvRecord): void {
    const found = this.layout === null ? bareRow(cells, delimiter) : headedRow(cells, this.layout, delimiter);
    if (typeof found === 'string') {
      this.leave(line, found);
      return;
    }
    const exact = this.layout?.isOurs === true;
    const label = withoutGuard(exact ? found.label : found.label.trim());
    const written = withoutGuard(exact ? found.expression : found.expression.trim());
    const expression = this.inOurs(written);
    if (expression.length > MAX_LENGTH) {
      this.leave(line, `This expression has ${expression.length} characters; the most is ${MAX_LENGTH}.`);
      return;
    }
    if (label.length > maxLabelLength) {
      this.problem(line, `A label has at most ${maxLabelLength} characters. This one was cut.`);
    }
    const { kind, convention } = this.target;
    const read = readRow(expression, kind === 'state' ? 'prepare' : 'apply', convention);
    if (!read.ok) {
      this.problem(line, `Column ${read.error.column} of the expression: ${read.error.message}`);
    }
    this.rows.push({ line, label: cutLabel(label), expression, reading: read.ok ? read.reading : null });
  }

  private inOurs(expression: string): string {
    if (this.translatedFrom === null || expression.length > MAX_LENGTH) return expression;
    const { kind, convention } = this.target;
    const protocolKind = kind === 'state' ? 'prepare' : 'apply';
    return translateExpression(expression, protocolKind, this.translatedFrom, convention);
  }

  private leave(line: number, message: string): void {
    this.leftOut += 1;
    this.problem(line, `${message} The row is left out.`);
  }

  private problem(line: number, message: string): void {
    this.problems.push({ line, message });
  }
}

/** No longer than the schema takes, and no character cut in half. */
function cutLabel(label: string): string {
  let cut = '';
  for (const character of label) {
    if (cut.length + character.length > maxLabelLength) return cut;
    cut += character;
  }
  return cut;
}

/** What a column of expressions is called in files of others; none of the words is an expression itself. */
const EXPRESSION_HEADS: readonly string[] = ['expression', 'target', 'state', 'unitary'];

function headerOf(cells: readonly string[]): Layout | null {
  const names = cells.map((cell) => cell.trim().toLowerCase());
  const expression = names.findIndex((name) => EXPRESSION_HEADS.includes(name));
  if (expression === -1) return null;
  const label = names.indexOf('label');
  const isOurs = cells.length === 2 && cells[0] === 'label' && cells[1] === 'expression';
  return { label: label === -1 ? null : label, expression, count: cells.length, isOurs };
}

interface Cells {
  readonly label: string;
  readonly expression: string;
}

function bareRow(cells: readonly string[], delimiter: Delimiter): Cells {
  const [first = '', ...rest] = cells;
  if (rest.length === 0) return { label: '', expression: first };
  const joined = joinedCells(cells, delimiter);
  return joined.length === 1
    ? { label: '', expression: joined[0] ?? '' }
    : { label: joined[0] ?? '', expression: joined.slice(1).join(delimiter) };
}

function headedRow(
  cells: readonly string[],
  { label, expression, count, isOurs }: Layout,
  delimiter: Delimiter,
): Cells | string {
  const whole = isOurs && cells.length === 2 ? cells : joinedCells(cells, delimiter);
  const text = whole[expression];
  if (text === undefined || text.trim() === '') return 'This row has no expression.';
  if (whole.slice(count).some((cell) => cell.trim() !== ''))
    return `This row has ${whole.length} cells under a header of ${count}. Quote a cell that holds a separator.`;
  return { label: label === null ? '' : (whole[label] ?? ''), expression: text };
}

/*
 * A spreadsheet takes a cell that begins with = + − @ for a formula, and a text for one that begins with an apostrophe. A
 * written file holds the apostrophe, a read one loses it, and cells that have one of their own get a second: exact both ways.
 */
const FORMULA_LIKE = /^'*[=+\-@\t\r]/u;

function withGuard(cell: string): string {
  return FORMULA_LIKE.test(cell) ? `'${cell}` : cell;
}

function withoutGuard(cell: string): string {
  return cell.startsWith("'") && FORMULA_LIKE.test(cell) ? cell.slice(1) : cell;
}

/** Targets as CSV text by RFC 4180 with a header, their convention named above it; `readTargetCsv` reads it back exactly. */
export function writeTargetCsv(
  rows: readonly Pick<CsvRow, 'label' | 'expression'>[],
  convention: Convention,
): string {
  const cells = rows.map(({ label, expression }) => [withGuard(label), withGuard(expression)]);
  const lines = [`# convention: ${conventionTag(convention)}`, 'label,expression', ...cells.map(quoted)];
  return `${lines.join('\r\n')}\r\n`;
}

function quoted(cells: readonly string[]): string {
  return cells.map((cell) => `"${cell.replaceAll('"', '""')}"`).join(',');
}

function isLongerThan(text: string, bytes: number): boolean {
  if (text.length > bytes) return true;
  let size = 0;
  for (const character of text) {
    const code = character.codePointAt(0) ?? 0;
    size += code < 0x80 ? 1 : code < 0x800 ? 2 : code < 0x1_0000 ? 3 : 4;
  }
  return size > bytes;
}
