import { realZeros } from './quartic';

/** f(u) = k + c1 cos u + s1 sin u + c2 cos 2u + s2 sin 2u. */
export interface TrigQuadratic {
  readonly k: number;
  readonly c1: number;
  readonly s1: number;
  readonly c2: number;
  readonly s2: number;
}

/** A point on the unit circle: an angle u as (cos u, sin u), so that finding it needs no trigonometry. */
export interface CirclePoint {
  readonly cos: number;
  readonly sin: number;
}

const HALF_ROOT = 0.7071067811865476;

/** Every 45° round the circle, exact but for √½. */
export const EIGHTHS: readonly CirclePoint[] = [
  { cos: 1, sin: 0 },
  { cos: HALF_ROOT, sin: HALF_ROOT },
  { cos: 0, sin: 1 },
  { cos: -HALF_ROOT, sin: HALF_ROOT },
  { cos: -1, sin: 0 },
  { cos: -HALF_ROOT, sin: -HALF_ROOT },
  { cos: 0, sin: -1 },
  { cos: HALF_ROOT, sin: -HALF_ROOT },
];

export function trigValue(f: TrigQuadratic, { cos, sin }: CirclePoint): number {
  return f.k + f.c1 * cos + f.s1 * sin + f.c2 * (cos * cos - sin * sin) + f.s2 * 2 * sin * cos;
}

function trigDerivative({ c1, s1, c2, s2 }: TrigQuadratic): TrigQuadratic {
  return { k: 0, c1: s1, s1: -c1, c2: 2 * s2, s2: -2 * c2 };
}

export function trigSize({ k, c1, s1, c2, s2 }: TrigQuadratic): number {
  return Math.max(Math.abs(k), Math.abs(c1), Math.abs(s1), Math.abs(c2), Math.abs(s2));
}

export interface TrigZeros {
  readonly zeros: readonly CirclePoint[];
  /** Turning points of f's quartic: where f may touch 0 without crossing it. */
  readonly turningPoints: readonly CirclePoint[];
}

/**
 * All zeros of a trigonometric polynomial of degree 2 on the circle: at most four, found as the zeros of a quartic in
 * t = tan((u − u0)/2). u0 is turned so that t = ∞ falls where |f| is largest, far from every zero.
 * f must not vanish everywhere: test `trigSize` first.
 */
export function trigZeros(f: TrigQuadratic): TrigZeros {
  let far: CirclePoint = { cos: 1, sin: 0 };
  let farthest = -1;
  for (const point of EIGHTHS) {
    const size = Math.abs(trigValue(f, point));
    if (size > farthest) {
      farthest = size;
      far = point;
    }
  }
  // t = ∞ is u0 + π.
  const u0 = { cos: -far.cos, sin: -far.sin };
  const cos2 = u0.cos * u0.cos - u0.sin * u0.sin;
  const sin2 = 2 * u0.cos * u0.sin;
  const c1 = f.c1 * u0.cos + f.s1 * u0.sin;
  const s1 = f.s1 * u0.cos - f.c1 * u0.sin;
  const c2 = f.c2 * cos2 + f.s2 * sin2;
  const s2 = f.s2 * cos2 - f.c2 * sin2;
  const { zeros, turningPoints } = realZeros({
    k4: f.k - c1 + c2,
    k3: 2 * s1 - 4 * s2,
    k2: 2 * f.k - 6 * c2,
    k1: 2 * s1 + 4 * s2,
    k0: f.k + c1 + c2,
  });
  const onCircle = (t: number): CirclePoint => {
    const scale = 1 / (1 + t * t);
    const cos = (1 - t * t) * scale;
    const sin = 2 * t * scale;
    return { cos: cos * u0.cos - sin * u0.sin, sin: sin * u0.cos + cos * u0.sin };
  };
  return { zeros: zeros.map(onCircle), turningPoints: turningPoints.map(onCircle) };
}

// A function this flat, beside values of order 1, has no maximum but rounding.
const FLAT = 1e-14;

export function trigIsFlat(f: TrigQuadratic): boolean {
  return trigSize(trigDerivative(f)) < FLAT;
}

/** Where f is largest in its neighbourhood: one or two points; the point u = 0 stands for a constant. */
export function trigMaxima(f: TrigQuadratic): readonly CirclePoint[] {
  if (trigIsFlat(f)) return [{ cos: 1, sin: 0 }];
  const slope = trigDerivative(f);
  const bend = trigDerivative(slope);
  const { zeros, turningPoints } = trigZeros(slope);
  const maxima = zeros.filter((point) => trigValue(bend, point) < 0);
  if (maxima.length > 0) return maxima;
  // A maximum so blunt that its bend is rounding: the highest of what was found.
  let highest: CirclePoint = { cos: 1, sin: 0 };
  for (const point of [...turningPoints, ...zeros]) {
    if (trigValue(f, point) > trigValue(f, highest)) highest = point;
  }
  return [highest];
}
