/** How one mount turns. Readings are the dial's numbers, in degrees; "rising" and "falling" mean those numbers. */
export interface MountMotion {
  /** +1 when the numbers rise as the mount turns counter-clockwise for the receiver. */
  readonly direction: 1 | -1;
  /** The reading with the fast axis along H. */
  readonly offsetDeg: number;
  /** The finest step of the dial; above 0. Travel is counted on readings rounded to it. */
  readonly resolutionDeg: number;
  /**
   * Reachable readings, or null for a ring that turns all the way round (readings are then in [0, 360)). min < max; a
   * stage that counts on may span more than 360. Such a mount never wraps: 359 to 1 is 358 back.
   */
  readonly rangeDeg: readonly [min: number, max: number] | null;
  /** Null for a hand-turned mount whose speed isn't stated. */
  readonly speedDegPerS: number | null;
  /**
   * Play of the drive. It is taken up by always ending in the sense of `approach`: a move that comes from the other side
   * goes past its reading by this much and comes back, which costs twice this in travel. A reading that stays the same
   * costs nothing. A mount with a range is never sent past its end, so the last `backlashDeg` before the end it would
   * have to go past is not used. With 'either' nothing is taken up.
   */
  readonly backlashDeg: number;
  readonly approach: 'rising' | 'falling' | 'either';
}

/** One target: what its solutions ask of the plates. */
export interface SequenceRow {
  /** Each solution's fast axes in degrees, one a mount, best solution first. Any representative modulo 180 will do. */
  readonly branches: readonly (readonly number[])[];
  /** Index of the solution that a person holds; null leaves the choice free. */
  readonly held: number | null;
}

/** An ordered list of targets on one bench. */
export interface SequenceProblem {
  readonly mounts: readonly MountMotion[];
  readonly rows: readonly SequenceRow[];
  /** Where the dials stand before the first target; null if that isn't known, and getting to it then costs nothing. */
  readonly startDialsDeg: readonly number[] | null;
  /** travel: degrees turned, over all mounts. time: seconds, and among equals the least travel. */
  readonly cost: 'travel' | 'time';
  /** one-by-one: a step takes the sum of its mounts' times. together: it takes the longest of them. */
  readonly moves: 'one-by-one' | 'together';
}

/** Thrown when none of a target's solutions can be dialled within the ranges of the mounts. */
export class UnreachableRowError extends RangeError {
  override readonly name = 'UnreachableRowError';
  constructor(
    /** Index of the target. */
    readonly row: number,
    /** Index of a mount that can't take the best (or held) solution. */
    readonly mount: number,
  ) {
    super(`No solution of target ${row + 1} can be dialled: mount ${mount + 1} does not reach it.`);
  }
}

/** Thrown when a target can be dialled in more ways than can be looked through. */
export class TooManyStationsError extends RangeError {
  override readonly name = 'TooManyStationsError';
  constructor(
    /** Index of the target. */
    readonly row: number,
    most: number,
  ) {
    super(`target ${row + 1} can be dialled in more than ${most} ways`);
  }
}

/** @throws RangeError naming the first thing that makes no sense. */
export function checkSequence({ mounts, rows, startDialsDeg, cost }: SequenceProblem): void {
  const refuse = (what: string): never => {
    throw new RangeError(what);
  };
  mounts.forEach((mount, k) => {
    const { offsetDeg, resolutionDeg, rangeDeg, speedDegPerS, backlashDeg } = mount;
    const name = `mount ${k + 1}`;
    if (!Number.isFinite(offsetDeg)) refuse(`${name}: the offset is not a number`);
    if (!(resolutionDeg > 0 && resolutionDeg < 180)) refuse(`${name}: the resolution must be above 0`);
    if (rangeDeg !== null && !(rangeDeg[1] > rangeDeg[0] && rangeDeg[1] - rangeDeg[0] < Infinity))
      refuse(`${name}: the range must run from its lower to its higher end`);
    if (!(backlashDeg >= 0 && backlashDeg < 180)) refuse(`${name}: the play must be at least 0`);
    if (speedDegPerS !== null && !(speedDegPerS > 0 && speedDegPerS < Infinity))
      refuse(`${name}: the speed must be above 0`);
    if (cost === 'time' && speedDegPerS === null)
      refuse(`${name} has no stated speed, so there is no least time`);
  });
  rows.forEach(({ branches, held }, k) => {
    if (branches.length === 0) refuse(`target ${k + 1} has no solution`);
    if (held !== null && branches[held] === undefined)
      refuse(`target ${k + 1} holds solution ${held + 1} of ${branches.length}`);
    for (const axes of branches) {
      if (axes.length !== mounts.length || !axes.every((axis) => Number.isFinite(axis)))
        refuse(`target ${k + 1}: a solution is one angle for each of ${mounts.length} mounts`);
    }
  });
  if (
    startDialsDeg !== null &&
    (startDialsDeg.length !== mounts.length || !startDialsDeg.every((reading) => Number.isFinite(reading)))
  )
    refuse(`the present readings are one number for each of ${mounts.length} mounts`);
}
