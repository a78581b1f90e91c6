import { degrees, type Degrees, wrap, wrapSigned } from './units';

/** Which way the engraved numbers run for the receiver: +1 when they rise as the mount is turned counter-clockwise. */
export type DialDirection = 1 | -1;

/** What turns a table angle into a number on one mount's dial. Offset: the reading with the fast axis along H. */
export interface DialScale {
  readonly offsetDeg: number;
  readonly direction: DialDirection;
  /** The finest step the dial can be set to, in degrees; above 0. */
  readonly resolutionDeg: number;
}

/** dial = offset + direction · θ, in [0, 360), unrounded. */
export function dialFromFastAxis(fastAxisDeg: Degrees, scale: DialScale): Degrees {
  return degrees(wrap(scale.offsetDeg + scale.direction * fastAxisDeg, 360));
}

/** The table angle of the fast axis, in [0, 180), for a reading on the dial. */
export function fastAxisFromDial(dialDeg: Degrees, scale: DialScale): Degrees {
  return degrees(wrap(scale.direction * (dialDeg - scale.offsetDeg), 180));
}

/** The settable reading nearest to `dialDeg`, in [0, 360). */
export function roundDial(dialDeg: Degrees, resolutionDeg: number): Degrees {
  const decimals = dialDecimals(resolutionDeg) + 3;
  const rounded = Math.round(dialDeg / resolutionDeg) * resolutionDeg;
  // Without this a reading of 83.5 would be stored as 83.50000000000001.
  return degrees(wrap(Number(rounded.toFixed(decimals)), 360));
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
