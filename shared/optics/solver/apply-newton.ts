import { type Quaternion, compose, IDENTITY, rotate } from '../quaternion';
import type { Bloch } from '../stokes';
import { type Candidate, candidateAt, type Half, leftOver, missOf, stackAt } from './apply-stack';
import { solveDamped, type SymmetricMatrix } from './symmetric-matrix';
import type { CirclePoint } from './trig-quadratic';
import { turned } from './turned';

/**
 * How a stack's turn changes with u = 2θ of each plate: ∂Q/∂u = ω Q, with ω = S(S ŷ + C n⊥) carried through the plates
 * behind it, n the plate's axis and n⊥ = ∂n/∂u.
 */
interface Rates {
  readonly omega: readonly Bloch[];
  /** C S n, carried likewise: ∂²Q/∂u² = (−S² − C S n) Q. */
  readonly bend: readonly Bloch[];
}

function ratesAt(halves: readonly Half[], points: readonly CirclePoint[]): Rates {
  const omega: Bloch[] = [];
  const bend: Bloch[] = [];
  let behind = IDENTITY;
  for (let k = halves.length - 1; k >= 0; k -= 1) {
    const plate = halves[k];
    const point = points[k];
    if (plate === undefined || point === undefined) throw new RangeError('an angle is needed for each plate');
    const across = plate.sin * plate.cos;
    omega[k] = rotate(behind, [across * point.cos, plate.sin * plate.sin, -across * point.sin]);
    bend[k] = rotate(behind, [across * point.sin, 0, across * point.cos]);
    behind = compose(behind, stackAt([plate], [point]));
  }
  return { omega, bend };
}

function dot(a: Bloch, b: Bloch): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

function triple(a: Bloch, b: Bloch, c: Bloch): number {
  return (
    (a[1] * b[2] - a[2] * b[1]) * c[0] +
    (a[2] * b[0] - a[0] * b[2]) * c[1] +
    (a[0] * b[1] - a[1] * b[0]) * c[2]
  );
}

const STILL: Bloch = [0, 0, 0];

// A residual of rounding: a further step only moves the last bit.
const ROUNDING = 4e-30;

/**
 * Gauss–Newton on the vector part of achieved · wanted⁻¹, in the angles of all plates; the best point met. The damping
 * only matters where two solutions meet or a family runs through: there it takes the shortest step. The plates `held` stay
 * where they are.
 */
export function polish(
  halves: readonly Half[],
  start: readonly CirclePoint[],
  target: Quaternion,
  held: readonly number[] = [],
): Candidate {
  let points = start;
  let best = candidateAt(halves, points, target);
  for (let step = 0; step < 24 && best.miss > ROUNDING; step += 1) {
    const { x, y, z } = leftOver(halves, points, target);
    const { omega } = ratesAt(halves, points);
    const move = shortestStep(
      held.length === 0 ? omega : omega.map((rate, k) => (held.includes(k) ? STILL : rate)),
      [-x, -y, -z],
    );
    if (move === null) return best;
    points = points.map((point, k) => turned(point, move[k] ?? 0));
    const next = candidateAt(halves, points, target);
    if (next.miss >= best.miss) return best;
    best = next;
  }
  return best;
}

// Cramer's rule where three rates span the space well.
const SPANS = 1e-3;

function shortestStep(omega: readonly Bloch[], by: Bloch): readonly number[] | null {
  const [first, second, third] = omega;
  if (omega.length === 3 && first !== undefined && second !== undefined && third !== undefined) {
    const volume = triple(first, second, third);
    if (Math.abs(volume) > SPANS) {
      const parts = [triple(by, second, third), triple(first, by, third), triple(first, second, by)];
      return parts.map((part) => part / volume);
    }
  }
  // Damped by the square of the miss, Gauss–Newton stays quadratic where the rates hardly span.
  const rows = omega.map((row) => omega.map((column) => dot(row, column)));
  const right = omega.map((rate) => dot(rate, by));
  const size = omega.reduce((sum, rate) => sum + dot(rate, rate), 0) + 1e-300;
  const damping = size * (Math.min(1e-13, dot(by, by)) + 3e-16);
  return solveDamped(rows, damping, right) ?? solveDamped(rows, 1e-13 * size, right);
}

/** The scalar part f = cos(ε/2) ≥ 0 at a point, its gradient and the negative of its Hessian in the u of each plate. */
interface Shape {
  readonly gradient: readonly number[];
  readonly curvature: SymmetricMatrix;
}

function shapeAt(
  halves: readonly Half[],
  points: readonly CirclePoint[],
  target: Quaternion,
  held: readonly number[],
): Shape {
  const { w, x, y, z } = leftOver(halves, points, target);
  const e: Bloch = [x, y, z];
  const { omega, bend } = ratesAt(halves, points);
  const isHeld = omega.map((_, k) => held.includes(k));
  const gradient = omega.map((rate, k) => (isHeld[k] === true ? 0 : -dot(rate, e)));
  const curvature = omega.map((row, k) =>
    omega.map((column, l) => {
      // A held plate gets a curvature of its own and no slope: it takes no step.
      if (isHeld[k] === true || isHeld[l] === true) return k === l ? 1 : 0;
      if (k === l) {
        const sin = halves[k]?.sin ?? 0;
        return sin * sin * w - dot(bend[k] ?? STILL, e);
      }
      // The plate further along the beam stands on the left: scalar part of ω_later ω_earlier E.
      return dot(row, column) * w + (k > l ? triple(row, column, e) : triple(column, row, e));
    }),
  );
  return { gradient, curvature };
}

/** The negative of the Hessian of cos(ε/2) by the u of each plate, rows first. */
export function curvatureAt(
  halves: readonly Half[],
  points: readonly CirclePoint[],
  target: Quaternion,
): SymmetricMatrix {
  return shapeAt(halves, points, target, []).curvature;
}

const LONGEST_CLIMB = 80;

/**
 * Uphill on cos(ε/2) to a local optimum: Newton with the exact Hessian, its diagonal raised until it is a step uphill.
 * Null where the point it stops at is no maximum (a saddle). The plates `held` stay where they are.
 */
export function climb(
  halves: readonly Half[],
  start: readonly CirclePoint[],
  target: Quaternion,
  held: readonly number[] = [],
): Candidate | null {
  let best = candidateAt(halves, start, target);
  let damping = 0;
  for (let step = 0; step < LONGEST_CLIMB; step += 1) {
    const { gradient, curvature } = shapeAt(halves, best.points, target, held);
    const move = solveDamped(curvature, damping + 1e-14, gradient);
    if (move === null) {
      damping = Math.max(1e-3, 4 * damping);
      continue;
    }
    const points = best.points.map((point, k) => turned(point, move[k] ?? 0));
    const miss = missOf(leftOver(halves, points, target));
    const longest = Math.max(...move.map(Math.abs));
    if (miss <= best.miss) {
      best = { points, miss };
      damping = damping < 1e-6 ? 0 : damping / 8;
      if (longest < 1e-13) break;
    } else {
      if (longest < 1e-8) break;
      damping = Math.max(1e-3, 4 * damping);
    }
  }
  const { curvature } = shapeAt(halves, best.points, target, held);
  const level = curvature.map(() => 0);
  return solveDamped(curvature, 1e-7, level) === null ? null : best;
}
