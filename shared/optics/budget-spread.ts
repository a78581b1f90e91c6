import type { UncertainParameter } from './budget-derivatives';
import { compose, conjugate, type Quaternion } from './quaternion';
import type { Stokes } from './stokes';

/**
 * For a state, ¼|δp|² is the square of a distance. Changes of a pure state are tangent to the sphere, so JΣJᵀ has rank 2 and
 * the third variance is 0.
 */
export function tangentSpread(
  reached: Stokes,
  target: Stokes,
  parameters: readonly UncertainParameter[],
): SpaceSpread {
  const [east, north] = tangentAxes(reached);
  let [ee, en, nn] = [0, 0, 0];
  for (const { sigma: one, derivative } of parameters) {
    const alongEast = (dot(derivative, east) * one) / 2;
    const alongNorth = (dot(derivative, north) * one) / 2;
    ee += alongEast * alongEast;
    en += alongEast * alongNorth;
    nn += alongNorth * alongNorth;
  }
  const middle = (ee + nn) / 2;
  const radius = Math.sqrt(((ee - nn) / 2) * ((ee - nn) / 2) + en * en);
  const miss: Stokes = [reached[0] - target[0], reached[1] - target[1], reached[2] - target[2]];
  // The chord of the miss, in the plane's axes, keeps its length: half of it squared is the setting's own 1 − F.
  const [missEast, missNorth] = stretched(dot(miss, east), dot(miss, north), Math.sqrt(dot(miss, miss)));
  const [c, s] = majorAxis(ee, en, nn, radius);
  return {
    variances: [middle + radius, Math.max(0, middle - radius), 0],
    centre: [(c * missEast + s * missNorth) / 2, (c * missNorth - s * missEast) / 2, 0],
  };
}

function stretched(east: number, north: number, length: number): readonly [number, number] {
  const own = Math.sqrt(east * east + north * north);
  if (own === 0) return [length, 0];
  return [(east * length) / own, (north * length) / own];
}

function majorAxis(ee: number, en: number, nn: number, radius: number): readonly [number, number] {
  if (radius === 0) return [1, 0];
  const cos2 = (ee - nn) / (2 * radius);
  const sin2 = en / radius;
  const c = Math.sqrt(Math.max(0, (1 + cos2) / 2));
  const s = Math.sqrt(Math.max(0, (1 - cos2) / 2));
  return [c, sin2 < 0 ? -s : s];
}

function tangentAxes(state: Stokes): readonly [Stokes, Stokes] {
  const [s1, s2, s3] = state;
  // Any axis well away from the state will do to start from.
  const helper: Stokes = Math.abs(s3) < 0.7 ? [0, 0, 1] : Math.abs(s1) < 0.7 ? [1, 0, 0] : [0, 1, 0];
  const [x, y, z] = cross(helper, [s1, s2, s3]);
  const length = Math.sqrt(x * x + y * y + z * z);
  const east: Stokes = [x / length, y / length, z / length];
  return [east, cross(state, east)];
}

function cross([a1, a2, a3]: Stokes, [b1, b2, b3]: Stokes): Stokes {
  return [a2 * b3 - a3 * b2, a3 * b1 - a1 * b3, a1 * b2 - a2 * b1];
}

function dot([a1, a2, a3]: Stokes, [b1, b2, b3]: Stokes): number {
  return a1 * b1 + a2 * b2 + a3 * b3;
}

/** A Gaussian cloud in space; 1 − F is the square of the distance from the origin. */
export interface SpaceSpread {
  /** Variances along the cloud's own axes, and where its centre lies in them. */
  readonly variances: readonly [number, number, number];
  readonly centre: readonly [number, number, number];
}

/**
 * What is left between an achieved and a wanted unitary has three small coordinates: the vector part v of
 * achieved · wanted*, and 1 − F = ⅔|v|² (references.md 5). A turn by ω moves v by ω/2.
 */
export function turnSpread(
  achieved: Quaternion,
  wanted: Quaternion,
  parameters: readonly UncertainParameter[],
): SpaceSpread {
  const { w, x, y, z } = compose(achieved, conjugate(wanted));
  const scale = Math.sqrt(2 / 3) * (w < 0 ? -1 : 1);
  const covariance: Symmetric = { a11: 0, a22: 0, a33: 0, a12: 0, a13: 0, a23: 0 };
  for (const { sigma, derivative } of parameters) {
    const variance = (sigma * sigma) / 6;
    const [d1, d2, d3] = derivative;
    covariance.a11 += variance * d1 * d1;
    covariance.a22 += variance * d2 * d2;
    covariance.a33 += variance * d3 * d3;
    covariance.a12 += variance * d1 * d2;
    covariance.a13 += variance * d1 * d3;
    covariance.a23 += variance * d2 * d3;
  }
  return ownAxes(covariance, [scale * z, scale * x, scale * y]);
}

interface Symmetric {
  a11: number;
  a22: number;
  a33: number;
  a12: number;
  a13: number;
  a23: number;
}

// Jacobi: turn one pair of axes after the other until nothing is left off the diagonal. Squares its error at every round.
function ownAxes(m: Symmetric, [v1, v2, v3]: readonly [number, number, number]): SpaceSpread {
  let { a11, a22, a33, a12, a13, a23 } = m;
  let [c1, c2, c3] = [v1, v2, v3];
  for (let round = 0; round < 30 && a12 * a12 + a13 * a13 + a23 * a23 > 0; round += 1) {
    const one = jacobi(a11, a22, a12);
    [a11, a22, a12] = [a11 - one.t * a12, a22 + one.t * a12, 0];
    [a13, a23] = [one.c * a13 - one.s * a23, one.s * a13 + one.c * a23];
    [c1, c2] = [one.c * c1 - one.s * c2, one.s * c1 + one.c * c2];
    const two = jacobi(a11, a33, a13);
    [a11, a33, a13] = [a11 - two.t * a13, a33 + two.t * a13, 0];
    [a12, a23] = [two.c * a12 - two.s * a23, two.s * a12 + two.c * a23];
    [c1, c3] = [two.c * c1 - two.s * c3, two.s * c1 + two.c * c3];
    const three = jacobi(a22, a33, a23);
    [a22, a33, a23] = [a22 - three.t * a23, a33 + three.t * a23, 0];
    [a12, a13] = [three.c * a12 - three.s * a13, three.s * a12 + three.c * a13];
    [c2, c3] = [three.c * c2 - three.s * c3, three.s * c2 + three.c * c3];
  }
  return {
    variances: [Math.max(0, a11), Math.max(0, a22), Math.max(0, a33)],
    centre: [c1, c2, c3],
  };
}

// The smaller turn that makes `off` 0 (Golub, Van Loan, Matrix Computations, 8.5.2).
function jacobi(one: number, other: number, off: number): { t: number; c: number; s: number } {
  if (off === 0) return { t: 0, c: 1, s: 0 };
  const tau = (other - one) / (2 * off);
  const t = (tau >= 0 ? 1 : -1) / (Math.abs(tau) + Math.sqrt(1 + tau * tau));
  const c = 1 / Math.sqrt(1 + t * t);
  return { t, c, s: t * c };
}
