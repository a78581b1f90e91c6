import type { Stokes } from '../stokes';
import {
  type CirclePoint,
  trigMaxima,
  type TrigQuadratic,
  trigSize,
  trigValue,
  trigZeros,
} from './trig-quadratic';
import { curveAt, type CurvePoint, newCurvePoint, type TurnCurve, turnCurve } from './turn-curve';
import { turned } from './turned';

/**
 * Two plates between an input and a target, as R_outer(u) · input = R_inner(v)⁻¹ · target: two closed curves on the
 * sphere, q(u) and w(v), and the question is where they meet or come closest. "Outer" is the plate whose angle is
 * searched, "inner" the one that is eliminated; either may be first in the beam (prepare.ts chooses).
 */
export interface TwoPlates {
  readonly outer: TurnCurve;
  readonly inner: TurnCurve;
  readonly q: CurvePoint;
  readonly w: CurvePoint;
}

/** Both plates' angles, doubled, as points on the circle, with ¼|q − w|², the infidelity. */
export interface Meeting {
  readonly u: CirclePoint;
  readonly v: CirclePoint;
  readonly infidelity: number;
}

export function twoPlates(
  input: Stokes,
  target: Stokes,
  outer: { readonly cos: number; readonly sin: number },
  inner: { readonly cos: number; readonly sin: number },
): TwoPlates {
  return {
    outer: turnCurve(input, outer.cos, outer.sin),
    // The inner plate is undone, so its turn runs the other way.
    inner: turnCurve(target, inner.cos, -inner.sin),
    q: newCurvePoint(),
    w: newCurvePoint(),
  };
}

/**
 * The condition on u alone. From C(t − q) = S n × (t + q), where C, S are cos and sin of half the inner retardance
 * (Rodrigues), the first two rows give n and |n| = 1 leaves
 * q3² + t3² − 2 cos δ t3 q3 − (1 + cos δ)(1 − t·q) = 0, a trigonometric polynomial of degree 2 in u.
 */
export function meetingCondition({ outer, inner }: TwoPlates): TrigQuadratic {
  const { p1, p2, p3, cosRetardance: c, sinRetardance: s } = outer;
  const { p1: t1, p2: t2, p3: t3, cosRetardance: cosInner } = inner;
  const [a0, a1, a2] = [c * p3, s * p2, -s * p1];
  const half = (1 - c) / 2;
  const even = (1 + c) / 2;
  const sum = 1 + cosInner;
  const linear = 2 * cosInner * t3;
  return {
    k:
      a0 * a0 +
      (a1 * a1 + a2 * a2) / 2 +
      t3 * t3 -
      linear * a0 -
      sum * (1 - even * (t1 * p1 + t2 * p2) - t3 * a0),
    c1: 2 * a0 * a1 - linear * a1 + sum * (t3 * a1 - t2 * s * p3),
    s1: 2 * a0 * a2 - linear * a2 + sum * (t3 * a2 + t1 * s * p3),
    c2: (a1 * a1 - a2 * a2) / 2 + sum * half * (t1 * p1 - t2 * p2),
    s2: a1 * a2 + sum * half * (t1 * p2 + t2 * p1),
  };
}

/** For a fixed u, every v at which the fidelity is largest in its neighbourhood. */
export function innerMaxima(plates: TwoPlates, u: CirclePoint): readonly CirclePoint[] {
  const { outer, inner, q } = plates;
  curveAt(outer, u, q);
  const { p1, p2, p3, cosRetardance: c, sinRetardance: s } = inner;
  const half = (1 - c) / 2;
  return trigMaxima({
    k: 0,
    c1: s * (p2 * q.q3 - p3 * q.q2),
    s1: s * (p3 * q.q1 - p1 * q.q3),
    c2: half * (p1 * q.q1 - p2 * q.q2),
    s2: half * (p1 * q.q2 + p2 * q.q1),
  });
}

// With |t3 + q3| above this, the closed form for n keeps at least half its digits; Newton then restores the rest.
const CLOSED_FORM_FROM = 1e-4;
// f this small beside its coefficients may be a touching zero.
const TOUCHES = 1e-6;
/** |q − w|² below this is a meeting: 1e-12 rad on the sphere. */
const MEETS = 1e-24;

/** Every meeting of the two curves, unsorted and with repeats. `condition` must not vanish everywhere. */
export function meetings(plates: TwoPlates, condition: TrigQuadratic): readonly Meeting[] {
  const found: Meeting[] = [];
  const { zeros, turningPoints } = trigZeros(condition);
  const attempt = (u: CirclePoint, v: CirclePoint): void => {
    const meeting = polish(plates, u, v);
    if (4 * meeting.infidelity < MEETS) found.push(meeting);
  };
  for (const u of zeros) {
    const v = closedForm(plates, u);
    if (v !== null) attempt(u, v);
    else for (const maximum of innerMaxima(plates, u)) attempt(u, maximum);
  }
  const small = TOUCHES * trigSize(condition);
  for (const u of turningPoints) {
    if (Math.abs(trigValue(condition, u)) < small) {
      for (const maximum of innerMaxima(plates, u)) attempt(u, maximum);
    }
  }
  return found;
}

// n = (−C(t2 − q2), C(t1 − q1)) / (S (t3 + q3)), up to a positive factor; null where that is 0/0.
function closedForm({ outer, inner, q }: TwoPlates, u: CirclePoint): CirclePoint | null {
  curveAt(outer, u, q);
  const m3 = inner.p3 + q.q3;
  if (Math.abs(m3) < CLOSED_FORM_FROM) return null;
  const b = inner.p1 - q.q1;
  const a = q.q2 - inner.p2;
  const length = Math.sqrt(a * a + b * b);
  if (length < CLOSED_FORM_FROM) return null;
  // The sign of cot(δ/2) is that of sin δ; the inner curve holds −δ.
  const sign = inner.sinRetardance < 0 === m3 > 0 ? 1 : -1;
  return { cos: (sign * a) / length, sin: (sign * b) / length };
}

/** Newton on q(u) − w(v) = 0 by normal equations; the best point met. Converges to a fold as well, only slower. */
export function polish(plates: TwoPlates, startU: CirclePoint, startV: CirclePoint): Meeting {
  const { outer, inner, q, w } = plates;
  let u = startU;
  let v = startV;
  let best: Meeting | null = null;
  for (let step = 0; step < 30; step += 1) {
    curveAt(outer, u, q);
    curveAt(inner, v, w);
    const r1 = q.q1 - w.q1;
    const r2 = q.q2 - w.q2;
    const r3 = q.q3 - w.q3;
    const squared = r1 * r1 + r2 * r2 + r3 * r3;
    if (best === null || squared < 4 * best.infidelity) best = { u, v, infidelity: squared / 4 };
    else if (step > 2) return best;
    // Below this a further step only moves the last bit.
    if (squared < 1e-31) return best;
    const aa = q.d1 * q.d1 + q.d2 * q.d2 + q.d3 * q.d3;
    const ab = -(q.d1 * w.d1 + q.d2 * w.d2 + q.d3 * w.d3);
    const bb = w.d1 * w.d1 + w.d2 * w.d2 + w.d3 * w.d3;
    const ga = q.d1 * r1 + q.d2 * r2 + q.d3 * r3;
    const gb = -(w.d1 * r1 + w.d2 * r2 + w.d3 * r3);
    // The damping only matters where both curves run the same way.
    const damping = 1e-13 * (aa + bb) + 1e-300;
    const det = (aa + damping) * (bb + damping) - ab * ab;
    u = turned(u, -((bb + damping) * ga - ab * gb) / det);
    v = turned(v, -((aa + damping) * gb - ab * ga) / det);
  }
  return best ?? { u, v, infidelity: 1 };
}
