import { createHmac } from 'node:crypto';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { z } from 'zod';
import { call } from './support/calls';
import { type Harness, startHarness } from './support/harness';

let harness: Harness;
beforeAll(async () => {
  harness = await startHarness();
});
afterAll(async () => {
  await harness.close();
});

const races = 500;
const rows = z.array(z.object({ sess: z.unknown() })).length(1);

test(`signing out is final in ${races} races with a slow request that saves the same session`, async () => {
  const template = await harness.signIn('ines-varga');
  const { cookie, sess } = await copyOfSession(template);
  const alive: string[] = [];
  const inBatches = 10;
  for (let from = 0; from < races; from += inBatches) {
    await Promise.all(
      Array.from({ length: inBatches }, async (_, offset) => {
        const race = from + offset;
        const own = await cookie(`race-${race}`, sess);
        const slow = () => harness.browser().get('/auth/github').set('Cookie', own).redirects(0);
        const signOut = () =>
          call(harness, harness.browser(), 'post', '/session/sign-out').set('Cookie', own);
        // Both orders, and a few milliseconds apart either way.
        const wait = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));
        await Promise.all([
          wait(race % 7).then(async () => slow()),
          wait(Math.floor(race / 7) % 7).then(async () => signOut()),
          wait(race % 5).then(async () => slow()),
        ]);
        const after = await call(
          harness,
          harness.browser(),
          'get',
          '/labs/00000000-0000-7000-8000-000000000000',
        ).set('Cookie', own);
        if (after.status !== 401) alive.push(`race ${race}: ${after.status}`);
      }),
    );
  }
  expect(alive).toEqual([]);
}, 120_000);

/** Sessions of their own for each race without half a thousand sign-ins: rows as the store makes them, cookies signed as ours. */
async function copyOfSession(template: Awaited<ReturnType<Harness['signIn']>>) {
  await call(harness, template, 'get', '/session');
  const found: unknown = await harness.database('sessions').whereNotNull('user_id').select('sess');
  const [row] = rows.parse(found);
  return {
    sess: row?.sess,
    cookie: async (sid: string, data: unknown) => {
      await harness.database('sessions').insert({
        sid,
        sess: JSON.stringify(data),
        expire: harness.database.raw(`now() + interval '1 hour'`),
      });
      // As express-session signs it: HMAC-SHA256 in base64 without its padding.
      const mac = createHmac('sha256', harness.config.sessionSecret)
        .update(sid)
        .digest('base64')
        .replace(/=+$/, '');
      return `qt=${encodeURIComponent(`s:${sid}.${mac}`)}`;
    },
  };
}
