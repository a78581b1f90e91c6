import type { Problem } from '../../shared/schemas/common';
import { readProblem } from './problem';

/** A request that the server refused or that never arrived; carries the problem document where there is one. */
export class ApiError extends Error {
  readonly status: number;
  readonly problem: Problem | null;

  constructor(status: number, problem: Problem | null, message: string) {
    super(message);
    this.name = 'ApiError';
    this.status = status;
    this.problem = problem;
  }
}

interface RequestOptions {
  readonly method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  readonly body?: unknown;
  /** The revision that the change was made against. */
  readonly ifMatch?: number;
  /** Names a creating call, so that a retry of it creates nothing twice. */
  readonly idempotencyKey?: string;
  readonly signal?: AbortSignal;
  /** Lets the call outlive the page that made it. */
  readonly keepalive?: boolean;
}

/** A key for one creating call, kept through its retries. `crypto.randomUUID` is absent on plain http. */
export function newIdempotencyKey(): string {
  return [...crypto.getRandomValues(new Uint8Array(16))]
    .map((byte) => byte.toString(16).padStart(2, '0'))
    .join('');
}

/**
 * One call of our own API. The response is what the schema of that route says: the server checks it against the schema,
 * so the client takes the type without parsing again.
 * @throws ApiError with the problem document, or with status 0 when the network failed.
 */
export async function request<Response>(path: string, options: RequestOptions = {}): Promise<Response> {
  const { method = 'GET', body, ifMatch, idempotencyKey, signal, keepalive = false } = options;
  const headers: Record<string, string> = { accept: 'application/json' };
  if (body !== undefined) headers['content-type'] = 'application/json';
  if (ifMatch !== undefined) headers['if-match'] = `"r${ifMatch}"`;
  if (idempotencyKey !== undefined) headers['idempotency-key'] = idempotencyKey;
  let answer: globalThis.Response;
  try {
    answer = await fetch(`/api/v1${path}`, {
      method,
      headers,
      credentials: 'same-origin',
      keepalive,
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
      ...(signal === undefined ? {} : { signal }),
    });
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw new ApiError(
      0,
      null,
      'The server cannot be reached. Check the network; what you typed is still here.',
    );
  }
  const text = await answer.text();
  if (!answer.ok) throw refusal(answer.status, text);
  return parse<Response>(text);
}

// The server has checked its answer against the schema that the caller's type is inferred from; the client trusts it.
// eslint-disable-next-line @typescript-eslint/no-unnecessary-type-parameters -- see above
function parse<Response>(text: string): Response {
  // eslint-disable-next-line @typescript-eslint/no-unsafe-return -- see above
  return JSON.parse(text === '' ? 'null' : text);
}

/** What an answer that is no success says. */
export function refusal(status: number, text: string): ApiError {
  const problem = readProblem(text);
  return new ApiError(
    status,
    problem,
    problem?.detail ?? `The server answered ${status} and gave no reason.`,
  );
}
