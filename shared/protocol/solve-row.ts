import type { Convention } from '../optics/convention';
import { parseState, parseUnitary, type StateReading, type UnitaryReading } from '../optics/expression';
import type { Goal } from '../optics/goal';
import { type SolvedTarget, solveTarget, type TargetProblem } from '../optics/solve-target';
import type { Stokes } from '../optics/stokes';
import type { Objective, ProtocolKind } from '../schemas/protocols';
import { type PlateSurroundings, type SolvingPlate, targetPlates } from './solving-plates';

/** What a solver needs of a bench. */
export interface SolvingBench extends PlateSurroundings {
  readonly wavelengthSigmaNm: number;
  readonly temperatureSigmaK: number;
  readonly inputExpression: string;
  readonly polariserSigmaDeg: number;
  readonly polariserExtinction: number | null;
  /** In beam order. */
  readonly plates: readonly SolvingPlate[];
}

/** What a solver needs of a protocol besides its rows. */
export interface SolvingTask {
  readonly kind: ProtocolKind;
  readonly objective: Objective;
  /** In beam order; null where nobody said. */
  readonly presentDialsDeg: readonly number[] | null;
}

/** All of a row's problem but the row. */
export interface RowProblem extends Omit<TargetProblem, 'goal' | 'heldFastAxesDeg'> {
  readonly kind: ProtocolKind;
  readonly input: Stokes;
}

/** A row as it was read: a state or a unitary, by the kind of its protocol. */
export type RowReading =
  | ({ readonly kind: 'state' } & Extract<StateReading, { ok: true }>)
  | ({ readonly kind: 'unitary' } & Extract<UnitaryReading, { ok: true }>);

type RowError = Extract<UnitaryReading, { ok: false }>['error'];

export type RowResult =
  | { readonly status: 'unreadable'; readonly error: RowError }
  | { readonly status: 'solved'; readonly reading: RowReading; readonly solved: SolvedTarget };

/** The bench's side of a problem, read once for all rows. */
export function benchProblem(
  bench: SolvingBench,
  convention: Convention,
  { kind, objective, presentDialsDeg }: SolvingTask,
): { readonly ok: true; readonly problem: RowProblem } | Extract<StateReading, { ok: false }> {
  const input = parseState(bench.inputExpression, convention);
  if (!input.ok) return input;
  const standsFor = presentDialsDeg?.length === bench.plates.length ? presentDialsDeg : null;
  return {
    ok: true,
    problem: {
      kind,
      input: input.stokes,
      polariserSigmaDeg: bench.polariserSigmaDeg,
      polariserExtinction: bench.polariserExtinction,
      wavelengthSigmaNm: bench.wavelengthSigmaNm,
      temperatureSigmaK: bench.temperatureSigmaK,
      objective,
      presentDialsDeg: standsFor,
      plates: targetPlates(bench.plates, bench),
    },
  };
}

export function readRow(
  expression: string,
  kind: ProtocolKind,
  convention: Convention,
): { readonly ok: true; readonly reading: RowReading } | { readonly ok: false; readonly error: RowError } {
  if (kind === 'prepare') {
    const reading = parseState(expression, convention);
    return reading.ok ? { ok: true, reading: { kind: 'state', ...reading } } : reading;
  }
  const reading = parseUnitary(expression, convention);
  return reading.ok ? { ok: true, reading: { kind: 'unitary', ...reading } } : reading;
}

/** What the plates are asked to do by a row. */
export function rowGoal(reading: RowReading, input: Stokes): Goal {
  return reading.kind === 'state'
    ? { kind: 'prepare', input, target: reading.stokes }
    : { kind: 'apply', target: reading.quaternion };
}

/**
 * One row of a protocol: read, then solved for the bench's plates. The client's worker and the server both call this.
 * `heldFastAxesDeg`: the solution that a person holds, which in a family is one of its members.
 */
export function solveRow(
  expression: string,
  problem: RowProblem,
  convention: Convention,
  heldFastAxesDeg: readonly number[] | null,
): RowResult {
  const read = readRow(expression, problem.kind, convention);
  if (!read.ok) return { status: 'unreadable', error: read.error };
  const goal = rowGoal(read.reading, problem.input);
  return {
    status: 'solved',
    reading: read.reading,
    solved: solveTarget({ ...problem, goal, heldFastAxesDeg }),
  };
}
