import { z } from 'zod';
import { type Role, roles } from '../../../shared/permissions';
import type { Transaction } from '../../db/database';
import { type Mailbox, mailboxOf } from '../../mail';

const memberRow = z.object({
  user_id: z.string(),
  role: z.enum(roles),
  name: z.string(),
  email: z.string().nullable(),
});

/** A member of a lab who can be written to. */
export interface Reachable {
  readonly userId: string;
  readonly role: Role;
  readonly mailbox: Mailbox;
}

/** Every member of a lab whose account has an address, in the order of joining. */
export async function reachableMembers(transaction: Transaction, labId: string): Promise<Reachable[]> {
  const rows: unknown[] = await transaction('memberships')
    .join('users', 'users.id', 'memberships.user_id')
    .where({ 'memberships.lab_id': labId })
    .whereNull('users.disabled_at')
    .orderBy(['memberships.joined_at', 'memberships.user_id'])
    .select('memberships.user_id', 'memberships.role', 'users.name', 'users.email');
  return z
    .array(memberRow)
    .parse(rows)
    .flatMap(({ user_id, role, ...person }) => {
      const mailbox = mailboxOf(person);
      return mailbox === null ? [] : [{ userId: user_id, role, mailbox }];
    });
}

/** Those who keep the cabinet: leads and designers. */
export const keepsCabinet = ({ role }: Reachable): boolean => role === 'lead' || role === 'designer';
