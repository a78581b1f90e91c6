import { seededStream } from '../shared/optics/uniform-stream';
import { prepare, type PrepareProblem } from '../shared/optics/solver/prepare';
import { retardStokes } from '../shared/optics/retarder';
import type { Stokes } from '../shared/optics/stokes';
import { radians, type Radians } from '../shared/optics/units';

const DEGREE = Math.PI / 180;

/** A problem whose plates are two. */
export interface TwoPlateProblem extends PrepareProblem {
  readonly retardancesRad: readonly [Radians, Radians];
}

export function problems(count: number): readonly TwoPlateProblem[] {
  const random = seededStream(5);
  return Array.from({ length: count }, () => {
    const s3 = 1.9 * random() - 0.95;
    const azimuth = 2 * Math.PI * random();
    const linear = Math.sqrt(1 - s3 * s3);
    const target: Stokes = [linear * Math.cos(azimuth), linear * Math.sin(azimuth), s3];
    const half = radians((178 + 4 * random()) * DEGREE);
    const quarter = radians((88 + 4 * random()) * DEGREE);
    return { input: [1, 0, 0], target, retardancesRad: random() < 0.5 ? [half, quarter] : [quarter, half] };
  });
}

/** One forward evaluation: both plates at some angles, from angles in radians to the Stokes vector behind them. */
export function forward(
  { input, retardancesRad: [first, second] }: TwoPlateProblem,
  a: Radians,
  b: Radians,
): Stokes {
  return retardStokes(
    { retardanceRad: second, fastAxisRad: b },
    retardStokes({ retardanceRad: first, fastAxisRad: a }, input),
  );
}

/** All settings by least squares from many starts, the way it is done without an elimination. Returns their number. */
export function multiStart(problem: TwoPlateProblem, starts: number): number {
  const random = seededStream(9);
  const found: (readonly [number, number])[] = [];
  for (let start = 0; start < starts; start += 1) {
    const end = leastSquares(problem, Math.PI * random(), Math.PI * random());
    if (end !== null && !found.some((other) => same(other[0], end[0]) && same(other[1], end[1])))
      found.push(end);
  }
  return found.length;
}

function same(one: number, other: number): boolean {
  const apart = Math.abs(one - other) % Math.PI;
  return Math.min(apart, Math.PI - apart) < 1e-5;
}

// Levenberg–Marquardt with a Jacobian by differences; null where it stops short of the target.
function leastSquares(problem: TwoPlateProblem, a0: number, b0: number): readonly [number, number] | null {
  const { target } = problem;
  const residual = (a: number, b: number): Stokes => {
    const [s1, s2, s3] = forward(problem, radians(a), radians(b));
    return [s1 - target[0], s2 - target[1], s3 - target[2]];
  };
  const dot = (x: Stokes, y: Stokes): number => x[0] * y[0] + x[1] * y[1] + x[2] * y[2];
  const h = 1e-7;
  let [a, b, damping] = [a0, b0, 1e-3];
  let r = residual(a, b);
  for (let step = 0; step < 60; step += 1) {
    const cost = dot(r, r);
    if (cost < 1e-24) return [a, b];
    const [ra, rb] = [residual(a + h, b), residual(a, b + h)];
    const ja: Stokes = [(ra[0] - r[0]) / h, (ra[1] - r[1]) / h, (ra[2] - r[2]) / h];
    const jb: Stokes = [(rb[0] - r[0]) / h, (rb[1] - r[1]) / h, (rb[2] - r[2]) / h];
    const [aa, ab, bb] = [dot(ja, ja) * (1 + damping), dot(ja, jb), dot(jb, jb) * (1 + damping)];
    const [ga, gb] = [dot(ja, r), dot(jb, r)];
    const det = aa * bb - ab * ab;
    const [na, nb] = [a - (bb * ga - ab * gb) / det, b - (aa * gb - ab * ga) / det];
    const next = residual(na, nb);
    if (dot(next, next) < cost) {
      [a, b, r] = [na, nb, next];
      damping /= 10;
    } else damping *= 10;
  }
  return null;
}

export function solveAll(list: readonly TwoPlateProblem[]): number {
  return list.reduce((sum, problem) => sum + prepare(problem).solutions.length, 0);
}
