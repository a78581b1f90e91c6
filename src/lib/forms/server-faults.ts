import type { FieldValues, Path, UseFormSetError } from 'react-hook-form';
import { ApiError } from '../api';

/** What the server found at one part of a request; null where it found nothing there. */
export function serverFaultAt(error: unknown, path: string): string | null {
  if (!(error instanceof ApiError)) return null;
  return error.problem?.fields?.find((fault) => fault.path === path)?.message ?? null;
}

/**
 * Puts what the server found at the fields it names, for what no schema can see: a name that is taken, a plate that
 * stands elsewhere. `fieldOf` gives the form's name of a part of the request, or null where the form has none.
 * @returns whether every fault found its field, so that nothing is left to say under the form.
 */
export function showServerFaults<Values extends FieldValues>(
  error: unknown,
  setError: UseFormSetError<Values>,
  fieldOf: (path: string) => Path<Values> | null,
): boolean {
  const faults = error instanceof ApiError ? (error.problem?.fields ?? []) : [];
  const places = faults.map(({ path, message }) => ({ field: fieldOf(path), message }));
  for (const { field, message } of places) {
    if (field !== null) setError(field, { type: 'server', message }, { shouldFocus: true });
  }
  return places.length > 0 && places.every(({ field }) => field !== null);
}
