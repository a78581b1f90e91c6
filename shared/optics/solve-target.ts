import { type Contribution, errorBudget, type UncertainPlate } from './budget';
import { dialFromFastAxis, type DialScale, fastAxisFromDial, roundDial } from './dial';
import { type Retarder, retardStokes } from './retarder';
import { prepare } from './solver/prepare';
import { infidelityBetween, normaliseStokes, type Stokes } from './stokes';
import { type Degrees, degrees, type Radians, toDegrees, toRadians } from './units';

/** Written into every version: the numbers of a version can be made again only by the same solver. */
export const SOLVER_VERSION = '1.0.0';

/** A plate as calibrated on its mount. Angles in degrees; σ are one standard deviation. */
export interface TargetPlate {
  readonly retardanceDeg: number;
  readonly retardanceSigmaDeg: number;
  readonly offsetSigmaDeg: number;
  readonly repeatabilityDeg: number;
  readonly scale: DialScale;
}

/** One target for one bench, canonical frame, plates in beam order. */
export interface TargetProblem {
  readonly target: Stokes;
  readonly input: Stokes;
  readonly plates: readonly TargetPlate[];
  readonly polariserSigmaDeg: number;
  readonly objective: 'least-expected-infidelity';
}

export interface SettingSolution {
  /** In beam order, each in [0, 180). */
  readonly fastAxesDeg: readonly Degrees[];
  /** What to dial: rounded to each mount's resolution, in [0, 360). */
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
  /** Behind each plate, for the rounded dials. */
  readonly statesAfter: readonly Stokes[];
  readonly contributions: readonly Contribution[];
}

export interface SolvedTarget {
  /** As in `Solved`. */
  readonly kind: 'exact' | 'nearest' | 'family';
  /** Angle on the sphere from the target to the closest reachable state; 0 when it can be reached. */
  readonly shortfallDeg: Degrees;
  /** In a family: the plate that may stand anywhere, in beam order. */
  readonly freePlate: number | null;
  /** Least expected infidelity first. Out of reach: local optima, ranked the same way. */
  readonly solutions: readonly SettingSolution[];
}

/** Thrown for a bench whose number of plates this solver has no answer for. */
export class PlateCountError extends RangeError {
  override readonly name = 'PlateCountError';
  constructor(readonly plateCount: number) {
    super(`Preparing a state takes two plates in the beam; this bench has ${plateCount}.`);
  }
}

/**
 * Every setting for one target, best first. The server and the worker in the client both call this and get the same
 * numbers to the last bit.
 * @throws PlateCountError unless there are two plates; RangeError for a state of length 0 or angles that aren't finite.
 */
export function solveTarget(problem: TargetProblem): SolvedTarget {
  const [first, second, third] = problem.plates;
  if (first === undefined || second === undefined || third !== undefined) {
    throw new PlateCountError(problem.plates.length);
  }
  const { kind, shortfallRad, family, solutions } = prepare({
    input: problem.input,
    target: problem.target,
    retardancesRad: [toRadians(degrees(first.retardanceDeg)), toRadians(degrees(second.retardanceDeg))],
  });
  const settings = solutions.map(({ fastAxesRad, infidelity }) =>
    settingSolution(problem, fastAxesRad, infidelity),
  );
  return {
    kind,
    shortfallDeg: toDegrees(shortfallRad),
    freePlate: family?.freePlates[0] ?? null,
    solutions: settings.sort(byExpectation),
  };
}

function settingSolution(
  problem: TargetProblem,
  fastAxesRad: readonly Radians[],
  infidelity: number,
): SettingSolution {
  const target = normaliseStokes(problem.target);
  const input = normaliseStokes(problem.input);
  const fastAxesDeg = fastAxesRad.map((angle) => degrees(Math.min(toDegrees(angle), BELOW_HALF_TURN)));
  const dialsDeg = problem.plates.map(({ scale }, k) =>
    roundDial(dialFromFastAxis(fastAxesDeg[k] ?? degrees(0), scale), scale.resolutionDeg),
  );
  const plates = problem.plates.map((plate, k): UncertainPlate => ({
    retardanceRad: toRadians(degrees(plate.retardanceDeg)),
    sigmaRetardanceRad: toRadians(degrees(plate.retardanceSigmaDeg)),
    fastAxisRad: fastAxesRad[k] ?? toRadians(degrees(0)),
    sigmaOffsetRad: toRadians(degrees(plate.offsetSigmaDeg)),
    dialResolutionRad: toRadians(degrees(plate.scale.resolutionDeg)),
    dialRepeatabilityRad: toRadians(degrees(plate.repeatabilityDeg)),
  }));
  const budget = errorBudget(input, target, plates, toRadians(degrees(problem.polariserSigmaDeg)));
  const dialled = evaluateDials(problem, dialsDeg);
  return {
    fastAxesDeg,
    dialsDeg,
    infidelity,
    dialledInfidelity: dialled.infidelity,
    expectedInfidelity: budget.expectedInfidelity,
    expectedLow: budget.expectedLow,
    expectedHigh: budget.expectedHigh,
    statesAfter: dialled.statesAfter,
    contributions: budget.contributions,
  };
}

// An angle just below π rounds to 180° on conversion, and the range is open there.
const BELOW_HALF_TURN = 179.99999999999997;

// Expectations equal but for rounding are a tie, decided by what the dials make of it and then by the angles.
function byExpectation(a: SettingSolution, b: SettingSolution): number {
  const difference = a.expectedInfidelity - b.expectedInfidelity;
  const tie = 1e-9 * Math.max(a.expectedInfidelity, b.expectedInfidelity);
  if (Math.abs(difference) > tie) return difference;
  for (const [k, angle] of a.fastAxesDeg.entries()) {
    const apart = angle - (b.fastAxesDeg[k] ?? angle);
    if (Math.abs(apart) > 1e-7) return apart;
  }
  return 0;
}

/** What some reading of the dials makes, with the plates exactly as calibrated. */
export interface DialledState {
  readonly stokes: Stokes;
  /** Behind each plate, in beam order; the last is `stokes`. */
  readonly statesAfter: readonly Stokes[];
  /** 1 − F against the problem's target. */
  readonly infidelity: number;
}

/** For any number of plates. @throws RangeError unless there is one reading for each plate. */
export function evaluateDials(problem: TargetProblem, dialsDeg: readonly number[]): DialledState {
  const { plates } = problem;
  if (dialsDeg.length !== plates.length) {
    throw new RangeError(`${plates.length} plates need as many dial readings, got ${dialsDeg.length}`);
  }
  let stokes = normaliseStokes(problem.input);
  const statesAfter = plates.map((plate, k) => {
    const dialDeg = degrees(dialsDeg[k] ?? 0);
    const retarder: Retarder = {
      retardanceRad: toRadians(degrees(plate.retardanceDeg)),
      fastAxisRad: toRadians(fastAxisFromDial(dialDeg, plate.scale)),
    };
    stokes = retardStokes(retarder, stokes);
    return stokes;
  });
  return { stokes, statesAfter, infidelity: infidelityBetween(stokes, normaliseStokes(problem.target)) };
}
