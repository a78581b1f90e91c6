import type { Goal } from './goal';
import type { Retarder } from './retarder';
import type { Radians } from './units';

/** A plate at an angle with everything that is known only to a σ. All σ in radians of the table (or of retardance). */
export interface UncertainPlate extends Retarder {
  readonly sigmaRetardanceRad: Radians;
  /** Of the mount's zero (the offset's calibration). */
  readonly sigmaOffsetRad: Radians;
  /** Step of the dial; what is set lies evenly anywhere within one step, a variance of step²/12. */
  readonly dialResolutionRad: Radians;
  /** σ of setting the same reading again. */
  readonly dialRepeatabilityRad: Radians;
}

/** One thing that moves the retardance of every plate together, by a factor of its own for each. */
export interface SharedDrift {
  readonly kind: 'wavelength' | 'temperature';
  /** In nm for the wavelength, in K for the temperature. */
  readonly sigma: number;
  /** Change of each plate's retardance for one nm or K, in radians, beam order. */
  readonly retardancePerUnitRad: readonly number[];
}

/**
 * One setting and everything about it that is uncertain, canonical frame, plates in beam order. The goal's Stokes vectors
 * and quaternion have length 1.
 */
export interface BudgetProblem {
  readonly goal: Goal;
  readonly plates: readonly UncertainPlate[];
  /** Of the angle of the polariser that makes the input. A unitary doesn't depend on its input: not used for `apply`. */
  readonly sigmaPolariserRad: Radians;
  /**
   * Leak of that polariser as a ratio of powers in [0, 1], 1e-5 say; `null` where nobody stated it. Not used for `apply`.
   */
  readonly extinction: number | null;
  readonly shared: readonly SharedDrift[];
}

export type ParameterKind =
  'retardance' | 'zero' | 'dial' | 'polariser' | 'wavelength' | 'temperature' | 'extinction';

/** What a parameter's σ is counted in. */
export type ParameterUnit = 'rad' | 'nm' | 'K' | 'ratio';

/** @throws RangeError for a leak that isn't a ratio of powers, and for a drift that doesn't say what it does to each plate. */
export function checkBudgetProblem({ plates, extinction, shared }: BudgetProblem): void {
  if (extinction !== null && !(extinction >= 0 && extinction <= 1))
    throw new RangeError(`the leak of a polariser lies between 0 and 1, got ${extinction}`);
  for (const { kind, retardancePerUnitRad } of shared) {
    if (retardancePerUnitRad.length !== plates.length) {
      throw new RangeError(
        `a drift of the ${kind} names a change for each of ${plates.length} plates, got ${retardancePerUnitRad.length}`,
      );
    }
  }
}
