import { afterAll, beforeAll, expect, test } from 'vitest';
import {
  createdInvitationSchema,
  platePageSchema,
  cabinetPlateSchema,
  runSchema,
} from '../../shared/schemas';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { makeLab, plateBody, type TestLab } from './support/lab';

let harness: Harness;
let lead: Agent;
let lab: TestLab;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Own lab');
}, 60_000);
afterAll(async () => {
  await harness.close();
});

test('ten keys, each sent twenty times at once, make ten plates; a repeat in flight is told to wait', async () => {
  const keys = Array.from({ length: 10 }, (_, index) => `ten-keys-${index}`);
  for (const key of keys) {
    const answers = await Promise.all(
      Array.from({ length: 20 }, () =>
        call(harness, lead, 'post', `/labs/${lab.labId}/plates`, { body: plateBody(key), key }),
      ),
    );
    const made = answers.filter(({ status }) => status === 201);
    expect(made.length).toBeGreaterThan(0);
    expect(new Set(made.map(({ text }) => cabinetPlateSchema.parse(JSON.parse(text)).id)).size).toBe(1);
    for (const waiting of answers.filter(({ status }) => status !== 201)) {
      expect([409, 503]).toContain(waiting.status);
      expect(waiting.headers['retry-after']).toMatch(/^\d+$/);
    }
  }
  const { items } = await answered(call(harness, lead, 'get', `/labs/${lab.labId}/plates`), platePageSchema);
  expect(items.filter(({ name }) => name.startsWith('ten-keys')).length).toBe(10);
}, 60_000);

test('a creating call without a key is refused, and a key used for something else as well', async () => {
  const path = `/labs/${lab.labId}/plates`;
  expect((await call(harness, lead, 'post', path, { body: plateBody('K-1'), key: null })).status).toBe(400);
  expect((await call(harness, lead, 'post', path, { body: plateBody('K-1'), key: 'short' })).status).toBe(
    400,
  );
  const first = await call(harness, lead, 'post', path, { body: plateBody('K-2'), key: 'one-key-only' });
  expect(first.status).toBe(201);
  expect(
    (await call(harness, lead, 'post', path, { body: plateBody('K-3'), key: 'one-key-only' })).status,
  ).toBe(422);
  const elsewhere = await call(harness, lead, 'post', '/labs', { body: { name: 'K' }, key: 'one-key-only' });
  expect(elsewhere.status).toBe(422);
  const again = await call(harness, lead, 'post', path, { body: plateBody('K-2'), key: 'one-key-only' });
  expect([again.status, again.text, again.headers['etag']]).toEqual([201, first.text, first.headers['etag']]);
});

test('a refused call stores nothing under its key, so that the corrected one goes through', async () => {
  const path = `/labs/${lab.labId}/plates`;
  const future = plateBody('K-9', { calibration: { measuredAt: '2999-01-01T00:00:00Z' } });
  expect((await call(harness, lead, 'post', path, { body: future, key: 'corrected-later' })).status).toBe(
    422,
  );
  expect(
    (await call(harness, lead, 'post', path, { body: plateBody('K-9'), key: 'corrected-later' })).status,
  ).toBe(201);
});

test("two people's equal keys are two keys", async () => {
  const other = await harness.signIn('pia-brandt');
  const [one, two] = [
    await call(harness, lead, 'post', '/labs', { body: { name: 'Mine' }, key: 'the-same-key' }),
    await call(harness, other, 'post', '/labs', { body: { name: 'Mine' }, key: 'the-same-key' }),
  ];
  expect([one.status, two.status]).toEqual([201, 201]);
  expect(one.text).not.toBe(two.text);
});

test("an invitation's link comes again with a repeat, and its token is stored nowhere", async () => {
  const ask = () =>
    answered(
      call(harness, lead, 'post', `/labs/${lab.labId}/invitations`, {
        body: { role: 'guest', note: 'a visitor' },
        key: 'invite-once',
      }),
      createdInvitationSchema,
    );
  const [first, again] = [await ask(), await ask()];
  expect(again).toEqual(first);
  const { default: pg } = await import('pg');
  const client = new pg.Client({ connectionString: harness.testDatabase.adminUrl });
  await client.connect();
  const dump = JSON.stringify([
    (await client.query('select * from invitations')).rows,
    (await client.query('select * from idempotency_keys')).rows,
    (await client.query('select * from audit_events')).rows,
  ]);
  await client.end();
  expect(dump).toContain(first.invitation.id);
  expect(dump).not.toContain(first.token);
});

test('a reading sent five times with one key is one reading', async () => {
  const path = `/labs/${lab.labId}/runs/${lab.runId}/readings`;
  const body = { outcome: 'done', settingIndex: 0, dialledDeg: [12.4, 301.7], note: '' };
  for (let sent = 0; sent < 5; sent += 1) {
    const run = await answered(call(harness, lead, 'post', path, { body, key: 'one-reading' }), runSchema);
    expect(run.readings).toHaveLength(1);
  }
});
