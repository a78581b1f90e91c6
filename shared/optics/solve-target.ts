import { errorBudget, expectedInfidelity } from './budget';
import type { BudgetProblem } from './budget-problem';
import { dialFor, type DialScale, fastAxisFromDial } from './dial';
import { type Goal, unitaryInfidelity } from './goal';
import { type Quaternion } from './quaternion';
import { type Retarder, retardStokes, stackQuaternion } from './retarder';
import { apply } from './solver/apply';
import { bestMember, memberNear } from './solver/best-member';
import { distinctSettings } from './solver/distinct-settings';
import { prepare } from './solver/prepare';
import type { Setting, Solved } from './solver/setting';
import { infidelityBetween, normaliseStokes, type Stokes } from './stokes';
import { type Degrees, degrees, type Radians, radians, toDegrees, toRadians, wrapSigned } from './units';

/** Written into every version: the numbers of a version can be made again only by the same solver. */
export const SOLVER_VERSION = '2.0.0';

export type Objective = 'least-expected-infidelity' | 'least-travel' | 'nearest-to-present';

/** A plate as it retards where it stands, on its mount. Angles in degrees; σ are one standard deviation. */
export interface TargetPlate {
  readonly retardanceDeg: number;
  readonly retardanceSigmaDeg: number;
  /** Change of the retardance with the wavelength and the temperature; 0 where nothing is known of it. */
  readonly perNmDeg: number;
  readonly perKelvinDeg: number;
  readonly offsetSigmaDeg: number;
  readonly repeatabilityDeg: number;
  readonly scale: DialScale;
  /** How the mount moves: for sequences only. */
  readonly motion: {
    readonly speedDegPerS: number | null;
    readonly backlashDeg: number;
    readonly approach: 'rising' | 'falling' | 'either';
  };
}

/** One target for one bench, canonical frame, plates in beam order. */
export interface TargetProblem {
  readonly goal: Goal;
  readonly plates: readonly TargetPlate[];
  readonly polariserSigmaDeg: number;
  readonly polariserExtinction: number | null;
  readonly wavelengthSigmaNm: number;
  readonly temperatureSigmaK: number;
  readonly objective: Objective;
  /** Where the dials stand now; null where nobody said. */
  readonly presentDialsDeg: readonly number[] | null;
  /** What a person holds: of a family, the member there is among the solutions. */
  readonly heldFastAxesDeg: readonly number[] | null;
}

export interface SettingSolution {
  /** In beam order, each in [0, 180). */
  readonly fastAxesDeg: readonly Degrees[];
  /** What to dial: rounded to each mount's resolution, within its range. */
  readonly dialsDeg: readonly Degrees[];
  /** 1 − F of the exact angles. */
  readonly infidelity: number;
  /** 1 − F of the rounded dials, with the plates exactly as calibrated. */
  readonly dialledInfidelity: number;
  /** First order, with every tolerance. */
  readonly expectedInfidelity: number;
  /** The 5 % and 95 % points of 1 − F. */
  readonly expectedLow: number;
  readonly expectedHigh: number;
  /** All plates' turning from the present dials; null where nobody said where they stand. */
  readonly travelDeg: number | null;
}

export interface SolvedTarget {
  /** As in `Solved`. */
  readonly kind: Solved['kind'];
  /** Angle on the sphere from the target to the closest reachable state, or of the turn that is left; 0 when reached. */
  readonly shortfallDeg: Degrees;
  /** In a family: the plates that may stand anywhere, in beam order. */
  readonly freePlates: readonly number[];
  /** As the objective ranks them. Out of reach: local optima, ranked the same way. */
  readonly solutions: readonly SettingSolution[];
}

/**
 * Every setting for one target, best first. The server and the worker in the client both call this and get the same
 * numbers to the last bit. Of a continuous family: members all along it, and the best one for the objective.
 * @throws RangeError unless there are one to six plates, for a state of length 0 and for angles that aren't finite.
 */
export function solveTarget(problem: TargetProblem): SolvedTarget {
  const retardancesRad = problem.plates.map(({ retardanceDeg }) => toRadians(degrees(retardanceDeg)));
  const goal = normalised(problem.goal);
  const solved =
    goal.kind === 'prepare'
      ? prepare({ ...goal, retardancesRad })
      : apply({ target: goal.target, retardancesRad });
  const settings = withMembers(solved, { ...problem, goal }).map((setting) =>
    settingSolution(problem, goal, setting),
  );
  return {
    kind: solved.kind,
    shortfallDeg: toDegrees(solved.shortfallRad),
    freePlates: solved.family?.freePlates ?? [],
    solutions: settings.sort(problem.objective === 'nearest-to-present' ? byTravel : byExpectation),
  };
}

function normalised(goal: Goal): Goal {
  return goal.kind === 'prepare'
    ? { kind: 'prepare', input: normaliseStokes(goal.input), target: normaliseStokes(goal.target) }
    : goal;
}

function withMembers({ family, solutions }: Solved, problem: TargetProblem): readonly Setting[] {
  if (family === null) return solutions;
  const cost =
    problem.objective === 'nearest-to-present' && problem.presentDialsDeg !== null
      ? ({ fastAxesRad }: Setting) => travelDeg(fastAxesRad.map(toDegrees), problem) ?? 0
      : ({ fastAxesRad }: Setting) => expectedInfidelity(budgetProblem(problem, fastAxesRad));
  const { heldFastAxesDeg } = problem;
  const held =
    heldFastAxesDeg?.length === problem.plates.length
      ? memberNear(
          family,
          heldFastAxesDeg.map((angle) => toRadians(degrees(angle))),
        )
      : null;
  const best = bestMember(family, cost);
  return distinctSettings([...(held === null ? [] : [held]), ...(best === null ? [] : [best]), ...solutions]);
}

function budgetProblem(problem: TargetProblem, fastAxesRad: readonly Radians[]): BudgetProblem {
  const inRadians = (angleDeg: number): Radians => toRadians(degrees(angleDeg));
  return {
    goal: problem.goal,
    plates: problem.plates.map((plate, k) => ({
      retardanceRad: inRadians(plate.retardanceDeg),
      sigmaRetardanceRad: inRadians(plate.retardanceSigmaDeg),
      fastAxisRad: fastAxesRad[k] ?? radians(0),
      sigmaOffsetRad: inRadians(plate.offsetSigmaDeg),
      dialResolutionRad: inRadians(plate.scale.resolutionDeg),
      dialRepeatabilityRad: inRadians(plate.repeatabilityDeg),
    })),
    sigmaPolariserRad: inRadians(problem.polariserSigmaDeg),
    extinction: problem.polariserExtinction,
    shared: [
      {
        kind: 'wavelength',
        sigma: problem.wavelengthSigmaNm,
        retardancePerUnitRad: problem.plates.map(({ perNmDeg }) => inRadians(perNmDeg)),
      },
      {
        kind: 'temperature',
        sigma: problem.temperatureSigmaK,
        retardancePerUnitRad: problem.plates.map(({ perKelvinDeg }) => inRadians(perKelvinDeg)),
      },
    ],
  };
}

/** The error budget's problem of some table angles, for Monte Carlo and "what if". */
export function settingBudget(problem: TargetProblem, fastAxesDeg: readonly number[]): BudgetProblem {
  return budgetProblem(
    { ...problem, goal: normalised(problem.goal) },
    fastAxesDeg.map((angle) => toRadians(degrees(angle))),
  );
}

function settingSolution(
  problem: TargetProblem,
  goal: Goal,
  { fastAxesRad, infidelity }: Setting,
): SettingSolution {
  const fastAxesDeg = fastAxesRad.map((angle) => degrees(Math.min(toDegrees(angle), BELOW_HALF_TURN)));
  const near = problem.objective === 'least-expected-infidelity' ? null : problem.presentDialsDeg;
  const dialsDeg = problem.plates.map(({ scale }, k) =>
    dialFor(fastAxesDeg[k] ?? degrees(0), scale, near?.[k] ?? null),
  );
  const budget = errorBudget(budgetProblem({ ...problem, goal }, fastAxesRad));
  return {
    fastAxesDeg,
    dialsDeg,
    infidelity,
    // With the goal as it came: to normalise it twice would move the last bit, and runs compare bits.
    dialledInfidelity: evaluateDials(problem, dialsDeg).infidelity,
    expectedInfidelity: budget.expectedInfidelity,
    expectedLow: budget.expectedLow,
    expectedHigh: budget.expectedHigh,
    travelDeg: travelDeg(fastAxesDeg, problem),
  };
}

// An angle just below π rounds to 180° on conversion, and the range is open there.
const BELOW_HALF_TURN = 179.99999999999997;

/** How far all plates turn from the present dials to these table angles, each the shorter way to one of its readings. */
function travelDeg(
  fastAxesDeg: readonly Degrees[],
  { plates, presentDialsDeg }: Pick<TargetProblem, 'plates' | 'presentDialsDeg'>,
): number | null {
  if (presentDialsDeg === null) return null;
  return plates.reduce((sum, { scale }, k) => {
    const present = presentDialsDeg[k] ?? 0;
    const dial = dialFor(fastAxesDeg[k] ?? degrees(0), scale, present);
    return sum + Math.abs(scale.rangeDeg === null ? wrapSigned(dial - present, 360) : dial - present);
  }, 0);
}

// Expectations equal but for rounding are a tie, decided by the angles.
function byExpectation(a: SettingSolution, b: SettingSolution): number {
  const difference = a.expectedInfidelity - b.expectedInfidelity;
  const tie = 1e-9 * Math.max(a.expectedInfidelity, b.expectedInfidelity);
  return Math.abs(difference) > tie ? difference : byAngles(a, b);
}

function byTravel(a: SettingSolution, b: SettingSolution): number {
  const difference = (a.travelDeg ?? 0) - (b.travelDeg ?? 0);
  return Math.abs(difference) > 1e-9 ? difference : byExpectation(a, b);
}

function byAngles(a: SettingSolution, b: SettingSolution): number {
  for (const [k, angle] of a.fastAxesDeg.entries()) {
    const apart = angle - (b.fastAxesDeg[k] ?? angle);
    if (Math.abs(apart) > 1e-7) return apart;
  }
  return 0;
}

type Standing = Pick<TargetProblem, 'goal' | 'plates'>;

/** Plates at the angles that some reading of their dials gives. @throws RangeError unless there is one reading a plate. */
export function platesAtDials(
  plates: readonly TargetPlate[],
  dialsDeg: readonly number[],
): readonly Retarder[] {
  if (dialsDeg.length !== plates.length) {
    throw new RangeError(`${plates.length} plates need as many dial readings, got ${dialsDeg.length}`);
  }
  return plates.map((plate, k) => ({
    retardanceRad: toRadians(degrees(plate.retardanceDeg)),
    fastAxisRad: toRadians(fastAxisFromDial(degrees(dialsDeg[k] ?? 0), plate.scale)),
  }));
}

/** What some reading of the dials makes, with the plates exactly as calibrated. */
export interface Dialled {
  readonly turn: Quaternion;
  /** 1 − F against the goal. */
  readonly infidelity: number;
}

/** @throws RangeError unless there is one reading for each plate. */
export function evaluateDials({ goal, plates }: Standing, dialsDeg: readonly number[]): Dialled {
  const retarders = platesAtDials(plates, dialsDeg);
  const turn = stackQuaternion(retarders);
  if (goal.kind === 'apply') return { turn, infidelity: unitaryInfidelity(turn, goal.target) };
  const input = normaliseStokes(goal.input);
  const reached = statesBehind(input, retarders).at(-1) ?? input;
  return { turn, infidelity: infidelityBetween(reached, normaliseStokes(goal.target)) };
}

/** The state behind each plate, in beam order. */
export function statesBehind(input: Stokes, retarders: readonly Retarder[]): readonly Stokes[] {
  let state = input;
  return retarders.map((retarder) => {
    state = retardStokes(retarder, state);
    return state;
  });
}
