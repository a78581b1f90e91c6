import type { ComparedRow } from './compared-rows';
import { flagWords, phaseWords } from './flag-words';
import type { WrittenKind } from './address';

interface Comparison {
  readonly kind: WrittenKind;
  readonly source: string;
  /** "IEEE, source view": what it was typed in. */
  readonly writtenIn: string;
  /** What everyone agrees on, in sentences. */
  readonly facts: readonly string[];
  readonly rows: readonly ComparedRow[];
}

/** A cell of a comma-separated file, quoted where it has to be. */
function cell(text: string): string {
  return /[",\r\n]/u.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

const line = (cells: readonly string[]) => cells.map(cell).join(',');

/**
 * The whole comparison as lines of comma-separated values, one convention a line and each with its name and flags; what
 * all agree on stands above as lines that begin with #. Numbers are ASCII.
 */
export function comparisonText({ kind, source, writtenIn, facts, rows }: Comparison): string {
  const [first] = rows;
  const columns = (first?.parts ?? []).flatMap(({ name, values }) =>
    values.map(({ label }) => (values.length === 1 ? name : `${name} ${label}`)),
  );
  const body = rows.map(({ name, convention, parts }) => [
    name,
    phaseWords(convention.phase),
    convention.handedness,
    convention.s3Sign,
    ...parts.flatMap(({ values }) => values.map(({ plain }) => plain)),
  ]);
  return [
    `# One ${kind} in every convention: ${source.trim()}`,
    `# typed in: ${writtenIn}`,
    ...facts.map((fact) => `# ${fact}`),
    line(['convention', 'phase', 'hands named from', '+S3 is', ...columns]),
    ...body.map(line),
    '',
  ].join('\n');
}

/** "IEEE, source view (ωt − kz, source, + is R)". */
export function writtenInWords(row: ComparedRow): string {
  return `${row.name} (${flagWords(row.convention)})`;
}
