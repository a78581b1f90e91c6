import { useDeferredValue, useEffect, useMemo, useState } from 'react';
import type { Convention } from '../../../../shared/optics/convention';
import type { Stokes } from '../../../../shared/optics/stokes';
import { type CsvProblem, readTargetCsv } from '../../../../shared/protocol/target-csv';
import { readRow, type RowReading } from '../../../../shared/protocol/solve-row';
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
  /** Those among them that can be read. */
  readonly readable: readonly FoundRow[];
  readonly problems: readonly CsvProblem[];
  /** Lines of a text that gave no row. */
  readonly leftOut: number;
  /** The convention that a file named, where its rows were translated out of it. */
  readonly translatedFrom: Convention | null;
  readonly chosen: ChosenSet;
  /** Each readable row on the sphere: the state, or where a unitary takes H. */
  readonly points: readonly Point[];
  /** Whether the rows are still those of an older text. */
  readonly isBehind: boolean;
}

interface Point {
  readonly label: string;
  readonly state: Stokes;
}

function pointOf(label: string, reading: RowReading): Point {
  return { label, state: reading.kind === 'state' ? reading.stokes : imageOf(reading.quaternion, [1, 0, 0]) };
}

// Reading more than this may take longer than a keystroke.
const longText = 100_000;
const settlesAfterMs = 300;

/** The text to be read: a little behind what is typed, and a long one only when it stopped changing. */
function useReadText(text: string): string {
  const deferred = useDeferredValue(text);
  const [settled, settle] = useState(text);
  useEffect(() => {
    if (text.length <= longText) return;
    const timer = setTimeout(() => settle(text), settlesAfterMs);
    return () => clearTimeout(timer);
  }, [text]);
  return deferred.length > longText ? settled : deferred;
}

/** What would be added: from the chosen set, or from the text. */
export function useFoundRows(
  from: RowsFrom,
  choice: SetChoice,
  text: string,
  kind: ProtocolKind,
  convention: Convention,
): FoundRows {
  const read = useReadText(text);
  const set = useMemo(() => {
    const chosen = chosenSet(choice, convention);
    const rows = chosen.ok ? chosen.rows : [];
    const points = rows.flatMap(({ label, expression }) => {
      const row = readRow(expression, kind, convention);
      return row.ok ? [pointOf(label, row.reading)] : [];
    });
    return { chosen, rows, readable: rows, points };
  }, [choice, kind, convention]);
  const csv = useMemo(() => {
    const { rows, problems, leftOut, translatedFrom } = readTargetCsv(read, {
      kind: kind === 'apply' ? 'unitary' : 'state',
      convention,
    });
    const points = rows.flatMap(({ label, reading }) => (reading === null ? [] : [pointOf(label, reading)]));
    const readable = rows.filter(({ reading }) => reading !== null);
    return { rows, readable, problems, leftOut, points, translatedFrom };
  }, [read, kind, convention]);
  return from === 'set'
    ? { ...set, problems: [], leftOut: 0, translatedFrom: null, isBehind: false }
    : { ...csv, chosen: set.chosen, isBehind: text !== read };
}

/** How many of the found rows still have room in a protocol that holds `present` already. */
export function roomFor(found: number, present: number): number {
  return Math.max(0, Math.min(found, maxTargets - present));
}
