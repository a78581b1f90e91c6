import { randomBytes } from 'node:crypto';
import type { Request } from 'express';
import { returnTo } from './return-to';
import { saveSession } from './session';
import type { PendingSignIn } from './session-data';

const maxPending = 8;
const maxAgeMs = 10 * 60 * 1000;

type Stored = (error: Error | null, state?: string) => void;
type Verified = (error: Error | null, verifier?: string | false, state?: unknown) => void;

/**
 * Passport's store of OAuth state: one entry in the browser's own session for each sign-in under way, so that two
 * tabs don't undo each other. The number of parameters of both methods is how passport-oauth2 knows this kind of store.
 */
export class PendingSignIns {
  store(request: Request, verifier: string, _state: unknown, _meta: unknown, done: Stored): void {
    const nonce = randomBytes(32).toString('base64url');
    const entry = { verifier, returnTo: returnTo(request.query['returnTo']), startedAt: Date.now() };
    const newest = live(request).slice(-(maxPending - 1));
    request.session.pending = Object.fromEntries([...newest, [nonce, entry]]);
    // The redirect must not reach the browser before the entry reaches the database.
    saveSession(request).then(
      () => done(null, nonce),
      (error: unknown) => done(asError(error)),
    );
  }

  verify(request: Request, nonce: unknown, done: Verified): void {
    const pending = Object.fromEntries(live(request));
    if (typeof nonce !== 'string' || !Object.hasOwn(pending, nonce)) {
      done(null, false, { message: 'stale' });
      return;
    }
    const entry = pending[nonce];
    // Used up, whatever comes next: a second callback with the same state finds nothing.
    request.session.pending = Object.fromEntries(Object.entries(pending).filter(([key]) => key !== nonce));
    saveSession(request).then(
      () => done(null, entry?.verifier ?? false, { returnTo: entry?.returnTo ?? '/' }),
      (error: unknown) => done(asError(error)),
    );
  }
}

function live(request: Request): [string, PendingSignIn][] {
  return Object.entries(request.session.pending ?? {}).filter(
    ([, { startedAt }]) => Math.abs(Date.now() - startedAt) <= maxAgeMs,
  );
}

function asError(error: unknown): Error {
  return error instanceof Error ? error : new Error('the session could not be saved');
}
