import { seededStream } from '../shared/optics/uniform-stream';
import { spawnSync } from 'node:child_process';
import path from 'node:path';
import { z } from 'zod';
import { compose, conjugate, type Quaternion } from '../shared/optics/quaternion';
import { retarderQuaternion } from '../shared/optics/retarder';
import { apply, type ApplyProblem } from '../shared/optics/solver/apply';
import { radians, type Radians } from '../shared/optics/units';

/** The brief's limit for all solutions of ideal plates, in forward evaluations of the same three plates. */
export const MOST_FORWARD_EVALUATIONS = 60;
/** The brief's least factor between multi-start least squares that finds the same set and the solver. */
export const LEAST_SCIPY_FACTOR = 1000;

export type Angles = readonly [Radians, Radians, Radians];

const DEGREE = Math.PI / 180;

function unitary(random: () => number): Quaternion {
  const pair = (): readonly [number, number] => {
    const radius = Math.sqrt(-2 * Math.log(1 - random()));
    const angle = 2 * Math.PI * random();
    return [radius * Math.cos(angle), radius * Math.sin(angle)];
  };
  const [w, x] = pair();
  const [y, z0] = pair();
  const length = Math.hypot(w, x, y, z0);
  return { w: w / length, x: x / length, y: y / length, z: z0 / length };
}

/** Random unitaries with two quarter- and one half-wave plate, the three orders in turn; calibrated ones are off by up to 2°. */
export function threePlateProblems(count: number, plates: 'ideal' | 'calibrated'): readonly ApplyProblem[] {
  const random = seededStream(plates === 'ideal' ? 5 : 6);
  const off = (): number => (plates === 'ideal' ? 0 : 4 * random() - 2);
  return Array.from({ length: count }, (_, k) => {
    const target = unitary(random);
    const nominal = [90, 90, 90].map((deg, plate) => (plate === k % 3 ? 180 : deg));
    return { target, retardancesRad: nominal.map((deg) => radians((deg + off()) * DEGREE)) };
  });
}

/** One forward evaluation: three plates from angles in radians to the unitary that they make. */
export function forwardThree({ retardancesRad }: ApplyProblem, [a, b, c]: Angles): Quaternion {
  const [first, second, third] = retardancesRad;
  if (first === undefined || second === undefined || third === undefined)
    throw new RangeError('three plates');
  return compose(
    retarderQuaternion({ retardanceRad: third, fastAxisRad: c }),
    compose(
      retarderQuaternion({ retardanceRad: second, fastAxisRad: b }),
      retarderQuaternion({ retardanceRad: first, fastAxisRad: a }),
    ),
  );
}

/** All settings of all problems; their number. */
export function solveThree(list: readonly ApplyProblem[]): number {
  return list.reduce((sum, problem) => sum + apply(problem).solutions.length, 0);
}

/** All settings by least squares from many starts, the way it is done without an elimination. Returns their number. */
export function multiStartThree(problem: ApplyProblem, starts: number): number {
  const random = seededStream(9);
  const found: Angles[] = [];
  for (let start = 0; start < starts; start += 1) {
    const angle = (): Radians => radians(Math.PI * random());
    const end = leastSquares(problem, [angle(), angle(), angle()]);
    if (end !== null && !found.some((other) => same(other, end))) found.push(end);
  }
  return found.length;
}

function same(one: Angles, other: Angles): boolean {
  return one.every((angle, plate) => {
    const apart = Math.abs(angle - (other[plate] ?? NaN)) % Math.PI;
    return Math.min(apart, Math.PI - apart) < 1e-5;
  });
}

type Three = readonly [number, number, number];

// Levenberg–Marquardt with a Jacobian by differences; null where it stops short of the target.
function leastSquares(problem: ApplyProblem, start: Angles): Angles | null {
  const back = conjugate(problem.target);
  const residual = (angles: Angles): Three => {
    const { x, y, z: along } = compose(forwardThree(problem, angles), back);
    return [x, y, along];
  };
  const dot = (p: Three, q: Three): number => p[0] * q[0] + p[1] * q[1] + p[2] * q[2];
  const h = 1e-7;
  let [angles, damping] = [start, 1e-3];
  let r = residual(angles);
  for (let step = 0; step < 60; step += 1) {
    const cost = dot(r, r);
    if (cost < 1e-24) return angles;
    const [a, b, c] = angles;
    const column = (moved: Angles): Three => {
      const next = residual(moved);
      return [(next[0] - r[0]) / h, (next[1] - r[1]) / h, (next[2] - r[2]) / h];
    };
    const p = column([radians(a + h), b, c]);
    const q = column([a, radians(b + h), c]);
    const s = column([a, b, radians(c + h)]);
    const [pp, qq, ss] = [p, q, s].map((each) => dot(each, each) * (1 + damping));
    const move = solveSymmetric(
      [pp ?? 0, qq ?? 0, ss ?? 0],
      [dot(p, q), dot(p, s), dot(q, s)],
      [-dot(p, r), -dot(q, r), -dot(s, r)],
    );
    const next: Angles = [radians(a + move[0]), radians(b + move[1]), radians(c + move[2])];
    const nextR = residual(next);
    if (dot(nextR, nextR) < cost) {
      [angles, r] = [next, nextR];
      damping /= 10;
    } else damping *= 10;
  }
  return null;
}

// Cramer's rule, the matrix by its diagonal and its (01, 02, 12) entries.
function solveSymmetric([a, b, c]: Three, [d, e, f]: Three, [u, v, w]: Three): Three {
  const [m0, m1, m2] = [b * c - f * f, e * f - d * c, d * f - b * e];
  const det = a * m0 + d * m1 + e * m2;
  return [
    (m0 * u + m1 * v + m2 * w) / det,
    (m1 * u + (a * c - e * e) * v + (d * e - a * f) * w) / det,
    (m2 * u + (d * e - a * f) * v + (a * b - d * d) * w) / det,
  ];
}

const scipyAnswer = z.object({
  secondsEach: z.number(),
  startsEach: z.number(),
  complete: z.number().int(),
});
export type ScipyAnswer = z.infer<typeof scipyAnswer>;

/**
 * The same problems by scipy.optimize.least_squares from seeded random starts, each stopped as soon as it has every setting
 * that the solver found. Null where there is no python3 with scipy.
 */
export function scipyThree(list: readonly ApplyProblem[]): ScipyAnswer | null {
  if (spawnSync('python3', ['-c', 'import scipy.optimize']).status !== 0) return null;
  const problems = list.map((problem) => ({
    ...problem,
    settings: apply(problem).solutions.map(({ fastAxesRad }) => fastAxesRad),
  }));
  const script = path.join(import.meta.dirname, 'scipy-three-plates.py');
  const { status, stdout, stderr } = spawnSync('python3', [script], {
    input: JSON.stringify(problems),
    encoding: 'utf8',
  });
  if (status !== 0) throw new Error(`scipy-three-plates.py failed: ${stderr}`);
  return scipyAnswer.parse(JSON.parse(stdout));
}
