import type { z } from 'zod';
import { invalid, notFound, type FieldFault } from '../errors';

/** A path's parts. One that could not name anything is answered like one that names nothing. */
export function readParams<P extends z.ZodType>(schema: P, params: unknown): z.output<P> {
  const parsed = schema.safeParse(params);
  if (!parsed.success) throw notFound();
  return parsed.data;
}

/**
 * A query or a body against its schema; the parsed value is all that anyone sees after this.
 * @throws ProblemError 400 with every field at fault.
 */
export function readInput<S extends z.ZodType>(schema: S, value: unknown): z.output<S> {
  const parsed = schema.safeParse(value);
  if (!parsed.success) throw invalid(parsed.error.issues.flatMap(faultsOf));
  return parsed.data;
}

function faultsOf(issue: z.core.$ZodIssue): FieldFault[] {
  const at = issue.path.map(String);
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.map((key) => ({
      path: [...at, key].join('.').slice(0, 200),
      message: 'There is no such field. Leave it out.',
    }));
  }
  if (issue.code === 'invalid_type' && at.length === 0) {
    const message =
      issue.expected === 'undefined'
        ? 'This address takes no body. Send none.'
        : 'The request needs a JSON object as its body.';
    return [{ path: '', message }];
  }
  return [{ path: at.join('.').slice(0, 200), message: issue.message }];
}
