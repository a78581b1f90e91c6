import { type Convention, CONVENTION_SETS, type ConventionSet, sameConvention } from '../../../shared/optics';
import type { WrittenPart, WrittenValue } from './written-parts';

/** A value beside the one that was typed. */
export interface ComparedValue extends WrittenValue {
  readonly differs: boolean;
}

export interface ComparedPart extends WrittenPart {
  readonly differs: boolean;
  readonly values: readonly ComparedValue[];
}

/** One convention, what it writes, and where that is not what was typed. */
export interface ComparedRow {
  readonly id: string;
  readonly name: string;
  readonly convention: Convention;
  /** The published set that the row is of; null for a lab's own flags and for bare ones. */
  readonly set: ConventionSet | null;
  readonly parts: readonly ComparedPart[];
  /** Whether all three flags are those that it was typed in. */
  readonly sameFlags: boolean;
  /** Whether it is the very convention that it was typed in. */
  readonly typed: boolean;
}

/** What it was typed in: flags, and the set they were chosen by, if any. */
export interface Chosen {
  readonly convention: Convention;
  readonly setId: string | null;
}

/** One's own convention, by the name of the lab. */
export interface OwnConvention {
  readonly name: string;
  readonly convention: Convention;
}

type WriteParts = (convention: Convention) => readonly WrittenPart[];

function compared(parts: readonly WrittenPart[], typed: readonly WrittenPart[]): readonly ComparedPart[] {
  return parts.map((part, p) => {
    // Compared as shown: what a person reads side by side.
    const values = part.values.map((value, v) => ({
      ...value,
      differs: value.shown !== typed[p]?.values[v]?.shown,
    }));
    return { ...part, values, differs: values.some(({ differs }) => differs) };
  });
}

/** One's own first (or what was typed, for a stranger), then what was typed if that is neither, then every published set. */
export function comparedRows(
  write: WriteParts,
  chosen: Chosen,
  own: OwnConvention | null,
): readonly ComparedRow[] {
  const typedParts = write(chosen.convention);
  const rowOf = (
    id: string,
    name: string,
    convention: Convention,
    set: ConventionSet | null,
    typed: boolean,
  ): ComparedRow => ({
    id,
    name,
    convention,
    set,
    parts: compared(write(convention), typedParts),
    sameFlags: sameConvention(convention, chosen.convention),
    typed,
  });
  const typedInOwn =
    own !== null && chosen.setId === null && sameConvention(own.convention, chosen.convention);
  const typedRow = rowOf('typed', 'As typed', chosen.convention, null, true);
  const setRows = CONVENTION_SETS.map((set) =>
    rowOf(set.id, set.name, set.convention, set, set.id === chosen.setId),
  );
  if (own === null) return [typedRow, ...setRows];
  const ownRow = rowOf('own', own.name, own.convention, null, typedInOwn);
  return chosen.setId === null && !typedInOwn ? [ownRow, typedRow, ...setRows] : [ownRow, ...setRows];
}

/** What in a row is not written as typed, by name: a part, or the few of its numbers that differ. */
export function differingNames({ parts }: ComparedRow): readonly string[] {
  return parts.filter(({ differs }) => differs).flatMap(differingIn);
}

function differingIn({ id, name, values }: ComparedPart): readonly string[] {
  const labels = values.filter(({ differs }) => differs).map(({ label }) => label);
  if (id === 'bloch') return [`Bloch ${labels.join(', ')}`];
  return id === 'stokes' || id === 'ellipse' ? labels : [name];
}
