import { toNestErrors } from '@hookform/resolvers';
import {
  type FieldError,
  type FieldValues,
  get,
  type Path,
  type Resolver,
  type ResolverOptions,
} from 'react-hook-form';
import type { z } from 'zod';
import { commaSentence, parseTypedNumber } from '../format';

/** Of a field of a day and a time of which a part is missing. */
export const halfTypedSentence = 'Write the whole of it: day, month, year and time.';

interface Knowledge<Values extends FieldValues> {
  /** The form's name of a part of the request, where that is another one; null where the form has none. */
  readonly fieldOf?: (path: string) => Path<Values> | null;
  /** What the form knows beside the schema, such as what the server will refuse: said with the rest, not once all else is mended. */
  readonly alsoWrong?: (values: Values) => readonly FieldFault<Values>[];
}

interface FieldFault<Values extends FieldValues> {
  readonly field: Path<Values>;
  readonly message: string;
}

/**
 * Holds a form against a request's schema. The form's values stay the text that was typed;
 * `read` makes of them what the schema expects, and the schema's sentence stands at the field it names.
 * A field that holds half a moment has no value as the browser gives it: it is at fault, not empty.
 */
export function schemaResolver<Values extends FieldValues, Output extends FieldValues>(
  schema: z.ZodType<Output>,
  read: (values: Values) => unknown,
  { fieldOf = () => null, alsoWrong = () => [] }: Knowledge<Values> = {},
): Resolver<Values, unknown, Output> {
  return (values, _context, options) => {
    const parsed = schema.safeParse(read(values));
    const others = alsoWrong(values);
    const halfTyped = halfTypedIn(options);
    if (parsed.success && others.length + halfTyped.length === 0) {
      return { values: parsed.data, errors: {} };
    }
    const errors: Record<string, FieldError> = {};
    for (const name of halfTyped) errors[name] = { type: 'form', message: halfTypedSentence };
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

/** The fields that the browser can make nothing of yet. */
function halfTypedIn<Values extends FieldValues>({
  names,
  fields,
}: ResolverOptions<Values>): readonly string[] {
  return (names ?? []).filter((name) => {
    const field: unknown = get(fields, name);
    const ref = typeof field === 'object' && field !== null && 'ref' in field ? field.ref : null;
    return ref instanceof HTMLInputElement && ref.validity.badInput;
  });
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
