import { z } from 'zod';

// Compiling a schema to code asks for eval, which our content security policy refuses and reports.
z.config({ jitless: true });

/** Ids are UUIDs (version 7), opaque to a client. */
export const idSchema = z.uuid();
export const timestampSchema = z.iso.datetime({ offset: true });

const oneLine = /^[^\p{Cc}\p{Cs}]*$/u;
const manyLines = /^(?:[^\p{Cc}\p{Cs}]|[\n\t])*$/u;

/** A short text on one line: trimmed, no control characters, no half of a surrogate pair. */
export function lineSchema(maxLength: number, name: string) {
  return z
    .string(`Write the ${name}.`)
    .trim()
    .min(1, `Write the ${name}.`)
    .max(maxLength, `The ${name} is longer than ${maxLength} characters. Shorten it.`)
    .regex(oneLine, `The ${name} holds a character that cannot be printed. Take it out.`);
}

/** A text that may be empty and may run over lines. */
export function noteSchema(maxLength: number, name: string) {
  return z
    .string(`Write the ${name} as text.`)
    .trim()
    .max(maxLength, `The ${name} is longer than ${maxLength} characters. Shorten it.`)
    .regex(manyLines, `The ${name} holds a character that cannot be printed. Take it out.`);
}

/** As a sentence writes it, with the true minus. */
const bound = (value: number): string => String(value).replaceAll('-', '\u2212');

/**
 * A finite number in an interval, said in words when it is outside. `example` is a value as a person would write it,
 * for whoever wrote no number; a bound is a poor example, so there is none by default.
 */
export function numberSchema(name: string, min: number, max: number, unit: string, example?: string) {
  const range = `${name} is from ${bound(min)} to ${bound(max)}${unit}.`;
  const like = example === undefined ? '' : `, like ${example}`;
  return z.number(`${name} is a number${like}.`).min(min, range).max(max, range);
}

/** A page of a list; `nextCursor` is null on the last one. */
export function pageSchema<Item extends z.ZodType>(item: Item) {
  return z.strictObject({ items: z.array(item), nextCursor: z.string().nullable() });
}

export const pageQuerySchema = z.strictObject({
  cursor: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(50),
});

/** An RFC 9457 problem document. */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  detail: z.string(),
  requestId: z.string(),
  /** The fields at fault, each with one sentence: what is wrong and what to write. `path` is dotted, as in `plates.0.name`. */
  fields: z.array(z.strictObject({ path: z.string(), message: z.string() })).optional(),
  /** What the server has now, where the request was made against something older. */
  current: z.unknown().optional(),
});
export type Problem = z.infer<typeof problemSchema>;
