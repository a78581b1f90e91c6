import type { DialScale } from '../optics/dial';
import type { Convention } from '../optics/convention';
import { parseState, type StateReading } from '../optics/expression';
import { type SolvedTarget, solveTarget, type TargetPlate, type TargetProblem } from '../optics/solve-target';
import type { Stokes } from '../optics/stokes';
import { wrapSigned } from '../optics/units';
import type { Calibration } from '../schemas/cabinet';

/** What a dial's scale needs of a plate. */
export interface DialledPlate {
  readonly mount: { readonly direction: 1 | -1; readonly resolutionDeg: number };
  readonly calibration: Pick<Calibration, 'offsetDeg'>;
}

/** What a solver needs of a plate: its calibration and its mount. */
export interface SolvingPlate {
  readonly mount: {
    readonly direction: 1 | -1;
    readonly resolutionDeg: number;
    readonly repeatabilityDeg: number;
  };
  readonly calibration: Pick<
    Calibration,
    'retardanceDeg' | 'retardanceSigmaDeg' | 'offsetDeg' | 'offsetSigmaDeg'
  >;
}

/** What a solver needs of a bench. */
export interface SolvingBench {
  readonly inputExpression: string;
  readonly polariserSigmaDeg: number;
  /** In beam order. */
  readonly plates: readonly SolvingPlate[];
}

export type RowResult =
  | { readonly status: 'unreadable'; readonly error: Extract<StateReading, { ok: false }>['error'] }
  | {
      readonly status: 'solved';
      readonly reading: Extract<StateReading, { ok: true }>;
      readonly solved: SolvedTarget;
    };

/** How a plate's dial is engraved: its zero as calibrated, its sense and its finest step. */
export function dialScaleOf({ mount, calibration }: DialledPlate): DialScale {
  return {
    offsetDeg: calibration.offsetDeg,
    direction: mount.direction,
    resolutionDeg: mount.resolutionDeg,
  };
}

/** Plates as the solver takes them, in beam order. */
export function targetPlates(plates: readonly SolvingPlate[]): TargetPlate[] {
  return plates.map((plate) => ({
    retardanceDeg: plate.calibration.retardanceDeg,
    retardanceSigmaDeg: plate.calibration.retardanceSigmaDeg,
    offsetSigmaDeg: plate.calibration.offsetSigmaDeg,
    repeatabilityDeg: plate.mount.repeatabilityDeg,
    scale: dialScaleOf(plate),
  }));
}

/** The bench's side of a problem, read once for all rows. */
export function benchProblem(
  bench: SolvingBench,
  convention: Convention,
):
  | { readonly ok: true; readonly problem: Omit<TargetProblem, 'target'> }
  | Extract<StateReading, { ok: false }> {
  const input = parseState(bench.inputExpression, convention);
  if (!input.ok) return input;
  return {
    ok: true,
    problem: {
      input: input.stokes,
      polariserSigmaDeg: bench.polariserSigmaDeg,
      objective: 'least-expected-infidelity',
      plates: targetPlates(bench.plates),
    },
  };
}

/** One row of a protocol: read, then solved for the bench's plates. The client's worker and the server both call this. */
export function solveRow(
  expression: string,
  problem: Omit<TargetProblem, 'target'>,
  convention: Convention,
): RowResult {
  const reading = parseState(expression, convention);
  if (!reading.ok) return { status: 'unreadable', error: reading.error };
  const target: Stokes = reading.stokes;
  return { status: 'solved', reading, solved: solveTarget({ ...problem, target }) };
}

/** How far a held solution may have moved, in degrees of any one plate, and still count as the same branch. */
const heldToleranceDeg = 10;

/** Which of the solutions stands: the held one where its branch still exists, else the best. */
export function chooseSolution(
  solved: SolvedTarget,
  heldFastAxesDeg: readonly number[] | null,
): { readonly index: number; readonly held: boolean } {
  if (heldFastAxesDeg === null) return { index: 0, held: false };
  const distances = solved.solutions.map(({ fastAxesDeg }) =>
    fastAxesDeg.reduce(
      (worst, angle, plate) =>
        Math.max(worst, Math.abs(wrapSigned(angle - (heldFastAxesDeg[plate] ?? Infinity), 180))),
      0,
    ),
  );
  const nearest = Math.min(...distances);
  if (!(nearest <= heldToleranceDeg)) return { index: 0, held: false };
  return { index: distances.indexOf(nearest), held: true };
}
