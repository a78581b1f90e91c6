import { dialFromFastAxis, readingsWithin, roundDial, SAME_READING_DEG } from '../dial';
import { degrees, wrap } from '../units';
import type { MountMotion } from './problem';

/** A move of one mount from one reading to another. */
export interface MountMove {
  readonly fromDeg: number;
  readonly toDeg: number;
  /** The reading to go to first when the play has to be taken up, null when the move goes straight there. */
  readonly viaDeg: number | null;
  /** Degrees turned in all, play included. */
  readonly travelDeg: number;
  /** Which way the numbers run on the way there (before coming back from `viaDeg`). */
  readonly numbers: 'rise' | 'fall' | 'stay';
}

/**
 * Every reading at which the mount has its plate's fast axis at `fastAxisDeg`, the plate being the same after half a
 * turn; rounded to the dial's step. A ring: the reading that a solution is listed with, then that + 180°, both in
 * [0, 360). With a range: rising order, none that play would push past an end; may be empty.
 */
export function readingsFor(mount: MountMotion, fastAxisDeg: number): readonly number[] {
  const listed = dialFromFastAxis(degrees(wrap(fastAxisDeg, 180)), mount);
  if (mount.rangeDeg === null) {
    return [roundDial(listed, mount.resolutionDeg), roundDial(degrees(listed + 180), mount.resolutionDeg)];
  }
  const [from, to] = usableRange(mount, mount.rangeDeg);
  return readingsWithin(listed, mount.resolutionDeg, { from, to });
}

function usableRange({ backlashDeg, approach }: MountMotion, [min, max]: readonly [number, number]) {
  if (approach === 'rising') return [min + backlashDeg, max] as const;
  if (approach === 'falling') return [min, max - backlashDeg] as const;
  return [min, max] as const;
}

/**
 * Degrees that `mountMove` turns: the same rule without the words, for the inner loops.
 * @param changeDeg for a ring between −360 and 360: a remainder would cost more than all the rest.
 */
export function moveTravelDeg(
  isRing: boolean,
  risingExtraDeg: number,
  fallingExtraDeg: number,
  changeDeg: number,
): number {
  if (!isRing) {
    if (changeDeg > SAME_READING_DEG) return changeDeg + risingExtraDeg;
    return changeDeg < -SAME_READING_DEG ? fallingExtraDeg - changeDeg : 0;
  }
  const up = changeDeg < 0 ? changeDeg + 360 : changeDeg;
  if (up < SAME_READING_DEG || 360 - up < SAME_READING_DEG) return 0;
  const rising = up + risingExtraDeg;
  const falling = 360 - up + fallingExtraDeg;
  return rising <= falling ? rising : falling;
}

/** What going up, and going down, costs on top of the way itself. */
export function playExtrasDeg({ backlashDeg, approach }: MountMotion): {
  readonly rising: number;
  readonly falling: number;
} {
  return {
    rising: approach === 'falling' ? 2 * backlashDeg : 0,
    falling: approach === 'rising' ? 2 * backlashDeg : 0,
  };
}

/**
 * The move between two readings: the way that turns less in all for a ring (rising when both are equal), the only way
 * for a mount with a range.
 */
export function mountMove(mount: MountMotion, fromDeg: number, toDeg: number): MountMove {
  const isRing = mount.rangeDeg === null;
  const change = isRing ? wrap(toDeg - fromDeg, 360) : toDeg - fromDeg;
  const extra = playExtrasDeg(mount);
  const travelDeg = moveTravelDeg(isRing, extra.rising, extra.falling, change);
  if (travelDeg === 0) return { fromDeg, toDeg, viaDeg: null, travelDeg, numbers: 'stay' };
  const rises = isRing ? change + extra.rising <= 360 - change + extra.falling : change > 0;
  const passes = (rises ? extra.rising : extra.falling) / 2;
  const via = passes === 0 ? null : toDeg + (rises ? passes : -passes);
  return {
    fromDeg,
    toDeg,
    viaDeg: via === null || !isRing ? via : wrap(via, 360),
    travelDeg,
    numbers: rises ? 'rise' : 'fall',
  };
}

/** The reading of a list nearest to the one a solution is listed with; the first of equals. */
export function nearestReading(
  mount: MountMotion,
  readings: readonly number[],
  fastAxisDeg: number,
): number | null {
  const [first] = readings;
  if (first === undefined || mount.rangeDeg === null) return first ?? null;
  const listed = dialFromFastAxis(degrees(wrap(fastAxisDeg, 180)), mount);
  return readings.reduce((best, reading) =>
    Math.abs(reading - listed) < Math.abs(best - listed) ? reading : best,
  );
}
