import type { Role } from '../../../shared/permissions';

/** What each role may do, as one clause after its name. */
export const roleWords: Readonly<Record<Role, string>> = {
  lead: 'may do everything here, and sets members, invitations, convention and due times.',
  designer: 'writes protocols and saves versions, keeps the cabinet and the benches, and runs.',
  operator: 'runs versions at the bench, and records calibrations; cannot change drafts.',
  guest: 'reads what the lab has, and changes nothing.',
};

/** With its article, as in "as a designer". */
export function roleWithArticle(role: Role): string {
  return role === 'operator' ? 'an operator' : `a ${role}`;
}
