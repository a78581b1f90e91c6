/**
 * The local stand-in for GitHub's sign-in: the web application flow and the two user addresses as GitHub publishes them.
 * It imports nothing of the product, so that the real service can take its place by changing addresses only.
 */
import { fileURLToPath } from 'node:url';
import express, { type Express, type Request, type Response } from 'express';
import { answeredFaulty, createFaults, isFault, isFaultyEndpoint, type Faults } from './faults';
import { createGrants, sameSecret, verifierFits, type Token } from './grants';
import { choicePage, refusalPage } from './page';
import { readDemoPeople, type Person } from './people';
import {
  bodyFields,
  queryFields,
  readAuthorization,
  redirectAllowed,
  type Fields,
  type Registration,
} from './request';

export interface FakeOAuthOptions {
  readonly clientId: string;
  readonly clientSecret: string;
  readonly callbackUrl?: string;
  readonly people?: readonly Person[];
  /** Opens /faults, where a test chooses what goes wrong. */
  readonly faultControl?: boolean;
  readonly now?: () => number;
}

export interface FakeOAuth {
  readonly app: Express;
  readonly faults: Faults;
}

export function createFakeOAuth(options: FakeOAuthOptions): FakeOAuth {
  const registration: Registration = {
    clientId: options.clientId,
    clientSecret: options.clientSecret,
    callbackUrl: options.callbackUrl,
  };
  const people = options.people ?? readDemoPeople();
  const grants = createGrants(options.now ?? Date.now);
  const faults = createFaults();
  const app = express();
  app.disable('x-powered-by');
  app.disable('etag');
  app.use(express.urlencoded({ extended: false }), express.json());
  app.use((_request, response, next) => {
    response.set({
      'Cache-Control': 'no-store',
      'X-Content-Type-Options': 'nosniff',
      'Referrer-Policy': 'no-referrer',
    });
    next();
  });

  app.get('/style.css', (_request, response) => {
    response.sendFile(fileURLToPath(new URL('style.css', import.meta.url)));
  });
  app.get('/demo-people', (_request, response) => {
    response.json(people);
  });

  app.get('/login/oauth/authorize', (request, response) => {
    const asked = readAuthorization(queryFields(request), registration);
    if ('refusal' in asked) {
      refuse(response, asked, registration);
      return;
    }
    // The form's answer is a redirect to the application, which Chromium counts as a form target too.
    response.set(
      'Content-Security-Policy',
      `default-src 'none'; style-src 'self'; img-src data:; form-action 'self' ${new URL(asked.redirectUri).origin}; base-uri 'none'; frame-ancestors 'none'`,
    );
    response.type('html').send(choicePage(asked, people));
  });

  app.post('/login/oauth/authorize', (request, response) => {
    const fields = bodyFields(request);
    const asked = readAuthorization(fields, registration);
    if ('refusal' in asked) {
      refuse(response, asked, registration);
      return;
    }
    const target = new URL(asked.redirectUri);
    const person = people.find((one) => one.login === fields('choose'));
    if (person !== undefined) {
      target.searchParams.set('code', grants.issueCode({ ...asked, person }));
    } else if (fields('refuse') !== undefined) {
      target.searchParams.set('error', 'access_denied');
      target.searchParams.set('error_description', 'The user has denied your application access.');
    } else {
      response.status(422).type('html').send(refusalPage('Nobody of that name can be chosen here.'));
      return;
    }
    if (asked.state !== undefined) target.searchParams.set('state', asked.state);
    response.redirect(302, target.href);
  });

  app.post('/login/oauth/access_token', (request, response) => {
    if (answeredFaulty(faults.of('token'), response)) return;
    const [body, query] = [bodyFields(request), queryFields(request)];
    answerInAskedForm(
      request,
      response,
      exchange((name) => body(name) ?? query(name)),
    );
  });

  /** GitHub answers a refused exchange with status 200 and an `error` field. */
  function exchange(fields: Fields): Record<string, string> {
    const secret = fields('client_secret');
    if (
      fields('client_id') !== registration.clientId ||
      secret === undefined ||
      !sameSecret(secret, registration.clientSecret)
    ) {
      return {
        error: 'incorrect_client_credentials',
        error_description: 'The client_id and/or client_secret passed are incorrect.',
      };
    }
    const grant = grants.spendCode(fields('code') ?? '');
    if (grant === undefined || !verifierFits(grant.codeChallenge, fields('code_verifier'))) {
      return {
        error: 'bad_verification_code',
        error_description: 'The code passed is incorrect or expired.',
      };
    }
    const redirectUri = fields('redirect_uri');
    if (
      redirectUri !== undefined &&
      (redirectUri !== grant.redirectUri || !redirectAllowed(registration, redirectUri))
    ) {
      return {
        error: 'redirect_uri_mismatch',
        error_description: 'The redirect_uri MUST match the registered callback URL for this application.',
      };
    }
    return { access_token: grants.issueToken(grant), scope: grant.scopes.join(','), token_type: 'bearer' };
  }

  app.get('/user', (request, response) => {
    const token = authorized(request, response);
    if (token === undefined || answeredFaulty(faults.of('user'), response)) return;
    const { person } = token;
    response.json({
      login: person.login,
      id: faults.of('user') === 'otherId' ? person.id + 1_000_000 : person.id,
      type: 'User',
      site_admin: false,
      name: person.name,
      email: null,
    });
  });

  app.get('/user/emails', (request, response) => {
    const token = authorized(request, response);
    if (token === undefined || answeredFaulty(faults.of('emails'), response)) return;
    if (!token.scopes.some((scope) => scope === 'user' || scope === 'user:email')) {
      response.status(404).json({ message: 'Not Found', status: '404' });
      return;
    }
    const fault = faults.of('emails');
    const email = {
      email: token.person.email,
      primary: true,
      verified: fault !== 'unverifiedEmail',
      visibility: 'private',
    };
    response.json(fault === 'emptyEmails' ? [] : [email]);
  });

  function authorized(request: Request, response: Response): Token | undefined {
    if (request.get('user-agent') === undefined) {
      response.status(403).json({ message: 'Please make sure your request has a User-Agent header.' });
      return undefined;
    }
    const value = /^(?:bearer|token) (\S+)$/i.exec(request.get('authorization') ?? '')?.[1];
    const token = value === undefined ? undefined : grants.findToken(value);
    if (token === undefined) response.status(401).json({ message: 'Bad credentials', status: '401' });
    else response.set('X-OAuth-Scopes', token.scopes.join(', '));
    return token;
  }

  if (options.faultControl === true) {
    app.put('/faults', (request, response) => {
      const fields = bodyFields(request);
      const [endpoint, fault] = [fields('endpoint') ?? '', fields('fault') ?? ''];
      if (!isFaultyEndpoint(endpoint) || !isFault(fault)) {
        response.status(422).json({ message: 'Send an endpoint and a fault that exist.' });
        return;
      }
      faults.set(endpoint, fault);
      response.status(204).end();
    });
    app.delete('/faults', (_request, response) => {
      faults.clear();
      response.status(204).end();
    });
  }
  return { app, faults };
}

function refuse(
  response: Response,
  asked: { readonly refusal: string; readonly error?: string },
  registration: Registration,
): void {
  if (asked.error !== undefined && registration.callbackUrl !== undefined) {
    // Never to the address that was asked for: that one is not trusted.
    const target = new URL(registration.callbackUrl);
    target.searchParams.set('error', asked.error);
    target.searchParams.set('error_description', asked.refusal);
    response.redirect(302, target.href);
    return;
  }
  response.status(404).type('html').send(refusalPage(asked.refusal));
}

function answerInAskedForm(request: Request, response: Response, answer: Record<string, string>): void {
  if (request.accepts(['application/x-www-form-urlencoded', 'application/json']) === 'application/json') {
    response.json(answer);
  } else {
    response.type('application/x-www-form-urlencoded').send(new URLSearchParams(answer).toString());
  }
}
