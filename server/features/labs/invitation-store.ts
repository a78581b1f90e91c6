import { z } from 'zod';
import { roles, type Thing } from '../../../shared/permissions';
import type { Invitation } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';

const invitationRow = z.object({
  id: z.string(),
  lab_id: z.string(),
  role: z.enum(roles),
  note: z.string(),
  created_at: z.date(),
  expires_at: z.date(),
});

export type StoredInvitation = Invitation & Thing;

function mapRow(row: unknown): StoredInvitation {
  const { id, lab_id, role, note, created_at, expires_at } = invitationRow.parse(row);
  return {
    id,
    labId: lab_id,
    role,
    note,
    createdAt: created_at.toISOString(),
    expiresAt: expires_at.toISOString(),
  };
}

export function asInvitation({ id, role, note, createdAt, expiresAt }: StoredInvitation): Invitation {
  return { id, role, note, createdAt, expiresAt };
}

/** Those that can still be accepted. */
function open(transaction: Transaction) {
  return transaction('invitations')
    .whereNull('accepted_at')
    .whereNull('revoked_at')
    .where('expires_at', '>', transaction.fn.now());
}

export async function listOpenInvitations(
  transaction: Transaction,
  labId: string,
): Promise<StoredInvitation[]> {
  const rows: unknown[] = await open(transaction)
    .where({ lab_id: labId })
    .orderBy('created_at', 'desc')
    .select();
  return rows.map(mapRow);
}

export async function findOpenInvitation(
  transaction: Transaction,
  { labId, invitationId }: { readonly labId: string; readonly invitationId: string },
): Promise<StoredInvitation | null> {
  const found: unknown = await open(transaction).where({ lab_id: labId, id: invitationId }).first();
  return found === undefined ? null : mapRow(found);
}

/** What the holder of a link may see before they are anything in the lab. */
export async function findByToken(transaction: Transaction, hash: string): Promise<StoredInvitation | null> {
  await holding(transaction, hash);
  const found: unknown = await open(transaction).where({ token_hash: hash }).first();
  return found === undefined ? null : mapRow(found);
}

/** One that this person has accepted, found by the link they hold. */
export async function findAccepted(
  transaction: Transaction,
  hash: string,
  userId: string,
): Promise<StoredInvitation | null> {
  await holding(transaction, hash);
  const found: unknown = await transaction('invitations')
    .where({ token_hash: hash, accepted_by: userId })
    .first();
  return found === undefined ? null : mapRow(found);
}

/** Lets the rest of the transaction see the one invitation whose link is held. */
async function holding(transaction: Transaction, hash: string): Promise<void> {
  await transaction.raw(`select set_config('app.invitation_hash', ?, true)`, [hash]);
}

/** Marks it used, once: false where someone else was quicker. */
export async function markAccepted(
  transaction: Transaction,
  invitation: StoredInvitation,
  userId: string,
): Promise<boolean> {
  const changed: unknown = await open(transaction)
    .where({ lab_id: invitation.labId, id: invitation.id })
    .update({ accepted_by: userId, accepted_at: transaction.fn.now() });
  return changed === 1;
}
