import type { Request } from 'express';
import { ProblemError } from '../errors';

export function etagOf(revision: number): string {
  return `"r${revision}"`;
}

/**
 * The revision that a writer saw, from If-Match (RFC 9110, 13.1.1: compared strongly, so a weak tag matches nothing).
 * @throws ProblemError 428 where the header is missing and needed.
 */
export function expectedRevision(request: Request, needed: boolean): number | null {
  const header = request.get('If-Match');
  if (header === undefined) {
    if (!needed) return null;
    throw new ProblemError(
      'precondition-required',
      428,
      'Say which revision this change was made against: send its ETag as If-Match.',
    );
  }
  const revision = /^"r(\d{1,9})"$/.exec(header.trim())?.[1];
  return revision === undefined ? null : Number(revision);
}

/** @throws ProblemError 412 with what is stored now, so that a person can see both sides. */
export function requireRevision(expected: number | null, stored: number, current: unknown): void {
  if (expected === stored) return;
  throw new ProblemError(
    'changed-meanwhile',
    412,
    'Someone else saved this after you opened it. Nothing was overwritten: compare both, then save again.',
    { current, headers: { ETag: etagOf(stored) } },
  );
}
