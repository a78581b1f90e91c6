import type { z } from 'zod';
import { invalid } from '../errors';

/** The cursor that a page of a list gave, read; null for the first page. @throws ProblemError 400 for one that none gave. */
export function readCursor<S extends z.ZodType>(schema: S, cursor: string | undefined): z.output<S> | null {
  if (cursor === undefined) return null;
  const parsed = schema.safeParse(cursor);
  if (parsed.success) return parsed.data;
  throw invalid([{ path: 'cursor', message: 'This is no cursor that a page of this list gave.' }]);
}
