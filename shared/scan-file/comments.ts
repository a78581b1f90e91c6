import { isSheetError } from './number-cell';
import type { Delimiter } from './types';

/** What a comment line says, without its sign; null where the line is none. `delimiter` is null while it is not known yet. */
export function commentText(line: string, delimiter: Delimiter | null): string | null {
  const trimmed = line.trim();
  // A spreadsheet quotes a comment that holds the delimiter.
  const isQuoted = /^"(?:#|%|\/\/)/u.test(trimmed);
  const text = isQuoted ? trimmed.slice(1, trimmed.endsWith('"') ? -1 : undefined) : trimmed;
  if (isSheetError(text)) return null;
  const sign = /^(?:#+|%+|\/{2,})/u.exec(text)?.[0] ?? null;
  if (sign !== null) return text.slice(sign.length).trim();
  return text.startsWith(';') && delimiter !== 'semicolon' ? text.slice(1).trim() : null;
}

/** A line drawn under a header. */
export function isRule(line: string): boolean {
  return /^[-=+|:_\s]+$/u.test(line) && (line.includes('--') || line.includes('=='));
}
