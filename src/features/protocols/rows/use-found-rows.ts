import { useDeferredValue, useMemo } from 'react';
import type { Convention } from '../../../../shared/optics/convention';
import type { Stokes } from '../../../../shared/optics/stokes';
import { type CsvProblem, readTargetCsv } from '../../../../shared/protocol/target-csv';
import { readRow } from '../../../../shared/protocol/solve-row';
import { maxTargets, type ProtocolKind } from '../../../../shared/schemas/protocols';
import { imageOf } from '../designer/followed-light';
import { chosenSet, type ChosenSet, type SetChoice } from './target-set-choice';

export type RowsFrom = 'set' | 'text';

export interface FoundRow {
  readonly label: string;
  readonly expression: string;
}

export interface FoundRows {
  readonly rows: readonly FoundRow[];
  readonly problems: readonly CsvProblem[];
  readonly chosen: ChosenSet;
  /** Each readable row on the sphere: the state, or where a unitary takes H. */
  readonly points: readonly { readonly label: string; readonly state: Stokes }[];
}

/** What would be added: from the chosen set, or from the text. */
export function useFoundRows(
  from: RowsFrom,
  choice: SetChoice,
  text: string,
  kind: ProtocolKind,
  convention: Convention,
): FoundRows {
  const read = useDeferredValue(text);
  return useMemo(() => {
    const chosen = chosenSet(choice, convention);
    const csv = readTargetCsv(read, { kind: kind === 'apply' ? 'unitary' : 'state', convention });
    const rows = from === 'text' ? csv.rows : chosen.ok ? chosen.rows : [];
    const points = rows.flatMap(({ label, expression }) => {
      const row = readRow(expression, kind, convention);
      if (!row.ok) return [];
      const { reading } = row;
      return [
        { label, state: reading.kind === 'state' ? reading.stokes : imageOf(reading.quaternion, [1, 0, 0]) },
      ];
    });
    return { rows, problems: from === 'text' ? csv.problems : [], chosen, points };
  }, [from, choice, read, kind, convention]);
}

/** How many of the found rows still have room in a protocol that holds `present` already. */
export function roomFor(found: number, present: number): number {
  return Math.max(0, Math.min(found, maxTargets - present));
}
