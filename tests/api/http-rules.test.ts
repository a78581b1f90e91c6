import { mkdtempSync, mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { problemSchema } from '../../shared/schemas';
import { call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { makeLab, plateBody, type TestLab } from './support/lab';

let harness: Harness;
let lead: Agent;
let lab: TestLab;
const pages = mkdtempSync(path.join(tmpdir(), 'pages-'));

beforeAll(async () => {
  mkdirSync(path.join(pages, 'assets'));
  writeFileSync(path.join(pages, 'index.html'), '<!doctype html><title>page</title>');
  writeFileSync(path.join(pages, 'theme.js'), '"theme";');
  writeFileSync(path.join(pages, '.secret'), 'secret');
  writeFileSync(path.join(pages, 'assets', 'main-abc123.js'), '"plain";');
  writeFileSync(path.join(pages, 'assets', 'main-abc123.js.br'), 'brotli bytes');
  harness = await startHarness({ pagesDirectory: pages });
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Own lab');
}, 60_000);
afterAll(async () => {
  await harness.close();
  rmSync(pages, { recursive: true });
});

const name = { name: 'Renamed' };

test('every kind of answer carries the whole set of security headers, and a request id of ours', async () => {
  const browser = harness.browser();
  const answers = [
    await browser.get('/'),
    await browser.get('/labs/anything'),
    await browser.get('/assets/main-abc123.js'),
    await browser.get('/assets/missing.js'),
    await browser.get('/healthz'),
    await browser.get('/api/v1/session').set('X-Request-Id', 'mine'),
    await browser.get('/api/v1/nothing'),
    await browser.get('/auth/github').redirects(0),
    await browser.post('/api/v1/labs').send(name),
    await call(harness, lead, 'post', '/labs', { body: { name: 'x'.repeat(5_000_000) } }),
    await browser.get('/api/v1/labs/%E0%A4%A').set('Cookie', 'a=b'),
  ];
  expect(answers.map(({ status }) => status)).toEqual([
    200, 200, 200, 404, 200, 200, 404, 302, 403, 413, 404,
  ]);
  for (const { headers } of answers) {
    const csp = String(headers['content-security-policy']);
    for (const part of [
      "default-src 'none'",
      "script-src 'self'",
      "object-src 'none'",
      "base-uri 'none'",
      "frame-ancestors 'none'",
    ]) {
      expect(csp).toContain(part);
    }
    expect(csp).not.toContain('unsafe');
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['referrer-policy']).toBe('no-referrer');
    expect(headers['cross-origin-opener-policy']).toBe('same-origin');
    expect(headers['x-request-id']).toMatch(/^[0-9a-f-]{36}$/);
    expect(headers['x-powered-by']).toBeUndefined();
    // Plain http: a browser that remembered it would never come back.
    expect(headers['strict-transport-security']).toBeUndefined();
  }
});

test('a body that is too large is refused with the limit that holds', async () => {
  const body = (length: number) =>
    call(harness, lead, 'post', '/labs', { body: { name: 'x'.repeat(length) } });
  // 4 MB are let in, to be refused for their length only; the words name that limit.
  expect((await body(4 * 1024 * 1024 - 100)).status).toBe(400);
  const refused = await body(4 * 1024 * 1024 + 1);
  expect(refused.status).toBe(413);
  expect(refused.text).toContain('larger than 4 MB');
});

test('hashed files are kept for ever, pages are asked for anew, and a missing file is never a page', async () => {
  const browser = harness.browser();
  const asset = await browser.get('/assets/main-abc123.js').set('Accept-Encoding', 'gzip');
  expect(asset.headers['cache-control']).toBe('public, max-age=31536000, immutable');
  const small = await browser.head('/assets/main-abc123.js').set('Accept-Encoding', 'br');
  expect(small.status).toBe(200);
  expect((await browser.get('/plan')).headers['cache-control']).toBe('no-cache');
  expect((await browser.get('/theme.js')).headers['cache-control']).toBe('no-cache');
  const missing = await browser.get('/assets/gone-1.js');
  expect(missing.headers['cache-control']).toBe('no-store');
  for (const hidden of [
    '/.secret',
    '/.git/config',
    '/.env',
    '/server/index.ts',
    '/main.js.map',
    '/..%2f..%2fetc/passwd',
  ]) {
    expect((await browser.get(hidden)).status, hidden).toBe(404);
  }
});

test('what another site, or another port of this host, sends is refused before anything happens', async () => {
  const path_ = `/api/v1/labs/${lab.labId}`;
  const sent: readonly Readonly<Record<string, string>>[] = [
    {},
    { 'Sec-Fetch-Site': 'cross-site' },
    { 'Sec-Fetch-Site': 'same-site' },
    { 'Sec-Fetch-Site': 'none' },
    { 'Sec-Fetch-Site': 'same-site', Origin: harness.origin },
    { Origin: 'null' },
    { Origin: 'http://evil.example' },
    { Origin: `${harness.origin}0` },
    { Origin: `${harness.origin}.evil.example` },
  ];
  for (const headers of sent) {
    const response = await lead
      .patch(path_)
      .set(headers)
      .set('Content-Type', 'application/json')
      .send(JSON.stringify(name));
    expect([response.status, JSON.stringify(headers)]).toEqual([403, JSON.stringify(headers)]);
  }
  for (const type of ['text/plain', 'application/x-www-form-urlencoded', 'multipart/form-data; boundary=x']) {
    const response = await lead
      .patch(path_)
      .set('Origin', harness.origin)
      .set('Content-Type', type)
      .send(JSON.stringify(name));
    expect([response.status, type]).toEqual([415, type]);
  }
  const own = await lead
    .patch(path_)
    .set('Sec-Fetch-Site', 'same-origin')
    .set('Content-Type', 'application/json')
    .send(JSON.stringify(name));
  expect(own.status).toBe(200);
});

test('a refusal is a problem document with its fields and the request id of its header', async () => {
  const body = {
    ...plateBody('', { calibration: { retardanceDeg: 400 } }),
    surprise: 1,
  };
  const response = await call(harness, lead, 'post', `/labs/${lab.labId}/plates`, { body });
  expect(response.status).toBe(400);
  expect(response.headers['content-type']).toMatch(/^application\/problem\+json/);
  const problem = problemSchema.parse(JSON.parse(response.text));
  expect(problem.requestId).toBe(response.headers['x-request-id']);
  expect(problem.fields?.map((field) => field.path).toSorted()).toEqual([
    'name',
    'seat.calibration.retardanceDeg',
    'surprise',
  ]);
  expect(problem.fields?.find((field) => field.path === 'seat.calibration.retardanceDeg')?.message).toBe(
    'A retardance is from 0.1 to 359.9°.',
  );
});

test('what a client may not set is refused, not ignored', async () => {
  for (const key of [
    'id',
    'labId',
    'role',
    'revision',
    'retiredAt',
    'savedBy',
    'contentHash',
    '__proto__',
    'constructor',
  ]) {
    const text = JSON.stringify(plateBody('Z-1')).replace('{', `{${JSON.stringify(key)}:1,`);
    const response = await lead
      .post(`/api/v1/labs/${lab.labId}/plates`)
      .set('Origin', harness.origin)
      .set('Idempotency-Key', `key-for-${key}`)
      .set('Content-Type', 'application/json')
      .send(text);
    expect([key, response.status]).toEqual([key, 400]);
  }
});

test('unused methods, doubled and unknown query keys, and bodies that are no JSON are each refused by name', async () => {
  const at = `/api/v1/labs/${lab.labId}/runs`;
  const put = await lead.put(at).set('Origin', harness.origin);
  expect([put.status, put.headers['allow']]).toEqual([405, 'GET, POST, HEAD']);
  expect((await lead.get(`${at}?limit=1&limit=2`)).status).toBe(400);
  expect((await lead.get(`${at}?surprise=1`)).status).toBe(400);
  expect((await lead.get(`${at}?cursor=nonsense`)).status).toBe(400);
  for (const text of ['{', '[1]', '"text"', 'null', `${'['.repeat(40_000)}${']'.repeat(40_000)}`]) {
    const response = await lead
      .post(at)
      .set('Origin', harness.origin)
      .set('Idempotency-Key', 'broken-body')
      .set('Content-Type', 'application/json')
      .send(text);
    expect([text.slice(0, 20), response.status]).toEqual([text.slice(0, 20), 400]);
  }
});

test('texts that a database cannot hold are kept or refused, never a failure', async () => {
  const nul = await call(harness, lead, 'post', `/labs/${lab.labId}/plates`, { body: plateBody('a\u0000b') });
  expect(nul.status).toBe(400);
  const half = await call(harness, lead, 'patch', `/labs/${lab.labId}`, {
    body: { name: 'half \ud800 a character' },
  });
  expect(half.status).toBe(400);
});

test('calls by one person are limited, whatever address they claim', async () => {
  const limited = await startHarness({ environment: { API_CALLS_PER_MINUTE: '60' } });
  try {
    const agent = await limited.signIn('ines-varga');
    const statuses: number[] = [];
    for (let asked = 0; asked < 80; asked += 1) {
      statuses.push((await agent.get('/api/v1/session').set('X-Forwarded-For', `10.1.1.${asked}`)).status);
    }
    expect(statuses.filter((status) => status === 200)).toHaveLength(60);
    expect(statuses.filter((status) => status === 429)).toHaveLength(20);
  } finally {
    await limited.close();
  }
});

test('calls that come all at once spend no more of the limit than one after the other', async () => {
  const limited = await startHarness({ environment: { API_CALLS_PER_MINUTE: '60' } });
  try {
    const agent = await limited.signIn('ines-varga');
    const answers = await Promise.all(Array.from({ length: 80 }, () => agent.get('/api/v1/session')));
    const statuses = answers.map(({ status }) => status);
    expect(statuses.filter((status) => status === 200)).toHaveLength(60);
    expect(statuses.filter((status) => status === 429)).toHaveLength(20);
  } finally {
    await limited.close();
  }
});

test('readiness says whether the database answers; being alive depends on nothing', async () => {
  expect((await harness.browser().get('/healthz')).text).toBe('alive\n');
  expect((await harness.browser().get('/readyz')).status).toBe(200);
  const broken = await startHarness();
  await broken.testDatabase.drop();
  const [alive, ready, asked] = [
    await broken.browser().get('/healthz'),
    await broken.browser().get('/readyz'),
    await broken.browser().get('/api/v1/session').set('Cookie', 'qt=s%3Aunknown.signature'),
  ];
  expect([alive.status, ready.status]).toEqual([200, 503]);
  expect(asked.status).toBe(503);
  expect(asked.text).not.toMatch(/postgres|database "/);
  await broken.close();
});
