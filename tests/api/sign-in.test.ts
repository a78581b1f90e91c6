import { randomBytes } from 'node:crypto';
import fc from 'fast-check';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { z } from 'zod';
import { sessionSchema } from '../../shared/schemas';
import { returnTo } from '../../server/features/auth/return-to';
import { answered, call } from './support/calls';
import {
  type Agent,
  chooseAtProvider,
  finishSignIn,
  type Harness,
  startHarness,
  startSignIn,
} from './support/harness';

let harness: Harness;
beforeAll(async () => {
  harness = await startHarness();
});
afterAll(async () => {
  await harness.close();
});

async function whoIs(agent: Agent): Promise<string | null> {
  const session = await answered(call(harness, agent, 'get', '/session'), sessionSchema);
  return session.user?.login ?? null;
}

test('signing in through the provider ends where the person was going, as that person', async () => {
  const agent = harness.browser();
  const authorize = await startSignIn(agent, '/labs?from=test');
  expect(authorize.searchParams.get('scope')).toBe('user:email');
  expect(authorize.searchParams.get('code_challenge_method')).toBe('S256');
  expect(authorize.searchParams.get('redirect_uri')).toBe(`${harness.origin}/auth/github/callback`);
  expect(await finishSignIn(agent, await chooseAtProvider(authorize, 'adaeze-holm'))).toBe('/labs?from=test');
  expect(await whoIs(agent)).toBe('adaeze-holm');
});

test('the session gets a new id at sign-in, in a cookie that scripts and other sites cannot use', async () => {
  const agent = harness.browser();
  const started = await agent.get('/auth/github').redirects(0);
  const before = cookieOf(started.headers);
  const callback = await chooseAtProvider(
    new URL(z.string().parse(started.headers['location'])),
    'ines-varga',
  );
  const finished = await agent.get(callback.pathname + callback.search).redirects(0);
  const after = cookieOf(finished.headers);
  expect(after.split(';')[0]).not.toBe(before.split(';')[0]);
  expect(after).toMatch(/HttpOnly/);
  expect(after).toMatch(/SameSite=Lax/);
  expect(after).toMatch(/Path=\//);
  expect(after).not.toMatch(/Domain=/);
  // The old cookie is nobody's.
  const old = await harness
    .browser()
    .get('/api/v1/session')
    .set('Cookie', before.split(';')[0] ?? '');
  expect(sessionSchema.parse(old.body).user).toBeNull();
});

function cookieOf(headers: unknown): string {
  const all = z.object({ 'set-cookie': z.array(z.string()) }).parse(headers)['set-cookie'];
  return all.find((cookie) => cookie.startsWith('qt=')) ?? '';
}

test('a hundred forged, replayed, foreign and swapped callbacks never sign anyone in', async () => {
  const attacker = harness.browser();
  const attackersCallback = await chooseAtProvider(await startSignIn(attacker), 'oskar-lindqvist');
  const code = attackersCallback.searchParams.get('code') ?? '';
  const attackersState = attackersCallback.searchParams.get('state') ?? '';
  const states = [
    null,
    '',
    attackersState,
    attackersState.slice(0, -1),
    `${attackersState}A`,
    '__proto__',
    'constructor',
    'toString',
    'hasOwnProperty',
    'undefined',
    'null',
    '%00',
    'a'.repeat(5000),
    ...Array.from({ length: 60 }, () => randomBytes(32).toString('base64url')),
  ];
  const outcomes: string[] = [];
  const victim = harness.browser();
  // A browser that never began, and one that is in the middle of a sign-in of its own.
  const busy = harness.browser();
  const busyAuthorize = await startSignIn(busy);
  for (const state of states) {
    for (const agent of [victim, busy]) {
      const query = new URLSearchParams({ code, ...(state === null ? {} : { state }) });
      const response = await agent.get(`/auth/github/callback?${query.toString()}`).redirects(0);
      outcomes.push(
        `${response.status} ${String(response.headers['location'])} ${String(await whoIs(agent))}`,
      );
    }
  }
  // Parameters given twice, and as something else than text.
  for (const query of [
    'code=a&code=b&state=c',
    'code[]=a&state=b',
    `code=${code}&state=a&state=${attackersState}`,
    'state=x',
    '',
  ]) {
    const response = await victim.get(`/auth/github/callback?${query}`).redirects(0);
    outcomes.push(
      `${response.status} ${String(response.headers['location'])} ${String(await whoIs(victim))}`,
    );
  }
  expect(outcomes.length).toBeGreaterThanOrEqual(100);
  expect(new Set(outcomes)).toEqual(new Set(['303 /sign-in?problem=stale null']));

  // Its own sign-in still works, and its callback works once.
  const own = await chooseAtProvider(busyAuthorize, 'ines-varga');
  expect(await finishSignIn(busy, own)).toBe('/');
  expect(await whoIs(busy)).toBe('ines-varga');
  expect(await finishSignIn(busy, own)).toBe('/sign-in?problem=stale');
  expect(await whoIs(busy)).toBe('ines-varga');
}, 120_000);

test("one browser's code in another browser's sign-in fails at the provider's PKCE check", async () => {
  const [one, two] = [harness.browser(), harness.browser()];
  const [first, second] = [
    await chooseAtProvider(await startSignIn(one), 'ines-varga'),
    await chooseAtProvider(await startSignIn(two), 'oskar-lindqvist'),
  ];
  const code = first.searchParams.get('code') ?? '';
  first.searchParams.set('code', second.searchParams.get('code') ?? '');
  second.searchParams.set('code', code);
  expect(await finishSignIn(one, first)).toBe('/sign-in?problem=provider');
  expect(await finishSignIn(two, second)).toBe('/sign-in?problem=provider');
  expect([await whoIs(one), await whoIs(two)]).toEqual([null, null]);
});

test('people who sign in at the same moment each become themselves', async () => {
  const logins = [
    'adaeze-holm',
    'ines-varga',
    'tomas-reuter',
    'juno-petrak',
    'oskar-lindqvist',
    'noor-haddad',
  ];
  const asked = [...logins, ...logins, ...logins];
  const became = await Promise.all(asked.map(async (login) => whoIs(await harness.signIn(login))));
  expect(became).toEqual(asked);
});

test('two tabs of one browser can both begin, and either can finish', async () => {
  const agent = harness.browser();
  const firstTab = await startSignIn(agent, '/first');
  const secondTab = await startSignIn(agent, '/second');
  expect(await finishSignIn(agent, await chooseAtProvider(firstTab, 'ines-varga'))).toBe('/first');
  // The session is a new one now, so the other tab begins again: nothing of before sign-in is taken over.
  expect(await finishSignIn(agent, await chooseAtProvider(secondTab, 'ines-varga'))).toBe(
    '/sign-in?problem=stale',
  );
  expect(await whoIs(agent)).toBe('ines-varga');
});

test('declining at the provider says so and nothing more', async () => {
  const response = await harness
    .browser()
    .get('/auth/github/callback?error=access_denied&error_description=%3Cscript%3E')
    .redirects(0);
  expect(response.headers['location']).toBe('/sign-in?problem=declined');
  expect(response.text).not.toContain('script');
});

test('a provider that fails, redirects or answers a page never brings the server down nor signs anyone in', async () => {
  for (const endpoint of ['token', 'user'] as const) {
    for (const fault of ['html', 'error500', 'redirect'] as const) {
      harness.fake.faults.set(endpoint, fault);
      const agent = harness.browser();
      const callback = await chooseAtProvider(await startSignIn(agent), 'ines-varga');
      expect(await finishSignIn(agent, callback), `${endpoint} ${fault}`).toBe('/sign-in?problem=provider');
      expect(await whoIs(agent)).toBeNull();
      harness.fake.faults.clear();
    }
  }
});

test('an e-mail list that fails, is empty or unverified costs nobody their sign-in, only the address', async () => {
  for (const fault of ['html', 'error500', 'redirect', 'emptyEmails', 'unverifiedEmail'] as const) {
    harness.fake.faults.set('emails', fault);
    const agent = await harness.signIn('sami-oduya');
    const session = await answered(call(harness, agent, 'get', '/session'), sessionSchema);
    expect([session.user?.login, session.user?.email], fault).toEqual(['sami-oduya', null]);
    harness.fake.faults.clear();
  }
});

test('a provider that hangs is given up after at most ten seconds, and others sign in meanwhile', async () => {
  for (const endpoint of ['token', 'user'] as const) {
    harness.fake.faults.set(endpoint, 'hang');
    const agent = harness.browser();
    const callback = await chooseAtProvider(await startSignIn(agent), 'ines-varga');
    const began = Date.now();
    const hanging = finishSignIn(agent, callback);
    await new Promise((resolve) => setTimeout(resolve, 300));
    harness.fake.faults.clear();
    const other = await harness.signIn('juno-petrak');
    expect(await whoIs(other)).toBe('juno-petrak');
    expect(await hanging).toBe('/sign-in?problem=provider');
    expect(Date.now() - began).toBeLessThan(10_500);
  }
}, 40_000);

test('another account with the same e-mail address is another person', async () => {
  const one = await answered(
    call(harness, await harness.signIn('tomas-reuter'), 'get', '/session'),
    sessionSchema,
  );
  harness.fake.faults.set('user', 'otherId');
  const two = await answered(
    call(harness, await harness.signIn('tomas-reuter'), 'get', '/session'),
    sessionSchema,
  );
  harness.fake.faults.clear();
  expect(two.user?.email).toBe(one.user?.email);
  expect(two.user?.id).not.toBe(one.user?.id);
});

test('signing out everywhere ends every session at once', async () => {
  const sessions = [
    await harness.signIn('noor-haddad'),
    await harness.signIn('noor-haddad'),
    await harness.signIn('noor-haddad'),
  ];
  const [first] = sessions;
  if (first === undefined) throw new Error('unreachable');
  expect((await call(harness, first, 'post', '/session/sign-out-everywhere')).status).toBe(204);
  expect(await Promise.all(sessions.map(whoIs))).toEqual([null, null, null]);
});

test('a disabled account neither goes on nor comes back', async () => {
  const agent = await harness.signIn('mirela-stanic');
  await asAdmin(`update users set disabled_at = now() where login = 'mirela-stanic'`);
  expect(await whoIs(agent)).toBeNull();
  const again = harness.browser();
  expect(await finishSignIn(again, await chooseAtProvider(await startSignIn(again), 'mirela-stanic'))).toBe(
    '/sign-in?problem=disabled',
  );
});

test('a session ends after 8 idle hours and after 24 hours however busy, by the clock of the database', async () => {
  const idle = await harness.signIn('juno-petrak');
  await asAdmin(
    `update sessions set expire = now() - interval '1 second' where ended_at is null and user_id is not null`,
  );
  expect(await whoIs(idle)).toBeNull();
  const busy = await harness.signIn('juno-petrak');
  const hours = z.object({ hours: z.number() });
  const [fresh] = await asAdmin(
    'select extract(epoch from expire - now())::float8 / 3600 as hours from sessions where expire > now() and user_id is not null',
  );
  expect(hours.parse(fresh).hours).toBeCloseTo(8, 1);
  // Used 20 hours after signing in: prolonged, but only to the 24th.
  await asAdmin(`update sessions set seen_at = now() - interval '20 minutes',
    sess = jsonb_set(sess::jsonb, '{signedInAt}', to_jsonb(extract(epoch from now() - interval '20 hours') * 1000))::json
    where expire > now() and user_id is not null`);
  expect(await whoIs(busy)).toBe('juno-petrak');
  const [later] = await asAdmin(
    'select extract(epoch from expire - now())::float8 / 3600 as hours from sessions where expire > now() and user_id is not null',
  );
  expect(hours.parse(later).hours).toBeCloseTo(4, 1);
});

async function asAdmin(sql: string): Promise<unknown[]> {
  const { default: pg } = await import('pg');
  const client = new pg.Client({ connectionString: harness.testDatabase.adminUrl });
  await client.connect();
  try {
    return (await client.query<Record<string, unknown>>(sql)).rows;
  } finally {
    await client.end();
  }
}

test('whatever is asked for as the place to return to, it is a path of ours', () => {
  const nasty = fc.constantFrom(
    '//',
    '\\\\',
    '/\\',
    'https:',
    'http://evil.example',
    '%2f%2f',
    '\r\n',
    '\t',
    '@',
    '..',
    '/',
    'javascript:',
    '?',
    '#',
    'é',
    ' ',
    '\u0000',
  );
  fc.assert(
    fc.property(fc.array(fc.oneof(nasty, fc.string({ maxLength: 6 })), { maxLength: 8 }), (parts) => {
      for (const asked of [parts.join(''), `/${parts.join('')}`]) {
        const target = returnTo(asked);
        expect(new URL(target, 'https://own.example').origin).toBe('https://own.example');
        expect(target).toMatch(/^\/(?![/\\])/);
        expect(target).not.toMatch(/[\r\n\t\\]/);
      }
    }),
    { numRuns: 3000 },
  );
  expect(returnTo('/labs/1/plates?open=H-3')).toBe('/labs/1/plates?open=H-3');
});

test('no log line, session row or answer holds a code, a token or a cookie', async () => {
  const agent = harness.browser();
  const callback = await chooseAtProvider(await startSignIn(agent), 'ines-varga');
  const finished = await agent.get(callback.pathname + callback.search).redirects(0);
  const sid = decodeURIComponent(/qt=([^;]+)/.exec(cookieOf(finished.headers))?.[1] ?? '');
  const secrets = [callback.searchParams.get('code') ?? '', sid, harness.config.github.clientSecret, 'gho_'];
  const sessions = JSON.stringify(await asAdmin('select sess from sessions'));
  for (const secret of secrets) {
    expect(secret).not.toBe('');
    expect(harness.log()).not.toContain(secret);
    expect(sessions).not.toContain(secret);
  }
});

test('sign-ins by one address are limited, and the browser is told on a page', async () => {
  const limited = await startHarness({ environment: { SIGN_INS_PER_MINUTE: '5' } });
  try {
    const locations: string[] = [];
    for (let attempt = 0; attempt < 8; attempt += 1) {
      const response = await limited
        .browser()
        .get('/auth/github')
        .set('X-Forwarded-For', `10.0.0.${attempt}`)
        .redirects(0);
      locations.push(z.string().parse(response.headers['location']));
    }
    expect(locations.filter((location) => location === '/sign-in?problem=too-many')).toHaveLength(3);
  } finally {
    await limited.close();
  }
});
