import type { Request } from 'express';
import type { AuthorizationRequest } from './page';

/** A named text field of a query, a form or a JSON object; undefined when absent, empty, repeated or not text. */
export type Fields = (name: string) => string | undefined;

/** The fields of an address's query. */
export function queryFields(request: Request): Fields {
  const query = new URL(request.originalUrl, 'http://localhost').searchParams;
  return (name) => {
    const all = query.getAll(name);
    return all.length === 1 && all[0] !== '' ? all[0] : undefined;
  };
}

/** The fields of a body that a form or JSON parser has read. */
export function bodyFields(request: Request): Fields {
  const body: unknown = request.body;
  const entries =
    typeof body === 'object' && body !== null
      ? new Map<string, unknown>(Object.entries(body))
      : new Map<string, unknown>();
  return (name) => {
    const value = entries.get(name);
    return typeof value === 'string' && value !== '' ? value : undefined;
  };
}

/** An application's registration: what GitHub's settings page would hold. */
export interface Registration {
  readonly clientId: string;
  readonly clientSecret: string;
  /** Where answers may go: this address or any below it. Undefined lets any http address do. */
  readonly callbackUrl: string | undefined;
}

/** Whether the address is the registered one or below it, host and port exactly, as GitHub documents. */
export function redirectAllowed(registration: Registration, redirectUri: string): boolean {
  if (!URL.canParse(redirectUri)) return false;
  const asked = new URL(redirectUri);
  if (asked.protocol !== 'http:' && asked.protocol !== 'https:') return false;
  if (registration.callbackUrl === undefined) return true;
  const registered = new URL(registration.callbackUrl);
  const folder = registered.pathname.endsWith('/') ? registered.pathname : `${registered.pathname}/`;
  return asked.origin === registered.origin && `${asked.pathname}/`.startsWith(folder);
}

/** Reads an authorization request, or says in a sentence why it cannot be one. */
export function readAuthorization(
  fields: Fields,
  registration: Registration,
): AuthorizationRequest | { readonly refusal: string; readonly error?: string } {
  const clientId = fields('client_id');
  if (clientId !== registration.clientId) {
    return { refusal: 'The application that sent you here is not known: its client_id is missing or wrong.' };
  }
  const redirectUri = fields('redirect_uri') ?? registration.callbackUrl;
  if (redirectUri === undefined || !redirectAllowed(registration, redirectUri)) {
    return {
      refusal: 'The address to return to (redirect_uri) is not the one that the application registered.',
      error: 'redirect_uri_mismatch',
    };
  }
  const codeChallenge = fields('code_challenge');
  if (codeChallenge !== undefined && fields('code_challenge_method') !== 'S256') {
    return { refusal: 'A code_challenge needs code_challenge_method=S256.' };
  }
  return {
    clientId,
    redirectUri,
    // GitHub's page separates scopes by spaces; commas are taken too, as clients in the field send them.
    scopes: (fields('scope') ?? '').split(/[\s,]+/).filter((scope) => scope !== ''),
    state: fields('state'),
    codeChallenge,
  };
}
