/** What a person is in one lab. */
export const roles = ['lead', 'designer', 'operator', 'guest'] as const;
export type Role = (typeof roles)[number];

/** Everything that a member of a lab can be allowed to do. A guest may only read. */
export const actions = [
  'lab.read',
  'lab.settings',
  'members.manage',
  'invitations.manage',
  'cabinet.read',
  'cabinet.write',
  'calibrations.record',
  'files.upload',
  'benches.read',
  'benches.write',
  'protocols.read',
  'protocols.write',
  'versions.read',
  'versions.save',
  'runs.read',
  'runs.record',
] as const;
export type Action = (typeof actions)[number];

const readingActions: readonly Action[] = [
  'lab.read',
  'cabinet.read',
  'benches.read',
  'protocols.read',
  'versions.read',
  'runs.read',
];

const allowed: Readonly<Record<Role, ReadonlySet<Action>>> = {
  guest: new Set(readingActions),
  operator: new Set<Action>([...readingActions, 'calibrations.record', 'files.upload', 'runs.record']),
  designer: new Set<Action>([
    ...readingActions,
    'calibrations.record',
    'files.upload',
    'runs.record',
    'cabinet.write',
    'benches.write',
    'protocols.write',
    'versions.save',
  ]),
  lead: new Set(actions),
};

/** A person in a lab; null for someone who is signed in but no member. */
export interface Member {
  readonly userId: string;
  readonly labId: string;
  readonly role: Role;
}

/** The stored row that an action touches: the lab it belongs to decides, never an id that a request names. */
export interface Thing {
  readonly labId: string;
}

/** May this member do this to this thing? Drives the buttons of the client and the refusals of the server. */
export function can(member: Member | null, action: Action, thing: Thing): boolean {
  return member !== null && member.labId === thing.labId && allowed[member.role].has(action);
}
