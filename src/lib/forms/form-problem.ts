import { ApiError } from '../api';

/** Why a request was refused, as sentences that stand under a form: one a field that the server names, else the reason. */
export function problemSentences(error: unknown): readonly string[] {
  if (!(error instanceof ApiError))
    return ['Something in this page went wrong. What you typed is still here; try again.'];
  const fields = error.problem?.fields ?? [];
  return fields.length > 0 ? fields.map(({ message }) => message) : [error.message];
}

/** What the server holds now, where a change was made against something older; undefined for any other refusal. */
export function conflictingState(error: unknown): unknown {
  return error instanceof ApiError && error.status === 412 ? (error.problem?.current ?? null) : undefined;
}
