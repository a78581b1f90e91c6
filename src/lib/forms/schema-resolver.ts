import { toNestErrors } from '@hookform/resolvers';
import { type FieldError, type FieldValues, get, type Path, type Resolver } from 'react-hook-form';
import type { z } from 'zod';
import { commaSentence, parseTypedNumber } from '../format';

interface FieldFault<Values extends FieldValues> {
  readonly field: Path<Values>;
  readonly message: string;
}

/**
 * Holds a form against a request's schema. The form's values stay the text that was typed;
 * `read` makes of them what the schema expects, and the schema's sentence stands at the field it names.
 * Where a part of the request has another field's name in the form, `fieldOf` says which. `alsoWrong` is what the form knows
 * beside the schema, such as what the server will refuse: it is said at the same time, not once all else is mended.
 */
export function schemaResolver<Values extends FieldValues, Output extends FieldValues>(
  schema: z.ZodType<Output>,
  read: (values: Values) => unknown,
  fieldOf: (path: string) => Path<Values> | null = () => null,
  alsoWrong: (values: Values) => readonly FieldFault<Values>[] = () => [],
): Resolver<Values, unknown, Output> {
  return (values, _context, options) => {
    const parsed = schema.safeParse(read(values));
    const others = alsoWrong(values);
    if (parsed.success && others.length === 0) return { values: parsed.data, errors: {} };
    const errors: Record<string, FieldError> = {};
    for (const issue of parsed.error?.issues ?? []) {
      const path = issue.path.map(String).join('.');
      const field = fieldOf(path) ?? path;
      const typed: unknown = get(values, field);
      const message = wantsNumber(issue) && hasComma(typed) ? commaSentence(typed) : issue.message;
      errors[field] ??= { type: issue.code, message };
    }
    for (const { field, message } of others) {
      const name: string = field;
      errors[name] ??= { type: 'form', message };
    }
    return { values: {}, errors: toNestErrors(errors, options) };
  };
}

function wantsNumber(issue: z.core.$ZodIssue): boolean {
  return issue.code === 'invalid_type' && issue.expected === 'number';
}

/** The schema sees no more than that there was no number; what was typed tells why. */
function hasComma(typed: unknown): typed is string {
  if (typeof typed !== 'string') return false;
  const number = parseTypedNumber(typed);
  return !number.ok && number.fault === 'comma';
}
