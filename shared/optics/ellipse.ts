import { atan2, sincos } from './elementary';
import type { JonesVector } from './jones';
import type { Stokes } from './stokes';
import { type Radians, radians } from './units';

/** The polarisation ellipse of a pure state, canonical: counter-clockwise as the receiver sees it is positive. */
export interface Ellipse {
  /** Of the long axis from H, counter-clockwise to the receiver, in (−π/2, π/2]; 0 by choice for circular light. */
  readonly azimuthRad: Radians;
  /** In [−π/4, π/4]; its tangent is the ratio of the axes. */
  readonly ellipticityRad: Radians;
}

/** S1 = cos2χ cos2ψ, S2 = cos2χ sin2ψ, S3 = sin2χ, solved for ψ and χ. */
export function ellipseOf([s1, s2, s3]: Stokes): Ellipse {
  const linear = Math.sqrt(s1 * s1 + s2 * s2);
  return {
    azimuthRad: radians(linear < 1e-15 ? 0 : atan2(s2, s1) / 2),
    ellipticityRad: radians(atan2(s3, linear) / 2),
  };
}

export function ellipseToStokes({ azimuthRad, ellipticityRad }: Ellipse): Stokes {
  const azimuth = sincos(2 * azimuthRad);
  const ellipticity = sincos(2 * ellipticityRad);
  return [ellipticity.cos * azimuth.cos, ellipticity.cos * azimuth.sin, ellipticity.sin];
}

/** The field at z = 0, in units of the whole amplitude. */
export interface Field {
  readonly h: number;
  readonly v: number;
}

/** E(t) = Re[(a, b) e^{−iωt}] at ωt = `phaseRad`. For (1, i)/√2 it turns counter-clockwise to the receiver. */
export function fieldAt(jones: JonesVector, phaseRad: Radians): Field {
  const { sin, cos } = sincos(phaseRad);
  return { h: jones.aRe * cos + jones.aIm * sin, v: jones.bRe * cos + jones.bIm * sin };
}

/** One period of the field, from ωt = 0 to 2π inclusive. @throws RangeError for fewer than 1 step. */
export function fieldTrace(jones: JonesVector, steps: number): readonly Field[] {
  if (!(Number.isInteger(steps) && steps >= 1)) throw new RangeError('a trace needs at least one step');
  return Array.from({ length: steps + 1 }, (_, k) => fieldAt(jones, radians((2 * Math.PI * k) / steps)));
}
