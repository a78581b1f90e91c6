import type { Radians } from '../units';

/** One way to turn the plates. */
export interface Setting {
  /** Beam order, each in [0, π): a plate turned by π is the same plate. */
  readonly fastAxesRad: readonly Radians[];
  /** 1 − F of a state, or the average gate infidelity ⅔ sin²(ε/2) of a unitary (goal.ts). */
  readonly infidelity: number;
}

/** Settings that depend on plates whose angles may be chosen freely: more plates than needed, or a degenerate target. */
export interface Family {
  /** The plates (indices, beam order) that may be chosen freely; the others follow. */
  readonly freePlates: readonly number[];
  /**
   * Every setting with the free plates at these angles (same order as freePlates); [] where none exists. At angles where the
   * others have a continuum of their own, one or more of it.
   */
  readonly membersAt: (freeFastAxesRad: readonly Radians[]) => readonly Setting[];
}

/** What a search over the plates' angles gives: every answer that there is, in a fixed order. */
export interface Solved {
  /**
   * exact: the goal is reached at isolated settings. nearest: it can't be reached, these are the local optima.
   * family: the settings (exact or nearest, see `shortfallRad`) are continuous.
   */
  readonly kind: 'exact' | 'nearest' | 'family';
  /** exact: all of them; nearest: every local optimum, best first; family: representatives. */
  readonly solutions: readonly Setting[];
  /** Angle of the turn that is left between achieved and wanted; 0 when reached. */
  readonly shortfallRad: Radians;
  /** Not null exactly when kind is 'family'. */
  readonly family: Family | null;
}
