import 'express-session';

/** A sign-in that has been sent to the provider and not yet come back. */
export interface PendingSignIn {
  readonly verifier: string;
  readonly returnTo: string;
  readonly startedAt: number;
}

declare module 'express-session' {
  interface SessionData {
    /** Set at sign-in, together with the two below. Name, role and rights are read anew for each request. */
    userId: string;
    /** The person's session epoch when they signed in; a later one ends this session. */
    epoch: number;
    /** Milliseconds since 1970: 24 h after this the session ends, however busy. */
    signedInAt: number;
    /** By nonce. */
    pending: Record<string, PendingSignIn>;
  }
}
