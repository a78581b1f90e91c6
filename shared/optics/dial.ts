import { degrees, type Degrees, wrap, wrapSigned } from './units';

/** Which way the engraved numbers run for the receiver: +1 when they rise as the mount is turned counter-clockwise. */
export type DialDirection = 1 | -1;

/** What turns a table angle into a number on one mount's dial. Offset: the reading with the fast axis along H. */
export interface DialScale {
  readonly offsetDeg: number;
  readonly direction: DialDirection;
  /** The finest step the dial can be set to, in degrees; above 0. */
  readonly resolutionDeg: number;
  /** Readings that the mount can be turned to, at least half a turn; null for a ring that turns all the way round. */
  readonly rangeDeg: { readonly from: number; readonly to: number } | null;
}

type Engraving = Pick<DialScale, 'offsetDeg' | 'direction'>;

/** dial = offset + direction · θ, in [0, 360), unrounded. */
export function dialFromFastAxis(fastAxisDeg: Degrees, scale: Engraving): Degrees {
  return degrees(wrap(scale.offsetDeg + scale.direction * fastAxisDeg, 360));
}

/** The table angle of the fast axis, in [0, 180), for a reading on the dial. */
export function fastAxisFromDial(dialDeg: Degrees, scale: Engraving): Degrees {
  return degrees(wrap(scale.direction * (dialDeg - scale.offsetDeg), 180));
}

/** Readings closer than this are the same: far below any dial's step, far above rounding. */
export const SAME_READING_DEG = 1e-9;

/**
 * The settable reading nearest to `dialDeg` on a ring: a multiple of the step in [0, 360). Where the step does not divide
 * a whole turn, the last mark before 360 is less than a step away from 0.
 */
export function roundDial(dialDeg: Degrees, resolutionDeg: number): Degrees {
  const once = wrap(dialDeg, 360);
  const rounded = readingOfStep(Math.round(once / resolutionDeg), resolutionDeg);
  const isNearerToZero = rounded >= 360 || 360 - once < Math.abs(once - rounded) - SAME_READING_DEG;
  return degrees(isNearerToZero ? 0 : rounded);
}

function readingOfStep(step: number, resolutionDeg: number): number {
  // Without this a reading of 83.5 would be stored as 83.50000000000001, and one of −0.01 as −0.
  return Number((step * resolutionDeg).toFixed(dialDecimals(resolutionDeg) + 3)) + 0;
}

/**
 * The settable readings, multiples of the step within a range, that stand for `dialDeg`: one for each half turn on which
 * rounding ends within the range, rising. Where it ends within on none, the one inside that is nearest, less than a step
 * off; none at all where the range reaches no half turn of `dialDeg`.
 */
export function readingsWithin(
  dialDeg: number,
  resolutionDeg: number,
  range: { readonly from: number; readonly to: number },
): readonly number[] {
  const from = range.from - SAME_READING_DEG;
  const to = range.to + SAME_READING_DEG;
  const first = Math.ceil((from - dialDeg) / 180) - 1;
  const last = Math.floor((to - dialDeg) / 180) + 1;
  const readings: number[] = [];
  let nearest: { readonly step: number; readonly offDeg: number } | null = null;
  for (let turn = first; turn <= last; turn += 1) {
    const exact = dialDeg + 180 * turn;
    const step = Math.round(exact / resolutionDeg);
    const rounded = step * resolutionDeg;
    if (rounded >= from && rounded <= to) {
      readings.push(readingOfStep(step, resolutionDeg));
      continue;
    }
    const inside = rounded < from ? Math.ceil(from / resolutionDeg) : Math.floor(to / resolutionDeg);
    const offDeg = Math.abs(inside * resolutionDeg - exact);
    const isInside = inside * resolutionDeg >= from && inside * resolutionDeg <= to;
    if (isInside && offDeg < resolutionDeg && (nearest === null || offDeg < nearest.offDeg)) {
      nearest = { step: inside, offDeg };
    }
  }
  if (readings.length > 0 || nearest === null) return readings;
  return [readingOfStep(nearest.step, resolutionDeg)];
}

/**
 * What to dial for a fast axis, at the mount's resolution and within its range. A plate is the same after half a turn, so
 * there are at least two such readings: the one nearest to `presentDeg`, or without it the first of the range.
 * @throws RangeError for a range of less than half a turn that this axis is not within.
 */
export function dialFor(fastAxisDeg: Degrees, scale: DialScale, presentDeg: number | null): Degrees {
  const { rangeDeg, resolutionDeg } = scale;
  const dialDeg = dialFromFastAxis(fastAxisDeg, scale);
  if (rangeDeg === null) {
    const rounded = roundDial(dialDeg, resolutionDeg);
    if (presentDeg === null) return rounded;
    const other = roundDial(degrees(dialDeg + 180), resolutionDeg);
    const apart = (reading: number) => Math.abs(wrapSigned(reading - presentDeg, 360));
    return apart(other) < apart(rounded) - SAME_READING_DEG ? other : rounded;
  }
  const [first, ...others] = readingsWithin(dialDeg, resolutionDeg, rangeDeg);
  if (first === undefined) {
    throw new RangeError(
      `no reading from ${rangeDeg.from} to ${rangeDeg.to} turns the axis to ${fastAxisDeg}°`,
    );
  }
  if (presentDeg === null) return degrees(first);
  return degrees(
    others.reduce(
      (best, reading) => (Math.abs(reading - presentDeg) < Math.abs(best - presentDeg) ? reading : best),
      first,
    ),
  );
}

/** How many decimals a reading at this resolution is always written with: 0.1 → 1, 0.25 → 2, 5/60 → 2. */
export function dialDecimals(resolutionDeg: number): number {
  for (let decimals = 0; decimals < 4; decimals += 1) {
    const scaled = resolutionDeg * 10 ** decimals;
    if (Math.abs(scaled - Math.round(scaled)) < 1e-9) return decimals;
  }
  return 2;
}

/** A turn of one mount, as the receiver sees it. */
export interface DialMove {
  /** Signed turn of the mount, counter-clockwise positive, in (−180, 180]; its sign draws the arrow. */
  readonly turnDeg: Degrees;
  /** Its size, in [0, 180]. */
  readonly amountDeg: Degrees;
  readonly sense: 'clockwise' | 'counter-clockwise' | 'none';
  readonly numbers: 'rise' | 'fall' | 'stay';
}

/** The shorter way from one reading to another. The one source of the arrow's sweep, its words and its sign. */
export function dialMove(fromDeg: Degrees, toDeg: Degrees, direction: DialDirection): DialMove {
  const rise = wrapSigned(toDeg - fromDeg, 360);
  const turnDeg = degrees(rise === 0 ? 0 : rise * direction);
  return {
    turnDeg,
    amountDeg: degrees(Math.abs(rise)),
    sense: turnDeg === 0 ? 'none' : turnDeg > 0 ? 'counter-clockwise' : 'clockwise',
    numbers: rise === 0 ? 'stay' : rise > 0 ? 'rise' : 'fall',
  };
}
