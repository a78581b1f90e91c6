import { splitCells } from './cells';
import { commentText } from './comments';
import type { ScanLine } from './lines';
import { cellForm, isSpaceGrouped } from './number-cell';
import type { Delimiter } from './types';

/** Lines that are looked at; all of them are held to what these say. */
const SAMPLE = 200;

/** In the order in which they win where two explain the lines equally well. */
const DELIMITERS = ['tab', 'semicolon', 'pipe', 'comma', 'spaces'] as const;

export type DelimiterReading =
  | { readonly ok: true; readonly delimiter: Delimiter; readonly columnCount: number }
  | { readonly ok: false; readonly line: number; readonly what: string; readonly remedy: string };

interface Candidate {
  readonly delimiter: Delimiter;
  readonly rows: readonly (readonly string[])[];
  /** Rows of which every cell is a number. */
  readonly soundRows: readonly (readonly string[])[];
  /** Cells that are numbers, a row counting one at most. */
  readonly share: number;
}

/** What stands between the cells, and how many cells most rows have; null without a line that begins like a row. */
export function findDelimiter(lines: readonly ScanLine[]): DelimiterReading | null {
  const sample = sampleRows(lines);
  const [first] = sample;
  if (first === undefined) return null;
  const candidates = DELIMITERS.filter((delimiter) => isPossible(delimiter, sample)).map((delimiter) =>
    candidate(delimiter, sample),
  );
  const best = candidates.reduce<Candidate | null>(
    (winner, next) => (winner === null || isBetter(next, winner) ? next : winner),
    null,
  );
  if (best === null) return null;
  if (best.delimiter === 'spaces' && couldBeGrouped(sample)) {
    return {
      ok: false,
      line: first.number,
      what: 'These rows can be read in two ways: commas between the columns and spaces between thousands, or spaces between the columns and decimal commas.',
      remedy: 'Write the file with semicolons between the columns and without thousands separators.',
    };
  }
  return { ok: true, delimiter: best.delimiter, columnCount: commonest(best) };
}

function sampleRows(lines: readonly ScanLine[]): readonly ScanLine[] {
  const begunLikeNumber = firstOf(lines, (text) => /^[|"\s]*[+\-−]?\.?\d/u.test(text));
  if (begunLikeNumber.length > 0) return begunLikeNumber;
  return firstOf(lines, (text) => /\d/u.test(text) && commentText(text, null) === null);
}

function firstOf(lines: readonly ScanLine[], isWanted: (text: string) => boolean): readonly ScanLine[] {
  const found: ScanLine[] = [];
  for (const line of lines) {
    if (found.length === SAMPLE) break;
    if (isWanted(line.text)) found.push(line);
  }
  return found;
}

/** Blanks are no delimiter where something plainer stands on every line: there they group thousands, or fill. */
function isPossible(delimiter: Delimiter, sample: readonly ScanLine[]): boolean {
  if (delimiter !== 'spaces') return true;
  return !['\t', ';', '|'].some((sign) => sample.every(({ text }) => text.trim().includes(sign)));
}

function candidate(delimiter: Delimiter, sample: readonly ScanLine[]): Candidate {
  const rows = sample.map(({ text }) => splitCells(text, delimiter).cells).filter(({ length }) => length > 1);
  const shares = rows.map(numberShare);
  return {
    delimiter,
    rows,
    soundRows: rows.filter((_, at) => shares[at] === 1),
    share: shares.reduce((sum, share) => sum + share, 0),
  };
}

/** A delimiter at the end of each line leaves an empty cell there. */
function numberShare(cells: readonly string[]): number {
  const filled = cells.at(-1) === '' ? cells.slice(0, -1) : cells;
  return filled.filter((cell) => cellForm(cell) !== 'other').length / filled.length;
}

function isBetter(next: Candidate, winner: Candidate): boolean {
  if (next.soundRows.length !== winner.soundRows.length) {
    return next.soundRows.length > winner.soundRows.length;
  }
  return next.share !== winner.share ? next.share > winner.share : next.rows.length > winner.rows.length;
}

function couldBeGrouped(sample: readonly ScanLine[]): boolean {
  return sample.every(({ text }) => {
    const { cells } = splitCells(text, 'comma');
    return (
      cells.length > 1 &&
      cells.some(isSpaceGrouped) &&
      cells.every((cell) => isSpaceGrouped(cell) || cellForm(cell) !== 'other')
    );
  });
}

function commonest({ rows, soundRows }: Candidate): number {
  const counts = new Map<number, number>();
  for (const { length } of soundRows.length > 0 ? soundRows : rows) {
    counts.set(length, (counts.get(length) ?? 0) + 1);
  }
  let [best, most] = [1, 0];
  for (const [length, count] of counts) if (count > most) [best, most] = [length, count];
  return best;
}
