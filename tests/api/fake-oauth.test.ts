import { createHash, randomBytes } from 'node:crypto';
import { spawnSync } from 'node:child_process';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { z } from 'zod';
import { startFakeOAuth, type RunningFakeOAuth } from '../../fake-oauth/listen';

const CLIENT = { clientId: 'client-of-the-test', clientSecret: 'a secret of the test' };
const CALLBACK = 'http://localhost:4600/auth/github/callback';
const answerSchema = z.object({
  access_token: z.string().optional(),
  scope: z.string().optional(),
  token_type: z.string().optional(),
  error: z.string().optional(),
});

let fake: RunningFakeOAuth;
let clockMs = 0;
beforeEach(async () => {
  clockMs = 0;
  fake = await startFakeOAuth({
    port: 0,
    ...CLIENT,
    callbackUrl: CALLBACK,
    faultControl: true,
    now: () => clockMs,
  });
});
afterEach(async () => {
  await fake.close();
});

type Extra = Readonly<Record<string, string>>;

function authorization(extra: Extra = {}): URLSearchParams {
  return new URLSearchParams({
    client_id: CLIENT.clientId,
    redirect_uri: CALLBACK,
    scope: 'user:email',
    state: 'state-1',
    ...extra,
  });
}

/** Chooses a person on the page and answers where the browser is sent. */
async function choose(extra: Extra = {}): Promise<URL> {
  const response = await fetch(`${fake.url}/login/oauth/authorize`, {
    method: 'POST',
    redirect: 'manual',
    body: authorization({ choose: 'ines-varga', ...extra }),
  });
  expect(response.status).toBe(302);
  return new URL(response.headers.get('location') ?? '');
}

async function codeFor(extra: Extra = {}): Promise<string> {
  return (await choose(extra)).searchParams.get('code') ?? '';
}

async function exchange(fields: Extra): Promise<z.infer<typeof answerSchema>> {
  const response = await fetch(`${fake.url}/login/oauth/access_token`, {
    method: 'POST',
    headers: { Accept: 'application/json' },
    body: new URLSearchParams({
      client_id: CLIENT.clientId,
      client_secret: CLIENT.clientSecret,
      redirect_uri: CALLBACK,
      ...fields,
    }),
  });
  expect(response.status).toBe(200);
  return answerSchema.parse(await response.json());
}

async function get(path: string, token: string): Promise<Response> {
  return fetch(`${fake.url}${path}`, { headers: { Authorization: `Bearer ${token}` }, redirect: 'manual' });
}

describe('choosing who to be', () => {
  test('the page says that it is a stand-in and offers every demo person', async () => {
    const page = await fetch(`${fake.url}/login/oauth/authorize?${authorization().toString()}`);
    const html = await page.text();
    expect(html).toContain('stand-in for GitHub');
    const listed = z
      .array(z.object({ login: z.string(), name: z.string(), note: z.string() }))
      .parse(await (await fetch(`${fake.url}/demo-people`)).json());
    expect(listed).toHaveLength(9);
    for (const person of listed) {
      expect(html).toContain(`value="${person.login}"`);
      expect(html).toContain(person.name);
    }
  });

  test('markup in the state is text on the page', async () => {
    const hostile = '"><script>alert(1)</script>';
    const page = await fetch(
      `${fake.url}/login/oauth/authorize?${authorization({ state: hostile }).toString()}`,
    );
    expect(await page.text()).not.toContain('<script>');
    expect((await choose({ state: hostile })).searchParams.get('state')).toBe(hostile);
  });

  test('the choice goes back to the registered address with a code and the state as sent', async () => {
    const target = await choose();
    expect(target.origin + target.pathname).toBe(CALLBACK);
    expect(target.searchParams.get('state')).toBe('state-1');
    expect(target.searchParams.get('code')).toMatch(/^[0-9a-f]{40}$/);
  });

  test('an address that was not registered gets neither code nor visitor', async () => {
    const foreign = [
      'http://evil.example/auth/github/callback',
      'http://localhost:4601/auth/github/callback',
      'http://localhost:4600/auth/github/callback-else',
      'javascript:alert(1)',
      'not an address',
    ];
    for (const redirect_uri of foreign) {
      const target = await choose({ redirect_uri });
      expect(target.origin + target.pathname).toBe(CALLBACK);
      expect(target.searchParams.get('error')).toBe('redirect_uri_mismatch');
      expect(target.searchParams.has('code')).toBe(false);
    }
  });

  test('an unknown application is refused and a person who is not listed cannot be chosen', async () => {
    const unknown = await fetch(
      `${fake.url}/login/oauth/authorize?${authorization({ client_id: 'other' }).toString()}`,
    );
    expect(unknown.status).toBe(404);
    const nobody = await fetch(`${fake.url}/login/oauth/authorize`, {
      method: 'POST',
      redirect: 'manual',
      body: authorization({ choose: 'nobody' }),
    });
    expect(nobody.status).toBe(422);
  });

  test('refusing goes back with access_denied and no code', async () => {
    const target = await choose({ choose: '', refuse: 'yes' });
    expect(target.searchParams.get('error')).toBe('access_denied');
    expect(target.searchParams.get('state')).toBe('state-1');
    expect(target.searchParams.has('code')).toBe(false);
  });
});

describe('the exchange', () => {
  test('a code gives a token for the person chosen, once', async () => {
    const code = await codeFor();
    const answer = await exchange({ code });
    expect(answer.token_type).toBe('bearer');
    expect(answer.scope).toBe('user:email');
    const user = z
      .object({ id: z.number(), login: z.string(), name: z.string() })
      .parse(await (await get('/user', answer.access_token ?? '')).json());
    expect(user).toEqual({ id: 990_000_000_402, login: 'ines-varga', name: 'Ines Varga' });
    expect((await exchange({ code })).error).toBe('bad_verification_code');
  });

  test('two exchanges of one code at the same time give one token', async () => {
    const code = await codeFor();
    const answers = await Promise.all([1, 2, 3, 4].map(() => exchange({ code })));
    expect(answers.filter((answer) => answer.access_token !== undefined)).toHaveLength(1);
  });

  test('a code lasts ten minutes and no longer', async () => {
    const [young, old] = [await codeFor(), await codeFor()];
    clockMs = 10 * 60 * 1000;
    expect((await exchange({ code: young })).access_token).toBeDefined();
    clockMs += 1;
    expect((await exchange({ code: old })).error).toBe('bad_verification_code');
  });

  test('a wrong secret is refused and leaves the code unspent', async () => {
    const code = await codeFor();
    expect((await exchange({ code, client_secret: 'wrong' })).error).toBe('incorrect_client_credentials');
    expect((await exchange({ code })).access_token).toBeDefined();
  });

  test('another redirect address than the one authorized is refused', async () => {
    const code = await codeFor();
    expect((await exchange({ code, redirect_uri: `${CALLBACK}/other` })).error).toBe('redirect_uri_mismatch');
  });

  test('the verifier must hash to the challenge, and a wrong one spends the code', async () => {
    const verifier = randomBytes(32).toString('base64url');
    const challenge = {
      code_challenge: createHash('sha256').update(verifier).digest('base64url'),
      code_challenge_method: 'S256',
    };
    expect(
      (await exchange({ code: await codeFor(challenge), code_verifier: verifier })).access_token,
    ).toBeDefined();
    expect((await exchange({ code: await codeFor(challenge) })).error).toBe('bad_verification_code');
    const code = await codeFor(challenge);
    expect((await exchange({ code, code_verifier: `${verifier}x` })).error).toBe('bad_verification_code');
    expect((await exchange({ code, code_verifier: verifier })).error).toBe('bad_verification_code');
    const plain = await fetch(
      `${fake.url}/login/oauth/authorize?${authorization({ code_challenge: verifier, code_challenge_method: 'plain' }).toString()}`,
    );
    expect(plain.status).toBe(404);
  });

  test('without an Accept header the answer is a form, and a JSON body is read as well', async () => {
    const response = await fetch(`${fake.url}/login/oauth/access_token`, {
      method: 'POST',
      headers: { 'Content-Type': 'application/json' },
      body: JSON.stringify({
        client_id: CLIENT.clientId,
        client_secret: CLIENT.clientSecret,
        code: await codeFor(),
      }),
    });
    expect(response.headers.get('content-type')).toContain('application/x-www-form-urlencoded');
    expect(new URLSearchParams(await response.text()).get('access_token')).toMatch(/^gho_/);
  });
});

describe('the user addresses', () => {
  test('no token, or an invented one, is answered 401', async () => {
    expect((await fetch(`${fake.url}/user`)).status).toBe(401);
    expect((await get('/user', 'gho_invented')).status).toBe(401);
    expect((await get('/user/emails', 'gho_invented')).status).toBe(401);
  });

  test('the e-mail address needs the scope for it', async () => {
    const without = await exchange({ code: await codeFor({ scope: '' }) });
    expect((await get('/user/emails', without.access_token ?? '')).status).toBe(404);
    const withScope = await exchange({ code: await codeFor() });
    expect(await (await get('/user/emails', withScope.access_token ?? '')).json()).toEqual([
      { email: 'ines.varga@ternstreet.example', primary: true, verified: true, visibility: 'private' },
    ]);
  });
});

describe('faults on demand', () => {
  async function setFault(endpoint: string, fault: string): Promise<number> {
    const response = await fetch(`${fake.url}/faults`, {
      method: 'PUT',
      body: new URLSearchParams({ endpoint, fault }),
    });
    return response.status;
  }

  test('a page of HTML, a 500, a redirect, a silence, and back to normal', async () => {
    const token = (await exchange({ code: await codeFor() })).access_token ?? '';
    expect(await setFault('emails', 'html')).toBe(204);
    expect(await (await get('/user/emails', token)).text()).toContain('<!doctype html>');
    await setFault('emails', 'error500');
    expect((await get('/user/emails', token)).status).toBe(500);
    await setFault('emails', 'redirect');
    expect((await get('/user/emails', token)).status).toBe(302);
    await setFault('emails', 'emptyEmails');
    expect(await (await get('/user/emails', token)).json()).toEqual([]);
    await setFault('emails', 'unverifiedEmail');
    expect(await (await get('/user/emails', token)).json()).toMatchObject([{ verified: false }]);
    await setFault('user', 'otherId');
    expect(await (await get('/user', token)).json()).toMatchObject({
      id: 990_001_000_402,
      login: 'ines-varga',
    });
    await setFault('user', 'hang');
    await expect(
      fetch(`${fake.url}/user`, {
        headers: { Authorization: `Bearer ${token}` },
        signal: AbortSignal.timeout(300),
      }),
    ).rejects.toThrow('aborted due to timeout');
    await fetch(`${fake.url}/faults`, { method: 'DELETE' });
    expect(await (await get('/user', token)).json()).toMatchObject({ id: 990_000_000_402 });
    expect(await setFault('user', 'nothing such')).toBe(422);
  });

  test('cannot be asked for unless the process allows it', async () => {
    const strict = await startFakeOAuth({ port: 0, ...CLIENT });
    const response = await fetch(`${strict.url}/faults`, { method: 'DELETE' });
    await strict.close();
    expect(response.status).toBe(404);
  });
});

test('the stand-in refuses to start in production', () => {
  const ended = spawnSync(process.execPath, ['--import', 'tsx', 'fake-oauth/index.ts'], {
    env: {
      ...process.env,
      NODE_ENV: 'production',
      GITHUB_CLIENT_ID: 'a',
      GITHUB_CLIENT_SECRET: 'b',
      PORT: '0',
    },
    encoding: 'utf8',
    timeout: 20_000,
  });
  expect(ended.status).toBe(1);
  expect(ended.stderr).toContain('does not run in production');
});
