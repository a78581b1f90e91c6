import type { Stokes } from '../stokes';
import type { CirclePoint } from './trig-quadratic';

/**
 * Where a plate of one retardance takes one state as the plate is turned: the closed curve
 * q(u) = p cos δ + (n × p) sin δ + n (n·p)(1 − cos δ) with n = (cos u, sin u, 0) and u = 2θ, canonical Stokes axes.
 */
export interface TurnCurve {
  readonly p1: number;
  readonly p2: number;
  readonly p3: number;
  readonly cosRetardance: number;
  readonly sinRetardance: number;
}

/** A point of the curve with its first and second derivative by u; filled in place by `curveAt`. */
export interface CurvePoint {
  q1: number;
  q2: number;
  q3: number;
  d1: number;
  d2: number;
  d3: number;
  e1: number;
  e2: number;
  e3: number;
}

export function turnCurve([p1, p2, p3]: Stokes, cosRetardance: number, sinRetardance: number): TurnCurve {
  return { p1, p2, p3, cosRetardance, sinRetardance };
}

export function newCurvePoint(): CurvePoint {
  return { q1: 0, q2: 0, q3: 0, d1: 0, d2: 0, d3: 0, e1: 0, e2: 0, e3: 0 };
}

export function curveAt(curve: TurnCurve, { cos, sin }: CirclePoint, out: CurvePoint): void {
  const { p1, p2, p3, cosRetardance: c, sinRetardance: s } = curve;
  const along = cos * p1 + sin * p2;
  const across = cos * p2 - sin * p1;
  const f = 1 - c;
  out.q1 = c * p1 + s * sin * p3 + f * along * cos;
  out.q2 = c * p2 - s * cos * p3 + f * along * sin;
  out.q3 = c * p3 + s * across;
  // n' = (−sin, cos, 0), and (n·p)' = across, across' = −along.
  out.d1 = s * cos * p3 + f * (across * cos - along * sin);
  out.d2 = s * sin * p3 + f * (across * sin + along * cos);
  out.d3 = -s * along;
  out.e1 = -s * sin * p3 - 2 * f * (across * sin + along * cos);
  out.e2 = s * cos * p3 + 2 * f * (across * cos - along * sin);
  out.e3 = -s * across;
}
