import { STATUS_CODES } from 'node:http';

export interface FieldFault {
  /** Dotted, as in `plates.0.name`. */
  readonly path: string;
  readonly message: string;
}

interface ProblemParts {
  readonly fields?: readonly FieldFault[];
  /** What the server has now, where the request was made against something older. */
  readonly current?: unknown;
  readonly headers?: Readonly<Record<string, string>>;
}

/** A refusal that the client can act on: it becomes a problem document (RFC 9457) with this stable name as its type. */
export class ProblemError extends Error {
  override readonly name = 'ProblemError';
  readonly type: string;
  readonly title: string;
  constructor(
    readonly code: string,
    readonly status: number,
    readonly detail: string,
    readonly parts: ProblemParts = {},
  ) {
    super(detail);
    this.type = `urn:quarterturn:problem:${code}`;
    this.title = STATUS_CODES[status] ?? 'Error';
  }
}

export const unauthenticated = () =>
  new ProblemError(
    'not-signed-in',
    401,
    'You are not signed in, or your session has ended. Sign in and try again.',
  );

export const forbidden = () =>
  new ProblemError(
    'not-allowed',
    403,
    'Your role in this lab does not allow this. A lead of the lab can change your role.',
  );

/** The same words for what does not exist and for what belongs to a lab that the person cannot see. */
export const notFound = () =>
  new ProblemError('not-found', 404, 'There is nothing at this address, or nothing that you can see.');

export const invalid = (fields: readonly FieldFault[]) =>
  new ProblemError('invalid', 400, fields.map(({ message }) => message).join(' '), { fields });

export const conflict = (code: string, detail: string) => new ProblemError(code, 409, detail);

/** Well formed, and refused for what it says. */
export const refused = (fields: readonly FieldFault[]) =>
  new ProblemError('refused', 422, fields.map(({ message }) => message).join(' '), { fields });

export const unavailable = () =>
  new ProblemError(
    'unavailable',
    503,
    'The database does not answer just now. Nothing was changed. Try again in a moment.',
    {
      headers: { 'Retry-After': '2' },
    },
  );
