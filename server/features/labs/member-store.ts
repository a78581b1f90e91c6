import { z } from 'zod';
import { type Role, roles, type Thing } from '../../../shared/permissions';
import type { LabMember } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';

const memberRow = z.object({
  lab_id: z.string(),
  user_id: z.string(),
  name: z.string(),
  login: z.string(),
  role: z.enum(roles),
  joined_at: z.date(),
});

type StoredMember = LabMember & Thing;

function mapRow(row: unknown): StoredMember {
  const { lab_id, user_id, name, login, role, joined_at } = memberRow.parse(row);
  return { labId: lab_id, userId: user_id, name, login, role, joinedAt: joined_at.toISOString() };
}

export function asMember({ userId, name, login, role, joinedAt }: StoredMember): LabMember {
  return { userId, name, login, role, joinedAt };
}

function members(transaction: Transaction, labId: string) {
  return transaction('memberships')
    .join('users', 'users.id', 'memberships.user_id')
    .where({ 'memberships.lab_id': labId })
    .select(
      'memberships.lab_id',
      'memberships.user_id',
      'users.name',
      'users.login',
      'memberships.role',
      'memberships.joined_at',
    );
}

export async function listMembers(transaction: Transaction, labId: string): Promise<StoredMember[]> {
  const rows: unknown[] = await members(transaction, labId).orderBy('memberships.joined_at');
  return rows.map(mapRow);
}

export async function findMember(
  transaction: Transaction,
  { labId, userId }: { readonly labId: string; readonly userId: string },
): Promise<StoredMember | null> {
  const rows: unknown[] = await members(transaction, labId).where({ 'memberships.user_id': userId });
  return rows[0] === undefined ? null : mapRow(rows[0]);
}

/** Makes someone a member, once: false where they are one already. */
export async function addMember(
  transaction: Transaction,
  member: { readonly labId: string; readonly userId: string; readonly role: Role; readonly joinedAt: Date },
): Promise<boolean> {
  const added: unknown[] = await transaction('memberships')
    .insert({
      lab_id: member.labId,
      user_id: member.userId,
      role: member.role,
      joined_at: member.joinedAt,
    })
    .onConflict(['lab_id', 'user_id'])
    .ignore()
    .returning('user_id');
  return added.length === 1;
}

/** How many leads there are but for one person; the lab's leads hold still until the transaction ends. */
export async function countOtherLeads(
  transaction: Transaction,
  labId: string,
  userId: string,
): Promise<number> {
  const leads = z
    .array(z.object({ user_id: z.string() }))
    .parse(
      await transaction('memberships')
        .where({ lab_id: labId, role: 'lead' })
        .orderBy('user_id')
        .forUpdate()
        .select('user_id'),
    );
  return leads.filter((lead) => lead.user_id !== userId).length;
}
