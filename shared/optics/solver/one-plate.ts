import type { Stokes } from '../stokes';
import type { AxesSetting, StateTask } from './state-task';
import { type CirclePoint, EIGHTHS, trigMaxima, type TrigQuadratic, trigIsFlat } from './trig-quadratic';
import { curveAt, type CurvePoint, newCurvePoint, type TurnCurve, turnCurve } from './turn-curve';
import { turned } from './turned';

export interface OnePlate {
  /** Every local optimum; where `flat`, eight positions of the same 1 − F. */
  readonly optima: readonly AxesSetting[];
  /** Whether the plate may stand at any angle. */
  readonly flat: boolean;
}

/**
 * Every local optimum of the fidelity of one plate: ½(1 + t·q(u)) is a trigonometric polynomial of degree 2, its maxima are
 * found in closed form and polished.
 */
export function onePlate({ from, to, plates }: StateTask): OnePlate {
  const [{ sin, cos } = { sin: 0, cos: 1 }] = plates;
  const curve = turnCurve(from, cos, sin);
  const point = newCurvePoint();
  const [t1, t2, t3] = to;
  const [p1, p2, p3] = from;
  const half = (1 - cos) / 2;
  const overlap: TrigQuadratic = {
    k: cos * (p1 * t1 + p2 * t2 + p3 * t3) + half * (p1 * t1 + p2 * t2),
    c1: sin * (p2 * t3 - p3 * t2),
    s1: sin * (p3 * t1 - p1 * t3),
    c2: half * (p1 * t1 - p2 * t2),
    s2: half * (p1 * t2 + p2 * t1),
  };
  const missAt = (u: CirclePoint): number => {
    curveAt(curve, u, point);
    const [r1, r2, r3] = [point.q1 - t1, point.q2 - t2, point.q3 - t3];
    return (r1 * r1 + r2 * r2 + r3 * r3) / 4;
  };
  if (trigIsFlat(overlap)) {
    return { optima: EIGHTHS.map((u) => ({ axes: [u], infidelity: missAt(u) })), flat: true };
  }
  const optima = trigMaxima(overlap).map((start) => {
    const u = summit(curve, point, to, start);
    return { axes: [u], infidelity: missAt(u) };
  });
  return { optima, flat: false };
}

// Newton on the slope of t·q; it stops where the slope is rounding.
function summit(curve: TurnCurve, point: CurvePoint, [t1, t2, t3]: Stokes, start: CirclePoint): CirclePoint {
  let u = start;
  for (let step = 0; step < 4; step += 1) {
    curveAt(curve, u, point);
    const slope = point.d1 * t1 + point.d2 * t2 + point.d3 * t3;
    const bend = point.e1 * t1 + point.e2 * t2 + point.e3 * t3;
    if (!(bend < 0) || Math.abs(slope) < 1e-17) break;
    u = turned(u, -slope / bend);
    if (Math.abs(slope) < 1e-15 * -bend) break;
  }
  return u;
}
