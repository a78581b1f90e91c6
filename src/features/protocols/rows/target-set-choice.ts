import type { Convention } from '../../../../shared/optics/convention';
import {
  type BasisPair,
  cliffordTurns,
  greatCircle,
  haarStates,
  haarUnitaries,
  MAX_SET,
  pauliStates,
  type TargetRow,
  tetrahedron,
  type TetrahedronOrientation,
  twoConjugateBases,
} from '../../../../shared/optics/target-sets';
import type { ProtocolKind } from '../../../../shared/schemas/protocols';
import { readTypedNumber } from '../../../lib/forms';

export type StateSetName = 'pauli' | 'tetrahedron' | 'two-bases' | 'great-circle' | 'haar';
export type UnitarySetName = 'clifford' | 'haar-unitaries';
export type SetName = StateSetName | UnitarySetName;

/** A set as it is chosen and typed. */
export interface SetChoice {
  readonly name: SetName;
  readonly orientation: TetrahedronOrientation;
  readonly pair: BasisPair;
  readonly pole: string;
  readonly startAzimuthDeg: string;
  readonly count: string;
  readonly seed: string;
}

export const setNames: Readonly<
  Record<ProtocolKind, readonly { readonly value: SetName; readonly label: string }[]>
> = {
  prepare: [
    { value: 'pauli', label: 'the six Pauli states' },
    { value: 'tetrahedron', label: 'a tetrahedron' },
    { value: 'two-bases', label: 'two conjugate bases' },
    { value: 'great-circle', label: 'states along a great circle' },
    { value: 'haar', label: 'random states, evenly over the sphere' },
  ],
  apply: [
    { value: 'clifford', label: 'the 24 turns that keep the six states' },
    { value: 'haar-unitaries', label: 'random unitaries, evenly over SU(2)' },
  ],
};

export function firstChoice(kind: ProtocolKind): SetChoice {
  return {
    name: kind === 'prepare' ? 'pauli' : 'clifford',
    orientation: 'one at H',
    pair: 'HV/DA',
    pole: 'equator',
    startAzimuthDeg: '0',
    count: '12',
    seed: '1',
  };
}

export type ChosenSet =
  | { readonly ok: true; readonly rows: readonly TargetRow[] }
  | {
      readonly ok: false;
      readonly field: 'count' | 'seed' | 'pole' | 'startAzimuthDeg';
      readonly sentence: string;
    };

const LARGEST_SEED = 4_294_967_295;

/** The rows of a set, or the field that is wrong with one sentence. */
export function chosenSet(choice: SetChoice, convention: Convention): ChosenSet {
  const rows = (found: readonly TargetRow[]): ChosenSet => ({ ok: true, rows: found });
  switch (choice.name) {
    case 'pauli':
      return rows(pauliStates());
    case 'tetrahedron':
      return rows(tetrahedron(choice.orientation, convention));
    case 'two-bases':
      return rows(twoConjugateBases(choice.pair));
    case 'clifford':
      return rows(cliffordTurns());
    case 'great-circle':
      return circle(choice, convention);
    case 'haar':
    case 'haar-unitaries':
      return drawn(choice, convention);
  }
}

function countFault(count: number, least: number): ChosenSet | null {
  if (Number.isInteger(count) && count >= least && count <= MAX_SET) return null;
  return { ok: false, field: 'count', sentence: `Write a whole number from ${least} to ${MAX_SET}.` };
}

function circle(choice: SetChoice, convention: Convention): ChosenSet {
  const count = readTypedNumber(choice.count);
  const startAzimuthDeg = readTypedNumber(choice.startAzimuthDeg);
  const fault = countFault(count, 2);
  if (fault !== null) return fault;
  if (!(Math.abs(startAzimuthDeg) <= 360)) {
    return { ok: false, field: 'startAzimuthDeg', sentence: 'Write an angle in degrees within ±360.' };
  }
  const pole = choice.pole.trim() === '' ? 'equator' : choice.pole.trim();
  const set = greatCircle({ pole, startAzimuthDeg, count }, convention);
  if (set.ok) return set;
  return { ok: false, field: 'pole', sentence: `Column ${set.error.column}: ${set.error.message}` };
}

function drawn(choice: SetChoice, convention: Convention): ChosenSet {
  const count = readTypedNumber(choice.count);
  const seed = readTypedNumber(choice.seed);
  const fault = countFault(count, 1);
  if (fault !== null) return fault;
  if (!Number.isInteger(seed) || seed < 0 || seed > LARGEST_SEED) {
    return { ok: false, field: 'seed', sentence: `Write a whole number from 0 to ${LARGEST_SEED}.` };
  }
  const make = choice.name === 'haar' ? haarStates : haarUnitaries;
  return { ok: true, rows: make({ count, seed }, convention) };
}
