import {
  type ColumnMapping,
  type ColumnProposal,
  SCAN_ROLES,
  type ScanRole,
} from '../../../shared/scan-file';

type Choice<Role extends ScanRole> = ColumnMapping[Role] | null;

/** Which column is what while a person is still choosing: the dial too may be open. */
export interface ColumnRoles {
  readonly dial: Choice<'dial'>;
  readonly crossed: Choice<'crossed'>;
  readonly parallel: Choice<'parallel'>;
  readonly crossedSigma: Choice<'crossedSigma'>;
  readonly parallelSigma: Choice<'parallelSigma'>;
}

export const NO_ROLES: ColumnRoles = {
  dial: null,
  crossed: null,
  parallel: null,
  crossedSigma: null,
  parallelSigma: null,
};

export function rolesOfProposal({ columns }: ColumnProposal): ColumnRoles {
  const choice = (role: ScanRole) => {
    const column = columns[role];
    return column === null ? null : { column, unit: null };
  };
  return {
    dial: choice('dial'),
    crossed: choice('crossed'),
    parallel: choice('parallel'),
    crossedSigma: choice('crossedSigma'),
    parallelSigma: choice('parallelSigma'),
  };
}

export function roleOf(roles: ColumnRoles, column: number): ScanRole | null {
  return SCAN_ROLES.find((role) => roles[role]?.column === column) ?? null;
}

/** The same with `column` in that role, and in no other; what had the role has none. */
export function withRole(roles: ColumnRoles, column: number, role: ScanRole | null): ColumnRoles {
  const cleared = SCAN_ROLES.reduce<ColumnRoles>(
    (left, other) => (left[other]?.column === column ? { ...left, [other]: null } : left),
    roles,
  );
  return role === null ? cleared : { ...cleared, [role]: { column, unit: null } };
}

/** The mapping that is chosen, or what it lacks in a sentence. */
export function mappingOfRoles(
  roles: ColumnRoles,
): { readonly ok: true; readonly mapping: ColumnMapping } | { readonly ok: false; readonly problem: string } {
  const { dial, crossed, parallel, crossedSigma, parallelSigma } = roles;
  if (dial === null) return { ok: false, problem: 'Say which column is the dial’s reading.' };
  if (crossed === null && parallel === null) {
    return { ok: false, problem: 'Say which column is the power.' };
  }
  if (crossedSigma !== null && crossed === null) {
    return { ok: false, problem: 'There is a σ of the crossed power and no crossed power. Choose it too.' };
  }
  if (parallelSigma !== null && parallel === null) {
    return { ok: false, problem: 'There is a σ of the parallel power and no parallel power. Choose it too.' };
  }
  return { ok: true, mapping: { dial, crossed, parallel, crossedSigma, parallelSigma } };
}
