/** An angle in radians: everything inside the library. Not assignable from `Degrees` or a bare number. */
export type Radians = number & { readonly unit: 'rad' };

/** An angle in degrees: forms, files, labels. Not assignable from `Radians` or a bare number. */
export type Degrees = number & { readonly unit: 'deg' };

/** Marks a number as an angle in radians. */
export function radians(value: number): Radians {
  // eslint-disable-next-line @typescript-eslint/consistent-type-assertions -- the one place where a number becomes Radians
  return value as Radians;
}

/** Marks a number as an angle in degrees. */
export function degrees(value: number): Degrees {
  // eslint-disable-next-line @typescript-eslint/consistent-type-assertions -- the one place where a number becomes Degrees
  return value as Degrees;
}

export function toRadians(angleDeg: Degrees): Radians {
  return radians((angleDeg * Math.PI) / 180);
}

export function toDegrees(angleRad: Radians): Degrees {
  return degrees((angleRad * 180) / Math.PI);
}

/** The representative of `value` modulo `period` in [0, period). */
export function wrap(value: number, period: number): number {
  const remainder = value % period;
  const wrapped = remainder < 0 ? remainder + period : remainder;
  // A tiny negative remainder plus the period rounds up to the period itself.
  return wrapped >= period ? 0 : wrapped;
}

/** The representative of `value` modulo `period` in (−period/2, period/2]. */
export function wrapSigned(value: number, period: number): number {
  const wrapped = wrap(value, period);
  return wrapped > period / 2 ? wrapped - period : wrapped;
}
