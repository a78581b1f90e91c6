import { z } from 'zod';
import type { Transaction } from '../db/database';
import { newId } from '../db/new-id';
import { queueJob } from '../jobs';
import { type Mailbox, requireLine } from './mailbox';

/** A mail in plain text, as a lab sends it to one of its members. */
export interface Mail {
  readonly toUserId: string;
  readonly to: Mailbox;
  readonly subject: string;
  readonly text: string;
}

const mailRow = z.object({
  id: z.string(),
  to_name: z.string(),
  to_address: z.string(),
  subject: z.string(),
  body: z.string(),
  queued_at: z.date(),
});

/** A mail on its way. */
export interface OutgoingMail {
  readonly id: string;
  readonly to: Mailbox;
  readonly subject: string;
  readonly text: string;
  readonly queuedAt: Date;
}

/** Writes a mail and queues its sending in the transaction of what it tells of. */
export async function queueMail(
  transaction: Transaction,
  { labId, now }: { readonly labId: string; readonly now: Date },
  { toUserId, to, subject, text }: Mail,
): Promise<void> {
  const id = newId(now);
  await transaction('mails').insert({
    id,
    lab_id: labId,
    to_user_id: toUserId,
    to_name: to.name,
    to_address: to.address,
    subject: requireLine(subject),
    body: text,
    queued_at: now,
  });
  await queueJob(transaction, 'mail', { labId, mailId: id });
}

/** A mail that was not sent yet, else null. */
export async function findUnsent(
  transaction: Transaction,
  key: { readonly labId: string; readonly mailId: string },
): Promise<OutgoingMail | null> {
  const found: unknown = await transaction('mails')
    .where({ lab_id: key.labId, id: key.mailId, sent_at: null })
    .first('id', 'to_name', 'to_address', 'subject', 'body', 'queued_at');
  if (found === undefined) return null;
  const row = mailRow.parse(found);
  return {
    id: row.id,
    to: { name: row.to_name, address: row.to_address },
    subject: row.subject,
    text: row.body,
    queuedAt: row.queued_at,
  };
}

export async function setSent(
  transaction: Transaction,
  key: { readonly labId: string; readonly mailId: string },
  at: Date,
): Promise<void> {
  await transaction('mails').where({ lab_id: key.labId, id: key.mailId }).update({ sent_at: at });
}
