import { shown } from './fault-list';
import type { Header } from './header';
import type { Proposed } from './propose-columns';
import type { CellTable } from './table';
import { type ColumnMapping, SCAN_ROLES, type ScanRole } from './types';

/** The mapping that a proposal makes, of one port where only one is named; null where it leaves something open. */
export function mappingOf({ proposal, questions }: Proposed): ColumnMapping | null {
  const { dial, crossed, parallel, crossedSigma, parallelSigma } = proposal.columns;
  if (questions.length > 0 || dial === null || (crossed === null && parallel === null)) return null;
  return {
    dial: { column: dial, unit: null },
    crossed: choiceOf(crossed),
    parallel: choiceOf(parallel),
    crossedSigma: choiceOf(crossedSigma),
    parallelSigma: choiceOf(parallelSigma),
  };
}

function choiceOf(column: number | null): { readonly column: number; readonly unit: null } | null {
  return column === null ? null : { column, unit: null };
}

export interface MappingFault {
  readonly line: number;
  /** From 0; null where no column is named. */
  readonly column: number | null;
  readonly what: string;
  readonly remedy: string;
}

/** What is wrong with a mapping from outside: no power, a σ of none, columns that the file doesn't have, or one column twice. */
export function checkMapping(mapping: ColumnMapping, table: CellTable): readonly MappingFault[] {
  const line = table.header.line ?? table.rows[0]?.line ?? 1;
  const found: MappingFault[] = [];
  if (mapping.crossed === null && mapping.parallel === null) {
    const what = 'The mapping names neither the crossed nor the parallel power.';
    found.push({ line, column: null, what, remedy: 'Choose the column of at least one of them.' });
  }
  for (const port of ['crossed', 'parallel'] as const) {
    const sigma = mapping[`${port}Sigma`];
    if (sigma === null || mapping[port] !== null) continue;
    const what = `The mapping names a σ of the ${port} power, and no ${port} power.`;
    const remedy = 'Choose the column of that power too, or none for its σ.';
    found.push({ line, column: sigma.column, what, remedy });
  }
  const seen = new Set<number>();
  for (const role of SCAN_ROLES) {
    const column = mapping[role]?.column ?? null;
    if (column === null) continue;
    if (!Number.isInteger(column) || column < 0 || column >= table.columnCount) {
      const what = `The mapping names column ${column + 1}, and the file has ${table.columnCount}.`;
      found.push({ line, column, what, remedy: 'Choose the columns again.' });
    } else if (seen.has(column)) {
      const what = `The mapping names column ${column + 1} for two things.`;
      found.push({ line, column, what, remedy: 'Choose another column for one of them.' });
    }
    seen.add(column);
  }
  return found;
}

/** Where a mapping from outside and the header's words differ, which may be right and has to be seen. */
export function mappingNotes(mapping: ColumnMapping, header: Header): readonly string[] {
  return SCAN_ROLES.flatMap((role) => {
    const choice = mapping[role];
    if (choice === null) return [];
    const { name = null, subject } = header.columns[choice.column] ?? {};
    if (name === null || subject === undefined || subject.quantity === null) return [];
    const { quantity, isSigma } = SUBJECTS[role];
    if (subject.quantity === quantity && subject.isSigma === isSigma) return [];
    return [`${shown(name)} is read as ${isSigma ? 'the σ of ' : ''}${quantity}, as the mapping says.`];
  });
}

const SUBJECTS: Readonly<Record<ScanRole, { readonly quantity: string; readonly isSigma: boolean }>> = {
  dial: { quantity: 'dial', isSigma: false },
  crossed: { quantity: 'crossed', isSigma: false },
  parallel: { quantity: 'parallel', isSigma: false },
  crossedSigma: { quantity: 'crossed', isSigma: true },
  parallelSigma: { quantity: 'parallel', isSigma: true },
};
