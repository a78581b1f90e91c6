import { createHash } from 'node:crypto';
import type { Request } from 'express';
import { z } from 'zod';
import { sortedJson } from '../../shared/protocol/canonical-json';
import type { Transaction } from '../db/database';
import { ProblemError } from '../errors';
import type { Answer } from './route';

const keyPattern = /^[\x21-\x7e]{8,200}$/;
const storedRow = z.object({
  request_hash: z.string(),
  status: z.number(),
  headers: z.string(),
  body: z.string(),
});
const storedHeaders = z.object({ etag: z.string().nullable() });
const tried = z.object({ rows: z.array(z.object({ free: z.boolean() })).length(1) });

/** Long enough for a tablet that was off the network for a month (quality.md B1: at least 30 days). */
const keptForDays = 60;

/** @throws ProblemError 400 where a creating call brings no usable key. */
export function idempotencyKey(request: Request): string {
  const key = request.get('Idempotency-Key');
  if (key !== undefined && keyPattern.test(key)) return key;
  throw new ProblemError(
    'idempotency-key-required',
    400,
    'A call that creates something needs an Idempotency-Key of 8 to 200 printable characters, the same one at each repeat.',
  );
}

/** What makes two requests the same one: where it went, against what, and what it said. */
export function requestHash(request: Request, body: unknown): string {
  const text = sortedJson({
    method: request.method,
    path: request.originalUrl,
    match: request.get('If-Match') ?? null,
    body: body instanceof Uint8Array ? createHash('sha256').update(body).digest('hex') : (body ?? null),
  });
  return createHash('sha256').update(text).digest('hex');
}

/**
 * Does the work once for a key: claim, work and stored answer are one transaction, so a repeat either finds the whole
 * or nothing. Work that only says how it goes on outside claims nothing yet. A repeat in flight gets 409 at once instead of waiting in a queue.
 */
export async function once<Unfinished extends { readonly outside: unknown }>(
  transaction: Transaction,
  claim: { readonly userId: string; readonly key: string; readonly requestHash: string },
  work: () => Promise<Answer | Unfinished>,
): Promise<Answer | Unfinished> {
  const lock: unknown = await transaction.raw(
    'select pg_try_advisory_xact_lock(hashtextextended(?, 2)) as free',
    [`${claim.userId} ${claim.key}`],
  );
  if (tried.parse(lock).rows[0]?.free !== true) {
    throw new ProblemError(
      'still-working',
      409,
      'This very request is still being worked on. Try again in a moment.',
      {
        headers: { 'Retry-After': '1' },
      },
    );
  }
  const found: unknown = await transaction('idempotency_keys')
    .where({ user_id: claim.userId, key: claim.key })
    .first('request_hash', 'status', 'headers', 'body');
  if (found !== undefined) {
    const stored = storedRow.parse(found);
    if (stored.request_hash !== claim.requestHash) {
      throw new ProblemError(
        'idempotency-key-reused',
        422,
        'This Idempotency-Key was used for another request. Make a new key.',
      );
    }
    const body: unknown = JSON.parse(stored.body);
    return { status: stored.status, etag: storedHeaders.parse(JSON.parse(stored.headers)).etag, body };
  }
  const answer = await work();
  if ('outside' in answer) return answer;
  await transaction('idempotency_keys').insert({
    user_id: claim.userId,
    key: claim.key,
    request_hash: claim.requestHash,
    status: answer.status,
    headers: JSON.stringify({ etag: answer.etag }),
    body: JSON.stringify(answer.body ?? null),
  });
  await transaction('idempotency_keys')
    .where({ user_id: claim.userId })
    .where('created_at', '<', transaction.raw(`now() - make_interval(days => ?)`, [keptForDays]))
    .delete();
  return answer;
}
