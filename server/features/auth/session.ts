import type { Request, RequestHandler, Response } from 'express';
import session, { type Store } from 'express-session';
import type { Config } from '../../config';
import './session-data';

/** `__Host-`: the browser takes it only over TLS, for this very host and the whole of it. */
export function cookieName(secure: boolean): string {
  return secure ? '__Host-qt' : 'qt';
}

export function sessionHandler(
  config: Pick<Config, 'secure' | 'sessionSecret'>,
  store: Store,
): RequestHandler {
  return session({
    name: cookieName(config.secure),
    secret: config.sessionSecret,
    store,
    resave: false,
    saveUninitialized: false,
    rolling: false,
    cookie: { path: '/', httpOnly: true, sameSite: 'lax', secure: config.secure, maxAge: 24 * 3600 * 1000 },
  });
}

// express-session sends the headers before it has saved, so whoever changes a session saves it first and answers then.

export function saveSession(request: Request): Promise<void> {
  return new Promise((resolve, reject) => {
    request.session.save((error: unknown) => settle(error, resolve, reject));
  });
}

/** A new id, and an empty session under it; the old one is dead. */
export function regenerateSession(request: Request): Promise<void> {
  return new Promise((resolve, reject) => {
    request.session.regenerate((error: unknown) => settle(error, resolve, reject));
  });
}

export async function endSession(request: Request, response: Response, secure: boolean): Promise<void> {
  await new Promise<void>((resolve, reject) => {
    request.session.destroy((error: unknown) => settle(error, resolve, reject));
  });
  response.clearCookie(cookieName(secure), { path: '/', httpOnly: true, sameSite: 'lax', secure });
}

function settle(error: unknown, resolve: () => void, reject: (reason: Error) => void): void {
  if (error === undefined || error === null) resolve();
  else reject(error instanceof Error ? error : new Error('the session store failed'));
}
