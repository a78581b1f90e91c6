import { createHash, randomBytes, timingSafeEqual } from 'node:crypto';
import type { Person } from './people';

/** GitHub documents that an authorization code lasts ten minutes. */
const CODE_LIFE_MS = 10 * 60 * 1000;

/** What somebody agreed to on the page, waiting for the application to collect it. */
export interface Grant {
  readonly person: Person;
  readonly redirectUri: string;
  readonly scopes: readonly string[];
  /** The S256 challenge of RFC 7636, when the application sent one. */
  readonly codeChallenge: string | undefined;
}

export interface Token {
  readonly person: Person;
  readonly scopes: readonly string[];
}

export interface Grants {
  /** Answers a new single-use code for the grant. */
  readonly issueCode: (grant: Grant) => string;
  /** Answers the grant and spends the code, also when the exchange then fails; undefined when unknown, spent or too old. */
  readonly spendCode: (code: string) => Grant | undefined;
  readonly issueToken: (token: Token) => string;
  readonly findToken: (value: string) => Token | undefined;
}

/** Codes and tokens of one running stand-in, in memory: they are gone when it stops. */
export function createGrants(now: () => number): Grants {
  const codes = new Map<string, { readonly grant: Grant; readonly issuedAt: number }>();
  const tokens = new Map<string, Token>();
  return {
    issueCode(grant) {
      const code = randomBytes(20).toString('hex');
      codes.set(code, { grant, issuedAt: now() });
      return code;
    },
    spendCode(code) {
      const held = codes.get(code);
      codes.delete(code);
      return held === undefined || now() - held.issuedAt > CODE_LIFE_MS ? undefined : held.grant;
    },
    issueToken(token) {
      const value = `gho_${randomBytes(27).toString('base64url')}`;
      tokens.set(value, token);
      return value;
    },
    findToken: (value) => tokens.get(value),
  };
}

/** Whether the verifier hashes to the challenge (RFC 7636, S256); a grant made without a challenge needs none. */
export function verifierFits(challenge: string | undefined, verifier: string | undefined): boolean {
  if (challenge === undefined) return true;
  if (verifier === undefined) return false;
  return sameSecret(createHash('sha256').update(verifier).digest('base64url'), challenge);
}

/** Compares without telling by its time how much fitted. */
export function sameSecret(given: string, expected: string): boolean {
  const hash = (text: string): Buffer => createHash('sha256').update(text).digest();
  return timingSafeEqual(hash(given), hash(expected));
}
