import type { Problem } from '../../shared/schemas/common';

type Fields = NonNullable<Problem['fields']>;

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function readFields(value: unknown): Fields {
  if (!Array.isArray(value)) return [];
  return value.flatMap((field: unknown) =>
    isRecord(field) && typeof field['path'] === 'string' && typeof field['message'] === 'string'
      ? [{ path: field['path'], message: field['message'] }]
      : [],
  );
}

/**
 * The problem document (RFC 9457) in a refusal's body; null when it is something else, such as a proxy's page.
 * By hand, since a schema library would double the script of the first page.
 */
export function readProblem(text: string): Problem | null {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    return null;
  }
  if (!isRecord(value)) return null;
  const { type, title, status, detail, requestId, fields, current } = value;
  if (typeof type !== 'string' || typeof title !== 'string' || typeof status !== 'number') return null;
  return {
    type,
    title,
    status,
    detail: typeof detail === 'string' ? detail : title,
    requestId: typeof requestId === 'string' ? requestId : '',
    fields: readFields(fields),
    current,
  };
}
