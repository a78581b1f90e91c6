import { once } from 'node:events';
import { setTimeout as sleep } from 'node:timers/promises';
import type { Knex } from 'knex';
import { createTransport } from 'nodemailer';
import type { Config } from '../config';
import { inTransaction } from '../db/in-transaction';
import { jobData, type Worker, worker } from '../jobs';
import { findUnsent, type OutgoingMail, setSent } from './outbox';

const waitMs = 5_000;
/** A server that stops gives a mail under way this long, which is less than it gives itself. */
const graceMs = 3_000;
const loopback = /^smtps?:\/\/(?:[^@/]*@)?(?:localhost|127\.0\.0\.1|\[::1\])(?:[:/?]|$)/;

/**
 * Sends what is queued. A mail that was handed over just before the process died goes out once more, under the same
 * Message-ID: at least once, and a reader's program shows it once.
 */
export function mailWorker({
  database,
  mail,
}: {
  readonly database: Knex;
  readonly mail: NonNullable<Config['mail']>;
}): Worker {
  const transport = createTransport({
    url: mail.smtpUrl,
    // Beyond this machine a mail travels encrypted or not at all; smtp://…?requireTLS=false says otherwise.
    requireTLS: !loopback.test(mail.smtpUrl),
    connectionTimeout: waitMs,
    greetingTimeout: waitMs,
    socketTimeout: 2 * waitMs,
    dnsTimeout: waitMs,
    disableFileAccess: true,
    disableUrlAccess: true,
  });
  const kind = { name: 'mail', data: jobData.mail, idleMs: 1_000 } as const;
  return worker(kind, async (key, signal) => {
    const within = <Result>(work: Parameters<typeof inTransaction<Result>>[2]) =>
      inTransaction(database, { userId: null, labId: key.labId }, work);
    const unsent = await within((transaction) => findUnsent(transaction, key));
    if (unsent === null) return;
    await unlessStopping(transport.sendMail(message(unsent, mail.from)), signal);
    await within((transaction) => setSent(transaction, key, new Date()));
  });
}

/** @throws Error when the signal has said stop and the work is not done soon after. */
async function unlessStopping(work: Promise<unknown>, signal: AbortSignal): Promise<void> {
  const over = new AbortController();
  const untilOver = { signal: over.signal };
  const stopping = once(signal, 'abort', untilOver)
    .then(() => sleep(graceMs, undefined, untilOver))
    .then(() => Promise.reject(new Error('the server stops while a mail is under way')));
  try {
    await Promise.race([work, stopping]);
  } finally {
    over.abort();
  }
}

function message({ id, to, subject, text, queuedAt }: OutgoingMail, from: string) {
  return {
    from: { name: 'Quarterturn', address: from },
    to: [{ name: to.name, address: to.address }],
    subject,
    text,
    date: queuedAt,
    messageId: `<${id}@${from.slice(from.lastIndexOf('@') + 1)}>`,
    // RFC 3834: no program answers what a program wrote.
    headers: { 'Auto-Submitted': 'auto-generated' },
    textEncoding: 'quoted-printable' as const,
  };
}
