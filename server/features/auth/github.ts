import { Strategy } from 'passport-github2';
import { z } from 'zod';
import type { Config, GitHubEndpoints } from '../../config';
import { PendingSignIns } from './pending-sign-ins';

/** What we take from the provider. The subject is the identity; name, login and e-mail may change under it. */
export interface GitHubPerson {
  readonly subject: string;
  readonly login: string;
  readonly name: string;
  /** Primary and verified, else null. Never used to recognise anyone. */
  readonly email: string | null;
}

const tokenAnswer = z.object({ access_token: z.string().min(1).max(2000) });
const userAnswer = z.object({
  id: z.union([z.int().positive(), z.string().regex(/^\d{1,20}$/)]),
  login: z.string().min(1).max(100),
  name: z.string().max(200).nullish(),
});
const emailsAnswer = z
  .array(z.object({ email: z.email().max(320), primary: z.boolean(), verified: z.boolean() }))
  .max(200);

/** The whole of a sign-in's talk with the provider. */
const exchangeMs = 10_000;
const maxAnswerBytes = 256 * 1024;

/** The provider did not answer as it documents: late, not JSON, a redirect, an error. Its words are never shown. */
class ProviderError extends Error {
  override readonly name = 'ProviderError';
}

type Known = (error: null, person: GitHubPerson) => void;
type Profiled = (error: ProviderError | null, person?: GitHubPerson) => void;
type Exchanged = (
  error: ProviderError | null,
  token?: string,
  refreshToken?: string,
  results?: object,
) => void;

/**
 * GitHub's strategy with our own talk to the provider: the packaged one has no time limit, and an HTML page in place
 * of the e-mail list ends the process.
 */
export class GitHubStrategy extends Strategy {
  constructor(config: Config) {
    const { clientId, clientSecret, endpoints } = config.github;
    const options = {
      clientID: clientId,
      clientSecret,
      authorizationURL: endpoints.authorize,
      tokenURL: endpoints.token,
      // Absolute and from the settings: a relative one is built from what the client says our host is.
      callbackURL: new URL('/auth/github/callback', config.publicOrigin).href,
      scope: ['user:email'],
      pkce: true,
      state: 'kept by PendingSignIns',
    };
    super(options, (_accessToken: string, _refreshToken: string, person: GitHubPerson, done: Known) => {
      done(null, person);
    });
    // Set here because the types of the packages know only their older, shorter store, and an exchange without a limit;
    // and as plain properties, because passport works on a clone of this for each request.
    Object.assign(this, {
      _stateStore: new PendingSignIns(),
      userProfile: (accessToken: string, done: Profiled) => {
        personOf(endpoints, accessToken).then(
          (person) => done(null, person),
          (error: unknown) => done(asProviderError(error)),
        );
      },
    });
    Object.assign(this._oauth2, {
      getOAuthAccessToken: (code: string, parameters: unknown, done: Exchanged) => {
        exchange(config.github, code, parameters).then(
          (token) => done(null, token, '', {}),
          (error: unknown) => done(asProviderError(error)),
        );
      },
    });
  }
}

async function exchange(
  { clientId, clientSecret, endpoints }: Config['github'],
  code: string,
  parameters: unknown,
): Promise<string> {
  const body = new URLSearchParams({
    ...z.record(z.string(), z.string()).parse(parameters),
    code,
    client_id: clientId,
    client_secret: clientSecret,
  });
  const answer = await ask(endpoints.token, AbortSignal.timeout(exchangeMs * 0.6), { method: 'POST', body });
  return tokenAnswer.parse(answer).access_token;
}

async function personOf(endpoints: GitHubEndpoints, accessToken: string): Promise<GitHubPerson> {
  const signal = AbortSignal.timeout(exchangeMs * 0.4);
  const asking = { headers: { Authorization: `Bearer ${accessToken}` } };
  const [userText, emailsText] = await Promise.all([
    ask(endpoints.user, signal, asking),
    // Nobody needs an e-mail address to sign in.
    ask(endpoints.emails, signal, asking).catch(() => []),
  ]);
  const user = userAnswer.parse(userText);
  const emails = emailsAnswer.safeParse(emailsText);
  const chosen = emails.success
    ? emails.data.find(({ primary, verified }) => primary && verified)
    : undefined;
  const name = (user.name ?? '').trim();
  return {
    subject: String(user.id),
    login: user.login,
    name: name === '' ? user.login : name,
    email: chosen?.email ?? null,
  };
}

interface Asking {
  readonly method?: 'POST';
  readonly body?: URLSearchParams;
  readonly headers?: Readonly<Record<string, string>>;
}

async function ask(url: string, signal: AbortSignal, init: Asking): Promise<unknown> {
  const response = await fetch(url, {
    ...init,
    headers: { ...init.headers, Accept: 'application/json', 'User-Agent': 'Quarterturn' },
    redirect: 'error',
    signal,
  });
  const bytes = await readAtMost(response, maxAnswerBytes);
  if (!response.ok) throw new ProviderError(`the provider answered ${response.status}`);
  return JSON.parse(bytes);
}

async function readAtMost(response: Response, limit: number): Promise<string> {
  const decoder = new TextDecoder();
  let size = 0;
  let text = '';
  for await (const chunk of z.custom<AsyncIterable<Uint8Array>>(isIterable).parse(response.body ?? [])) {
    size += chunk.byteLength;
    if (size > limit) throw new ProviderError('the provider answered at too great a length');
    text += decoder.decode(chunk, { stream: true });
  }
  return text + decoder.decode();
}

function isIterable(value: unknown): boolean {
  return (
    typeof value === 'object' && value !== null && (Symbol.asyncIterator in value || Symbol.iterator in value)
  );
}

function asProviderError(error: unknown): ProviderError {
  if (error instanceof ProviderError) return error;
  const reason = error instanceof Error ? error.name : 'unknown';
  return new ProviderError(`the talk with the provider failed: ${reason}`);
}
