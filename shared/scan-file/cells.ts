import Papa from 'papaparse';
import type { Delimiter } from './types';

export const DELIMITER_SIGNS = { comma: ',', semicolon: ';', tab: '\t', pipe: '|', spaces: ' ' } as const;

export interface SplitLine {
  readonly cells: readonly string[];
  /** Whether a quote is not closed on the line, or text stands behind one. */
  readonly isQuoteBroken: boolean;
}

/** The cells of one line, trimmed (of no-break spaces too), quotes as in RFC 4180. */
export function splitCells(line: string, delimiter: Delimiter): SplitLine {
  const text = delimiter === 'pipe' ? withoutFrame(line) : line;
  if (text.includes('"')) return splitQuoted(text, delimiter);
  const cells = delimiter === 'spaces' ? splitSpaces(text) : text.split(DELIMITER_SIGNS[delimiter]);
  return { cells: cells.map((cell) => cell.trim()), isQuoteBroken: false };
}

/** Runs of blanks are one delimiter; a no-break space is none. */
function splitSpaces(text: string): readonly string[] {
  return text.split(/[ \t]+/u).filter((cell) => cell !== '');
}

/** A drawn table has a pipe at both ends of its lines. */
function withoutFrame(line: string): string {
  const text = line.trim();
  if (!text.startsWith('|')) return text;
  return text.endsWith('|') && text.length > 1 ? text.slice(1, -1) : text.slice(1);
}

function splitQuoted(text: string, delimiter: Delimiter): SplitLine {
  const isSpaced = delimiter === 'spaces';
  const { data, errors } = Papa.parse<string[]>(isSpaced ? text.trim().replaceAll('\t', ' ') : text, {
    delimiter: DELIMITER_SIGNS[delimiter],
    newline: '\n',
  });
  const cells = (data[0] ?? []).map((cell) => cell.trim());
  return {
    cells: isSpaced ? cells.filter((cell) => cell !== '') : cells,
    isQuoteBroken: errors.some(({ type }) => type === 'Quotes'),
  };
}
