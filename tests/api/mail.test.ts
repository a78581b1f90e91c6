import { setTimeout as sleep } from 'node:timers/promises';
import fc from 'fast-check';
import type { Knex } from 'knex';
import { afterAll, beforeAll, beforeEach, expect, test } from 'vitest';
import { z } from 'zod';
import { headerOf } from '../../fake-smtp/read-message';
import type { TakenMessage } from '../../fake-smtp/mailbox';
import { openDatabase } from '../../server/db/database';
import { inTransaction } from '../../server/db/in-transaction';
import { tellWhatIsDue } from '../../server/features/notices';
import { mailboxOf, queueMail } from '../../server/mail';
import { calibrationSchema } from '../../shared/schemas';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { calibrationBody, join, makeLab, type TestLab } from './support/lab';

let harness: Harness;
let owners: Knex;
let lead: Agent;
let operator: Agent;
let lab: TestLab;
let userId = '';

beforeAll(async () => {
  harness = await startHarness({ jobs: true });
  owners = openDatabase({ databaseUrl: harness.testDatabase.adminUrl, databasePoolMax: 2 });
  // Today's own look is over before there is a lab, so that only the looks below find anything.
  const looked = () => owners('pgboss.job').where({ name: 'daily-look', state: 'completed' }).first('id');
  while ((await looked()) === undefined) await sleep(20);
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Writing lab');
  operator = await harness.signIn('juno-petrak');
  await join(harness, lead, lab.labId, await harness.signIn('ines-varga'), 'designer');
  await join(harness, lead, lab.labId, operator, 'operator');
  await join(harness, lead, lab.labId, await harness.signIn('mirela-stanic'), 'guest');
  for (const [login, address] of [
    ['adaeze-holm', 'adaeze@lab.example'],
    ['ines-varga', 'ines@lab.example'],
    ['juno-petrak', 'juno@lab.example'],
    ['mirela-stanic', 'mirela@lab.example'],
  ] as const) {
    await owners('users').where({ login }).update({ email: address });
  }
});
beforeAll(async () => {
  const row: unknown = await owners('users').where({ login: 'adaeze-holm' }).first('id');
  userId = z.object({ id: z.string() }).parse(row).id;
});
beforeEach(() => harness.smtp.mailbox.clear());
afterAll(async () => {
  await owners.destroy();
  await harness.close();
});

const within = <Result>(work: Parameters<typeof inTransaction<Result>>[2]) =>
  inTransaction(harness.database, { userId: null, labId: lab.labId }, work);

const lookOn = (day: string) =>
  within((transaction) =>
    tellWhatIsDue(transaction, { labId: lab.labId, publicOrigin: harness.origin, now: new Date(day) }),
  );

/** Everything that was queued has been sent. */
async function allSent(): Promise<readonly TakenMessage[]> {
  for (;;) {
    const unsent: unknown[] = await owners('mails').whereNull('sent_at').select('id');
    if (unsent.length === 0) return harness.smtp.mailbox.messages;
    await sleep(20);
  }
}

const subject = ({ headers }: TakenMessage) => headerOf(headers, 'Subject');
const sentTo = (messages: readonly TakenMessage[]) =>
  messages.flatMap(({ envelopeTo }) => envelopeTo).toSorted();

// Plates are measured on 1 June, and the lab's rule is 90 days: due on 30 August.
test('a plate that falls due is told to leads and designers, once; when it is overdue once more', async () => {
  await lookOn('2026-08-20T08:00:00Z');
  expect(await allSent()).toEqual([]);

  await lookOn('2026-08-25T08:00:00Z');
  await lookOn('2026-08-26T08:00:00Z');
  const due = await allSent();
  expect(sentTo(due)).toEqual(['adaeze@lab.example', 'ines@lab.example']);
  const [first] = due;
  expect(first?.text).toContain('H-3 is due for calibration on 30 August 2026.');
  expect(first?.text).toContain('it stands in the beam of signal arm');
  expect(first?.text).toContain(`${harness.origin}/labs/${lab.labId}/cabinet/${lab.plateIds[0]}`);
  // The spare plate is as old, but stands in no beam.
  expect(first?.text).not.toContain('H-9');
  expect(first === undefined ? '' : subject(first)).toBe('2 plates of Writing lab are due for calibration');

  harness.smtp.mailbox.clear();
  await lookOn('2026-09-03T12:00:00Z');
  const overdue = await allSent();
  expect(sentTo(overdue)).toEqual(['adaeze@lab.example', 'ines@lab.example']);
  expect(overdue[0]?.text).toContain('H-3 is 4 days past its calibration.');
  harness.smtp.mailbox.clear();
  await lookOn('2026-10-01T12:00:00Z');
  expect(await allSent()).toEqual([]);
});

test('whoever measured a plate is told of it too, and of no other, as long as they are a member', async () => {
  const body = calibrationBody({ measuredAt: '2026-06-10T10:00:00Z' });
  await answered(
    call(harness, operator, 'post', `/labs/${lab.labId}/plates/${lab.plateIds[0]}/calibrations`, { body }),
    calibrationSchema,
  );
  await allSent();
  harness.smtp.mailbox.clear();
  await lookOn('2026-09-05T08:00:00Z');
  const messages = await allSent();
  expect(sentTo(messages)).toEqual(['adaeze@lab.example', 'ines@lab.example', 'juno@lab.example']);
  const own = messages.find(({ envelopeTo }) => envelopeTo.includes('juno@lab.example'));
  expect(own?.text).toContain('H-3 is due');
  expect(own?.text).not.toContain('Q-B');
});

test('two servers that look at the same moment write one mail', async () => {
  const body = calibrationBody({ measuredAt: '2026-06-11T10:00:00Z' });
  await answered(
    call(harness, lead, 'post', `/labs/${lab.labId}/plates/${lab.plateIds[0]}/calibrations`, { body }),
    calibrationSchema,
  );
  await allSent();
  harness.smtp.mailbox.clear();
  await Promise.all([1, 2, 3].map(() => lookOn('2026-09-06T08:00:00Z')));
  expect(sentTo(await allSent())).toEqual(['adaeze@lab.example', 'ines@lab.example']);
});

test('a calibration that takes versions out of tolerance is told in one mail that names them', async () => {
  const body = calibrationBody({ measuredAt: '2026-06-12T10:00:00Z', offsetDeg: 19 });
  await answered(
    call(harness, lead, 'post', `/labs/${lab.labId}/plates/${lab.plateIds[0]}/calibrations`, { body }),
    calibrationSchema,
  );
  while (harness.smtp.mailbox.messages.length < 2) await sleep(20);
  const messages = await allSent();
  expect(sentTo(messages)).toEqual(['adaeze@lab.example', 'ines@lab.example']);
  const [first] = messages;
  expect(first === undefined ? '' : subject(first)).toBe(
    'Two states 1 is out of tolerance since H-3 was calibrated',
  );
  expect(first?.text).toMatch(
    /As dialled: \d of 2 targets not within 1\.0e-3, the worst \S+ with 1 - F \d\.\de-\d/,
  );
  expect(first?.text).toMatch(/Re-solved: /);
});

test('every mail is plain text from us, marked as written by a program, and counts nobody', async () => {
  await within((transaction) =>
    queueMail(
      transaction,
      { labId: lab.labId, now: new Date() },
      {
        toUserId: userId,
        to: { name: 'Zoë Ångström', address: 'zoe@lab.example' },
        subject: 'Q-B’s zero moved by 0.82° – look',
        text: 'Zoë,\n\n1 − F is 4 × 10⁻⁴.\n.\nA line with one dot is above.\n',
      },
    ),
  );
  const [message] = await allSent();
  const header = (name: string) => (message === undefined ? '' : headerOf(message.headers, name));
  expect(header('Content-Type')).toMatch(/^text\/plain; charset=utf-8/);
  expect(header('From')).toBe('Quarterturn <quarterturn@localhost>');
  expect(header('To')).toBe('Zoë Ångström <zoe@lab.example>');
  expect(header('Auto-Submitted')).toBe('auto-generated');
  expect(header('Subject')).toBe('Q-B’s zero moved by 0.82° – look');
  expect(message?.text.replaceAll('\r\n', '\n').trimEnd()).toBe(
    'Zoë,\n\n1 − F is 4 × 10⁻⁴.\n.\nA line with one dot is above.',
  );
  expect(message?.envelopeFrom).toBe('quarterturn@localhost');
});

test('a mail server that is busy or away gets everything in the end, and no request waits for it', async () => {
  harness.smtp.putOff(1);
  await within((transaction) =>
    queueMail(
      transaction,
      { labId: lab.labId, now: new Date() },
      {
        toUserId: userId,
        to: { name: 'A', address: 'a@lab.example' },
        subject: 'Put off',
        text: 'Text.',
      },
    ),
  );
  const retried = async () => {
    const changed = await owners('pgboss.job')
      .where({ name: 'mail', state: 'retry' })
      .update({ start_after: owners.raw('now()') });
    return changed > 0;
  };
  while (!(await retried())) await sleep(20);
  expect((await allSent()).map(subject)).toEqual(['Put off']);
});

test('killed between commit and sending nothing is lost; killed just after sending it goes out again as the same mail', async () => {
  const unsentId = await within(async (transaction) => {
    await queueMail(
      transaction,
      { labId: lab.labId, now: new Date() },
      {
        toUserId: userId,
        to: { name: 'A', address: 'a@lab.example' },
        subject: 'Once and again',
        text: 'Text.',
      },
    );
    const row: unknown = await transaction('mails').where({ subject: 'Once and again' }).first('id');
    return z.object({ id: z.string() }).parse(row).id;
  });
  const [before] = await allSent();
  // As a process that was gone before it could note the sending leaves it: unsent, and its job under way.
  await owners('mails').where({ id: unsentId }).update({ sent_at: null });
  await owners('pgboss.job')
    .whereRaw(`name = 'mail' and data ->> 'mailId' = ?`, [unsentId])
    .update({ state: 'retry', completed_on: null, start_after: owners.raw('now()') });
  const messages = await allSent();
  expect(messages).toHaveLength(2);
  const ids = messages.map(({ headers }) => headerOf(headers, 'Message-ID'));
  expect(ids).toEqual([`<${unsentId}@localhost>`, `<${unsentId}@localhost>`]);
  expect(before === undefined ? '' : headerOf(before.headers, 'Message-ID')).toBe(ids[0]);
});

/** Names and addresses as an account could hold them, with what headers and SMTP commands are made of. */
const hostile = fc.oneof(
  fc.string({ unit: 'binary', maxLength: 40 }),
  fc
    .array(
      fc.constantFrom(
        '\r\n',
        '\n',
        '\r',
        '\0',
        '\u2028',
        'Bcc: x@evil.example',
        '"',
        '<',
        '>',
        ',',
        ';',
        ':',
        '@',
        'a',
        ' ',
        '=?utf-8?B?DQo=?=',
        '\u202E',
        '\u00AD',
        '(',
        '\\',
      ),
      { maxLength: 12 },
    )
    .map((parts) => parts.join('')),
);

test('no name or address adds a header, a recipient or a line to what is sent', async () => {
  const people = fc.array(fc.record({ name: hostile, local: hostile }), { minLength: 20, maxLength: 30 });
  await fc.assert(
    fc.asyncProperty(people, async (persons) => {
      harness.smtp.mailbox.clear();
      const mailboxes = persons
        .flatMap(({ name, local }) => [
          mailboxOf({ name, email: `${local}@lab.example` }),
          mailboxOf({ name, email: 'a@lab.example' }),
        ])
        .filter((mailbox) => mailbox !== null);
      await within(async (transaction) => {
        for (const to of mailboxes) {
          const mail = { toUserId: userId, to, subject: 'A subject', text: 'Text.' };
          await queueMail(transaction, { labId: lab.labId, now: new Date() }, mail);
        }
      });
      const messages = await allSent();
      expect(sentTo(messages)).toEqual(mailboxes.map(({ address }) => address).toSorted());
      for (const { headers, text } of messages) {
        expect(headers.map(([header]) => header.toLowerCase()).toSorted()).toEqual([
          'auto-submitted',
          'content-transfer-encoding',
          'content-type',
          'date',
          'from',
          'message-id',
          'mime-version',
          'subject',
          'to',
        ]);
        expect(text.trim()).toBe('Text.');
      }
    }),
    { numRuns: 2 },
  );
}, 120_000);

test('addresses that a header or a command could be made of are none', () => {
  for (const email of [
    null,
    '',
    'a',
    'a@',
    '@b.example',
    'a@b@c.example',
    'a b@c.example',
    '"a@evil.example"@c.example',
    'a@c.example\r\nBcc: d@e.example',
    'a@c.example, d@e.example',
    'a@[127.0.0.1]',
    'A <a@c.example>',
    'a@c.example>',
    `${'a'.repeat(65)}@c.example`,
    'a\u00AD@c.example',
  ]) {
    expect(mailboxOf({ name: 'A', email }), String(email)).toBeNull();
  }
  expect(mailboxOf({ name: 'A\r\nBcc: b@c.example', email: 'a.b+c@d-e.example' })).toEqual({
    name: 'A  Bcc: b@c.example',
    address: 'a.b+c@d-e.example',
  });
});

test('a subject of two lines is never queued', async () => {
  const queue = within((transaction) =>
    queueMail(
      transaction,
      { labId: lab.labId, now: new Date() },
      {
        toUserId: userId,
        to: { name: 'A', address: 'a@lab.example' },
        subject: 'One\r\nBcc: b@c.example',
        text: 'Text.',
      },
    ),
  );
  await expect(queue).rejects.toThrow(RangeError);
});

test('the mailbox shows what came on a page of its own, and lets nothing in it run', async () => {
  harness.smtp.mailbox.take(
    Buffer.from('Subject: <script>alert(1)</script>\r\n\r\n<img src=x onerror=alert(1)>\r\n'),
    { from: 'a@b.example', to: ['c@d.example'] },
  );
  const list = await (await fetch(harness.smtp.pageUrl)).text();
  expect(list).toContain('&lt;script&gt;');
  const number = harness.smtp.mailbox.messages[0]?.number ?? 0;
  const page = await (await fetch(`${harness.smtp.pageUrl}/messages/${number}`)).text();
  expect(page).toContain('&lt;img src=x');
  expect(`${list}${page}`).not.toMatch(/<(?:script|img)/);
  expect((await fetch(`${harness.smtp.pageUrl}/messages/99999`)).status).toBe(404);
});
