import { toNestErrors } from '@hookform/resolvers';
import type { FieldError, FieldValues, Path, Resolver } from 'react-hook-form';
import type { z } from 'zod';

/**
 * Holds a form against a request's schema. The form's values stay the text that was typed;
 * `read` makes of them what the schema expects, and the schema's sentence stands at the field it names.
 * Where a part of the request has another field's name in the form, `fieldOf` says which.
 */
export function schemaResolver<Values extends FieldValues, Output extends FieldValues>(
  schema: z.ZodType<Output>,
  read: (values: Values) => unknown,
  fieldOf: (path: string) => Path<Values> | null = () => null,
): Resolver<Values, unknown, Output> {
  return (values, _context, options) => {
    const parsed = schema.safeParse(read(values));
    if (parsed.success) return { values: parsed.data, errors: {} };
    const errors: Record<string, FieldError> = {};
    for (const issue of parsed.error.issues) {
      const path = issue.path.map(String).join('.');
      errors[fieldOf(path) ?? path] ??= { type: issue.code, message: issue.message };
    }
    return { values: {}, errors: toNestErrors(errors, options) };
  };
}
