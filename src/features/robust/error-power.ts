/** 1 − F of one setting at an error. */
export type MissAt = (error: number) => number;

/** Below this, rounding (1e-30 or so, squared sums of it) would be measured instead. */
const LEAST_MEASURED = 1e-25;

/** Shares of the width that are tried: first where the tests of the literature measure, then nearer, then further out. */
const NEARER = [0.1, 0.03, 0.01];
const FURTHER = [0.2, 0.4];

/**
 * The power of the error with which 1 − F grows: the slope on two log axes between h and 2h, both signs taken together. Where
 * the next terms still disturb it, h goes nearer to no error, as far as rounding allows; where rounding is all there is,
 * further out. Null where nothing is left to measure.
 */
export function measuredPower(missAt: MissAt, width: number): MeasuredPower | null {
  let last: MeasuredPower | null = null;
  for (const share of NEARER) {
    const measured = measuredAt(missAt, share * width);
    if (measured === null) break;
    last = measured;
    if (wholePower(measured.power) !== null) break;
  }
  if (last !== null) return last;
  for (const share of FURTHER) {
    const measured = measuredAt(missAt, share * width);
    if (measured !== null) return measured;
  }
  return null;
}

export interface MeasuredPower {
  readonly power: number;
  /** Measured between this error and twice as much. */
  readonly near: number;
}

function measuredAt(missAt: MissAt, near: number): MeasuredPower | null {
  const once = missAt(near) * missAt(-near);
  const twice = missAt(2 * near) * missAt(-2 * near);
  return once > LEAST_MEASURED ** 2 ? { power: Math.log2(twice / once) / 2, near } : null;
}

// A power measured at a finite error is off by the next terms.
const WHOLE_WITHIN = 0.1;

/** The whole power it is close to; null where no power describes it there. */
export function wholePower(power: number): number | null {
  const whole = Math.round(power);
  return whole > 0 && Math.abs(power - whole) <= WHOLE_WITHIN ? whole : null;
}

/**
 * The errors around zero over which 1 − F stays within the tolerance, from evenly spaced points and straight lines
 * between them on a log axis. Null where it isn't even at no error; an end at the last point may lie further out.
 */
export function withinTolerance(
  points: readonly { readonly error: number; readonly infidelity: number }[],
  tolerance: number,
): { readonly from: number; readonly to: number } | null {
  const middle = points.reduce((best, { error }, k) => {
    return Math.abs(error) < Math.abs(points[best]?.error ?? Infinity) ? k : best;
  }, 0);
  const isWithin = (k: number): boolean => (points[k]?.infidelity ?? Infinity) <= tolerance;
  if (!isWithin(middle)) return null;
  const end = (step: 1 | -1): number => {
    let last = middle;
    while (isWithin(last + step)) last += step;
    const [inside, outside] = [points[last], points[last + step]];
    if (inside === undefined) return 0;
    if (outside === undefined) return inside.error;
    const low = Math.log(Math.max(inside.infidelity, 1e-300));
    const share = (Math.log(tolerance) - low) / (Math.log(outside.infidelity) - low);
    return inside.error + Math.min(1, Math.max(0, share)) * (outside.error - inside.error);
  };
  return { from: end(-1), to: end(1) };
}
