import type { BudgetProblem, ParameterKind, ParameterUnit, UncertainPlate } from './budget-problem';
import { sincos } from './elementary';
import { infidelityBetween, type Stokes } from './stokes';
import { stackQuaternion } from './retarder';
import { unitaryShortfall } from './goal';
import { type Radians, radians } from './units';

/** A parameter that is known to a σ, and what a small change of it does behind the last plate. */
export interface UncertainParameter {
  readonly kind: ParameterKind;
  /** Index in beam order; `null` for what isn't one plate's. */
  readonly plate: number | null;
  readonly sigma: number;
  readonly unit: ParameterUnit;
  /**
   * For a state ∂p/∂parameter, tangent to the sphere at the state reached. For a unitary the turn of the sphere that one
   * unit of the parameter adds, as an axis in Stokes coordinates times its angle: twice the tangent of the quaternion,
   * ∂q/∂parameter · q* = (0, derivative / 2).
   */
  readonly derivative: Stokes;
}

export interface Linearised {
  readonly reached: Stokes;
  /** 1 − F of the setting itself. */
  readonly ownInfidelity: number;
  /** 1 − F that a change x of one parameter adds: weight · x² · |derivative|². */
  readonly weight: number;
  /** Retardance, zero and dial of each plate in beam order, then the polariser, then what is shared. */
  readonly parameters: readonly UncertainParameter[];
}

/**
 * Exact derivatives of what a setting makes by every parameter. A state's 1 − F is ¼|δp|². A unitary left off by a turn of
 * δω has ⅔ sin²(|δω|/2) = ⅙|δω|² (references.md 5).
 * @throws RangeError for a negative σ.
 */
export function linearise(problem: BudgetProblem): Linearised {
  const { plates, shared, sigmaPolariserRad } = problem;
  const { reached, ownInfidelity, weight, byRetardance, byAngle, byPolariser } = derivativesOf(problem);
  const parameters: UncertainParameter[] = [];
  const add = (
    kind: ParameterKind,
    plate: number | null,
    sigma: number,
    unit: ParameterUnit,
    derivative: Stokes,
  ): void => {
    parameters.push({ kind, plate, sigma: checkedSigma(sigma, kind), unit, derivative });
  };
  plates.forEach((plate, index) => {
    const angle = byAngle[index] ?? NOTHING;
    add('retardance', index, plate.sigmaRetardanceRad, 'rad', byRetardance[index] ?? NOTHING);
    add('zero', index, plate.sigmaOffsetRad, 'rad', angle);
    add('dial', index, dialSigma(plate), 'rad', angle);
  });
  if (byPolariser !== null) add('polariser', null, sigmaPolariserRad, 'rad', byPolariser);
  for (const { kind, sigma, retardancePerUnitRad } of shared) {
    const unit = kind === 'wavelength' ? 'nm' : 'K';
    add(kind, null, sigma, unit, weighted(byRetardance, retardancePerUnitRad));
  }
  return { reached, ownInfidelity, weight, parameters };
}

/** 1 − F of the setting and what all parameters of `linearise` add, in their order and to the bit, listing none of them. */
export function expectedWithoutLeak(problem: BudgetProblem): number {
  const { plates, shared, sigmaPolariserRad } = problem;
  const { ownInfidelity, weight, byRetardance, byAngle, byPolariser } = derivativesOf(problem);
  let sum = ownInfidelity;
  for (let index = 0; index < plates.length; index += 1) {
    const plate = plates[index];
    if (plate === undefined) break;
    const angle = byAngle[index] ?? NOTHING;
    sum += addedInfidelity(
      weight,
      checkedSigma(plate.sigmaRetardanceRad, 'retardance'),
      byRetardance[index] ?? NOTHING,
    );
    sum += addedInfidelity(weight, checkedSigma(plate.sigmaOffsetRad, 'zero'), angle);
    sum += addedInfidelity(weight, checkedSigma(dialSigma(plate), 'dial'), angle);
  }
  if (byPolariser !== null)
    sum += addedInfidelity(weight, checkedSigma(sigmaPolariserRad, 'polariser'), byPolariser);
  for (const { kind, sigma, retardancePerUnitRad } of shared) {
    const derivative = weighted(byRetardance, retardancePerUnitRad);
    sum += addedInfidelity(weight, checkedSigma(sigma, kind), derivative);
  }
  return sum;
}

/** What a parameter of this σ adds to the expected 1 − F. */
export function addedInfidelity(weight: number, sigma: number, derivative: Stokes): number {
  return (
    weight *
    sigma *
    sigma *
    (derivative[0] * derivative[0] + derivative[1] * derivative[1] + derivative[2] * derivative[2])
  );
}

function checkedSigma(sigma: number, kind: ParameterKind): number {
  if (!(sigma >= 0)) throw new RangeError(`the σ of a ${kind} must not be negative, got ${sigma}`);
  return sigma;
}

interface Derivatives {
  readonly reached: Stokes;
  readonly ownInfidelity: number;
  readonly weight: number;
  /** For each plate, behind the last one. */
  readonly byRetardance: readonly Stokes[];
  readonly byAngle: readonly Stokes[];
  /** `null` for a unitary, which has no input. */
  readonly byPolariser: Stokes | null;
}

function derivativesOf({ goal, plates }: BudgetProblem): Derivatives {
  const isState = goal.kind === 'prepare';
  const turns = plates.map(turnOf);
  const byRetardance: Stokes[] = [];
  const byAngle: Stokes[] = [];
  let before: Stokes = isState ? goal.input : ABOUT_S3;
  for (let index = 0; index < turns.length; index += 1) {
    const turn = turns[index] ?? NO_TURN;
    const after = turned(turn, before);
    // Turning a plate by dθ turns the whole picture by 2dθ about S3, except for the light that comes in.
    const here = isState ? aboutS3(after) : ABOUT_S3;
    const carried = turned(turn, isState ? aboutS3(before) : ABOUT_S3);
    const angle: Stokes = [
      2 * (here[0] - carried[0]),
      2 * (here[1] - carried[1]),
      2 * (here[2] - carried[2]),
    ];
    const retardance: Stokes = isState
      ? [turn.n2 * after[2], -turn.n1 * after[2], turn.n1 * after[1] - turn.n2 * after[0]]
      : [turn.n1, turn.n2, 0];
    byRetardance.push(behind(turns, index + 1, retardance));
    byAngle.push(behind(turns, index + 1, angle));
    before = after;
  }
  if (goal.kind === 'apply') {
    const ownInfidelity = (2 / 3) * unitaryShortfall(stackQuaternion(plates), goal.target);
    return { reached: before, ownInfidelity, weight: 1 / 6, byRetardance, byAngle, byPolariser: null };
  }
  const turnedInput = aboutS3(goal.input);
  const byPolariser = behind(turns, 0, [2 * turnedInput[0], 2 * turnedInput[1], 2 * turnedInput[2]]);
  const ownInfidelity = infidelityBetween(before, goal.target);
  return { reached: before, ownInfidelity, weight: 0.25, byRetardance, byAngle, byPolariser };
}

/** Of where the dial really stands: evenly within one step, and the mount's repeatability. */
function dialSigma({ dialResolutionRad, dialRepeatabilityRad }: UncertainPlate): Radians {
  const variance = (dialResolutionRad * dialResolutionRad) / 12 + dialRepeatabilityRad * dialRepeatabilityRad;
  return radians(Math.sqrt(variance));
}

/** Sines and cosines of a plate's turn: taken once here, where `retardStokes` would take them for every vector. */
interface PlateTurn {
  readonly s: number;
  readonly c: number;
  readonly n1: number;
  readonly n2: number;
}

const NO_TURN: PlateTurn = { s: 0, c: 1, n1: 1, n2: 0 };
const ABOUT_S3: Stokes = [0, 0, 1];
const NOTHING: Stokes = [0, 0, 0];

function turnOf({ retardanceRad, fastAxisRad }: UncertainPlate): PlateTurn {
  const turn = sincos(retardanceRad);
  const axis = sincos(2 * fastAxisRad);
  return { s: turn.sin, c: turn.cos, n1: axis.cos, n2: axis.sin };
}

// The operations of `retardStokes` in its order: the same bits.
function turned({ s, c, n1, n2 }: PlateTurn, vector: Stokes): Stokes {
  const s1 = vector[0];
  const s2 = vector[1];
  const s3 = vector[2];
  const along = (1 - c) * (n1 * s1 + n2 * s2);
  return [
    c * s1 + s * n2 * s3 + along * n1,
    c * s2 - s * n1 * s3 + along * n2,
    c * s3 + s * (n1 * s2 - n2 * s1),
  ];
}

// A small change travels through the plates behind it like a state: they are rotations.
function behind(turns: readonly PlateTurn[], first: number, change: Stokes): Stokes {
  let vector = change;
  for (let k = first; k < turns.length; k += 1) vector = turned(turns[k] ?? NO_TURN, vector);
  return vector;
}

function weighted(vectors: readonly Stokes[], factors: readonly number[]): Stokes {
  let s1 = 0;
  let s2 = 0;
  let s3 = 0;
  vectors.forEach((vector, k) => {
    const factor = factors[k] ?? 0;
    s1 += factor * vector[0];
    s2 += factor * vector[1];
    s3 += factor * vector[2];
  });
  return [s1, s2, s3];
}

function aboutS3(vector: Stokes): Stokes {
  return [-vector[1], vector[0], 0];
}
