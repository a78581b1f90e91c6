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

/** The settable reading nearest to `dialDeg`, in [0, 360). */
export function roundDial(dialDeg: Degrees, resolutionDeg: number): Degrees {
  return degrees(wrap(roundReading(dialDeg, resolutionDeg), 360));
}

function roundReading(dialDeg: number, resolutionDeg: number): number {
  const decimals = dialDecimals(resolutionDeg) + 3;
  const rounded = Math.round(dialDeg / resolutionDeg) * resolutionDeg;
  // Without this a reading of 83.5 would be stored as 83.50000000000001, and one of −0.01 as −0.
  return Number(rounded.toFixed(decimals)) + 0;
}

/**
 * What to dial for a fast axis, at the mount's resolution and within its range. A plate is the same after half a turn, so
 * there are at least two such readings: the one nearest to `presentDeg`, or without it the first of the range.
 */
export function dialFor(fastAxisDeg: Degrees, scale: DialScale, presentDeg: number | null): Degrees {
  const { rangeDeg, resolutionDeg } = scale;
  const dialDeg = dialFromFastAxis(fastAxisDeg, scale);
  if (rangeDeg === null) {
    const rounded = roundDial(dialDeg, resolutionDeg);
    if (presentDeg === null || Math.abs(wrapSigned(rounded - presentDeg, 360)) <= 90) return rounded;
    return roundDial(degrees(dialDeg + 180), resolutionDeg);
  }
  // Half a step of rounding may leave the range by as much; the next reading half a turn on does not.
  let best = roundReading(rangeDeg.from + wrap(dialDeg - rangeDeg.from, 180), resolutionDeg);
  if (best < rangeDeg.from) best += 180;
  if (presentDeg === null) return degrees(best);
  for (let reading = best + 180; reading <= rangeDeg.to; reading += 180) {
    if (Math.abs(reading - presentDeg) < Math.abs(best - presentDeg)) best = reading;
  }
  return degrees(best);
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
