import { type CirclePoint, EIGHTHS } from './trig-quadratic';
import { innerMaxima, type Meeting, type TwoPlates } from './two-plates';
import { curveAt } from './turn-curve';
import { turned } from './turned';
import { sincos } from '../elementary';

/** Every local optimum of the fidelity where the two curves don't meet. */
export interface Closest {
  readonly optima: readonly Meeting[];
  /** Whether the optima are members of a continuous family, one for each of eight positions of the outer plate. */
  readonly family: boolean;
}

/** One ridge of the fidelity at one u: the best v there, and the slope of the fidelity along u. */
interface Ridge {
  readonly u: CirclePoint;
  readonly v: CirclePoint;
  readonly slope: number;
}

// u in steps of 4°, 2° of the plate. The fidelity along a ridge has few maxima, tens of degrees apart.
const STEPS = 90;
// Slopes below this everywhere are a ridge without a summit.
const LEVEL = 1e-11;
// Neighbouring points of one ridge differ by less than this in v: cos 50°.
const SAME_RIDGE = 0.64;

/**
 * The summits of F(u, v) = ½(1 + q(u)·w(v)). Where ∂F/∂v = 0 defines ridges v(u), found in closed form for each u, the
 * summits are the zeros of ∂F/∂u along a ridge: bracketed on a fixed grid, halved, then Newton in both angles.
 */
export function closestMeetings(plates: TwoPlates): Closest {
  const slices: (readonly Ridge[])[] = [];
  let steepest = 0;
  for (let k = 0; k < STEPS; k += 1) {
    const slice = ridgesAt(plates, sincos((2 * Math.PI * k) / STEPS));
    for (const { slope } of slice) steepest = Math.max(steepest, Math.abs(slope));
    slices.push(slice);
  }
  if (steepest < LEVEL) {
    const optima = EIGHTHS.flatMap((u) => innerMaxima(plates, u).map((v) => meetingAt(plates, u, v)));
    return { optima, family: true };
  }
  const optima: Meeting[] = [];
  slices.forEach((slice, k) => {
    const next = slices[(k + 1) % STEPS] ?? [];
    for (const ridge of slice) {
      const follower = sameRidge(ridge.v, next);
      if (follower !== null && ridge.slope > 0 && follower.slope <= 0) {
        const summit = climb(plates, halve(plates, ridge, follower));
        if (summit !== null) optima.push(summit);
      }
    }
  });
  return { optima, family: false };
}

function ridgesAt(plates: TwoPlates, u: CirclePoint): readonly Ridge[] {
  return innerMaxima(plates, u).map((v) => {
    const { q, w } = plates;
    curveAt(plates.outer, u, q);
    curveAt(plates.inner, v, w);
    return { u, v, slope: q.d1 * w.q1 + q.d2 * w.q2 + q.d3 * w.q3 };
  });
}

function sameRidge(v: CirclePoint, ridges: readonly Ridge[]): Ridge | null {
  let best: Ridge | null = null;
  let nearest = SAME_RIDGE;
  for (const ridge of ridges) {
    const overlap = ridge.v.cos * v.cos + ridge.v.sin * v.sin;
    if (overlap > nearest) {
      nearest = overlap;
      best = ridge;
    }
  }
  return best;
}

function halve(plates: TwoPlates, rising: Ridge, falling: Ridge): Ridge {
  let [low, high] = [rising, falling];
  for (let step = 0; step < 24; step += 1) {
    const [cos, sin] = [low.u.cos + high.u.cos, low.u.sin + high.u.sin];
    const scale = 1 / Math.sqrt(cos * cos + sin * sin);
    const middle = sameRidge(low.v, ridgesAt(plates, { cos: cos * scale, sin: sin * scale }));
    // The ridge ends inside the bracket; Newton decides from here.
    if (middle === null) return low;
    if (middle.slope > 0) low = middle;
    else high = middle;
  }
  return low;
}

// Newton on the gradient of q·w; null where it doesn't end on a summit.
function climb(plates: TwoPlates, start: Ridge): Meeting | null {
  const { outer, inner, q, w } = plates;
  let { u, v } = start;
  for (let step = 0; step < 30; step += 1) {
    curveAt(outer, u, q);
    curveAt(inner, v, w);
    const gu = q.d1 * w.q1 + q.d2 * w.q2 + q.d3 * w.q3;
    const gv = q.q1 * w.d1 + q.q2 * w.d2 + q.q3 * w.d3;
    const uu = q.e1 * w.q1 + q.e2 * w.q2 + q.e3 * w.q3;
    const uv = q.d1 * w.d1 + q.d2 * w.d2 + q.d3 * w.d3;
    const vv = q.q1 * w.e1 + q.q2 * w.e2 + q.q3 * w.e3;
    const det = uu * vv - uv * uv;
    if (!(uu < 0 && vv < 0 && det > -1e-12)) return null;
    // On a summit that is flat in one direction the point already stands as well as any.
    if (det < 1e-13) return meetingAt(plates, u, v);
    const du = -(vv * gu - uv * gv) / det;
    const dv = -(uu * gv - uv * gu) / det;
    u = turned(u, du);
    v = turned(v, dv);
    if (Math.abs(du) + Math.abs(dv) < 1e-15) break;
  }
  return meetingAt(plates, u, v);
}

function meetingAt({ outer, inner, q, w }: TwoPlates, u: CirclePoint, v: CirclePoint): Meeting {
  curveAt(outer, u, q);
  curveAt(inner, v, w);
  const r1 = q.q1 - w.q1;
  const r2 = q.q2 - w.q2;
  const r3 = q.q3 - w.q3;
  return { u, v, infidelity: (r1 * r1 + r2 * r2 + r3 * r3) / 4 };
}
