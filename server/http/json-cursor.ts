import { z } from 'zod';

/**
 * A cursor of a list that is sorted by something that need not be unique: what the last item of a page was sorted by,
 * and its id. @returns the schema that reads one, as `writeCursor` wrote it.
 */
export function jsonCursor<Value extends z.ZodType>(value: Value) {
  const place = z.strictObject({ value, id: z.uuid() });
  return z.string().transform((text, context): z.output<typeof place> => {
    const parsed = place.safeParse(readJson(text));
    if (parsed.success) return parsed.data;
    context.addIssue({ code: 'custom', message: 'no cursor' });
    return z.NEVER;
  });
}

export function writeCursor(place: { readonly value: string | number; readonly id: string }): string {
  return Buffer.from(JSON.stringify(place)).toString('base64url');
}

function readJson(text: string): unknown {
  try {
    return JSON.parse(Buffer.from(text, 'base64url').toString());
  } catch {
    // No JSON is no cursor: the schema says so.
    return null;
  }
}
