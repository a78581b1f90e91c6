import { createContext, useContext } from 'react';
import type { Action, Member } from '../../../shared/permissions';
import { can } from '../../../shared/permissions';
import type { Lab, Session } from '../../../shared/schemas/labs';

/** The lab that a page belongs to, and what the person at it may do there. */
export interface LabContextValue {
  readonly lab: Lab;
  readonly member: Member;
  readonly user: NonNullable<Session['user']>;
}

export const LabContext = createContext<LabContextValue | null>(null);

/** @throws Error outside the pages of a lab: a fault of ours, not of the person's. */
export function useLab(): LabContextValue & { readonly may: (action: Action) => boolean } {
  const value = useContext(LabContext);
  if (value === null) throw new Error('useLab is for the pages of a lab.');
  return { ...value, may: (action) => can(value.member, action, { labId: value.lab.id }) };
}
