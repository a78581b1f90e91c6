import { type Matrix, product, stack } from './independent';

/*
 * A unitary by plates, searched for from many starts with differences for derivatives: slow, and no line shared with the
 * solver that it judges.
 */

export interface UnitaryProblem {
  readonly target: Matrix;
  readonly retardancesRad: readonly number[];
}

export interface FoundUnitary {
  readonly fastAxesRad: readonly number[];
  /** sin²(ε/2). */
  readonly miss: number;
}

/** ⟨unit quaternion⟩ of a matrix of determinant 1: w·1 − i(xσx + yσy + zσz). */
export function matrixOf(w: number, x: number, y: number, z: number): Matrix {
  return [
    [
      { re: w, im: -z },
      { re: -y, im: -x },
    ],
    [
      { re: y, im: -x },
      { re: w, im: z },
    ],
  ];
}

function dagger([[a, b], [c, d]]: Matrix): Matrix {
  return [
    [
      { re: a.re, im: -a.im },
      { re: c.re, im: -c.im },
    ],
    [
      { re: b.re, im: -b.im },
      { re: d.re, im: -d.im },
    ],
  ];
}

/** The vector part of achieved · wanted†, with the sign of the wanted one that is nearer: three numbers, all 0 when made. */
function residual({ target, retardancesRad }: UnitaryProblem, angles: readonly number[]): readonly number[] {
  const [[a, b], [c, d]] = product(stack(retardancesRad, angles), dagger(target));
  const sign = a.re + d.re < 0 ? -1 : 1;
  return [(-sign * (b.im + c.im)) / 2, (sign * (c.re - b.re)) / 2, (sign * (d.im - a.im)) / 2];
}

/** sin²(ε/2) between a stack and its target, up to a global phase of the target as well. */
export function unitaryMiss(problem: UnitaryProblem, angles: readonly number[]): number {
  return residual(problem, angles).reduce((sum, part) => sum + part * part, 0);
}

/** The largest entry of U − V for matrices that should be equal including their sign. */
export function entryDistance(one: Matrix, other: Matrix): number {
  let largest = 0;
  for (const row of [0, 1] as const)
    for (const column of [0, 1] as const) {
      const [p, q] = [one[row][column], other[row][column]];
      largest = Math.max(largest, Math.hypot(p.re - q.re, p.im - q.im));
    }
  return largest;
}

function wrapped(angle: number): number {
  return ((angle % Math.PI) + Math.PI) % Math.PI;
}

/** Levenberg–Marquardt to a minimum of sin²(ε/2). */
function descend(problem: UnitaryProblem, start: readonly number[], steps: number): FoundUnitary {
  let angles = [...start];
  let r = residual(problem, angles);
  let cost = r.reduce((sum, part) => sum + part * part, 0);
  let damping = 1e-3;
  const h = 1e-6;
  for (let step = 0; step < steps && cost > 1e-27; step += 1) {
    const jacobian = angles.map((_, k) => {
      const moved = (by: number): readonly number[] =>
        residual(
          problem,
          angles.map((angle, l) => (l === k ? angle + by : angle)),
        );
      const [ahead, behind] = [moved(h), moved(-h)];
      return ahead.map((value, part) => (value - (behind[part] ?? 0)) / (2 * h));
    });
    const inner = (p: readonly number[], q: readonly number[]): number =>
      p.reduce((sum, value, k) => sum + value * (q[k] ?? 0), 0);
    const matrix = jacobian.map((p, k) => jacobian.map((q, l) => inner(p, q) * (k === l ? 1 + damping : 1)));
    const move = gauss(
      matrix.map((row, k) => row.map((value, l) => (k === l ? value + 1e-14 : value))),
      jacobian.map((p) => -inner(p, r)),
    );
    const next = angles.map((angle, k) => angle + Math.max(-0.4, Math.min(0.4, move[k] ?? 0)));
    const nextR = residual(problem, next);
    const nextCost = nextR.reduce((sum, part) => sum + part * part, 0);
    if (nextCost < cost) {
      const gained = cost - nextCost;
      [angles, r, cost] = [next, nextR, nextCost];
      damping /= 10;
      if (gained < 1e-15 * cost) break;
    } else {
      damping *= 10;
      if (damping > 1e8) break;
    }
  }
  return { fastAxesRad: angles.map(wrapped), miss: cost };
}

function gauss(matrix: readonly (readonly number[])[], right: readonly number[]): readonly number[] {
  const rows = matrix.map((row, k) => [...row, right[k] ?? 0]);
  const size = rows.length;
  for (let k = 0; k < size; k += 1) {
    const order = rows.slice(k).sort((p, q) => Math.abs(q[k] ?? 0) - Math.abs(p[k] ?? 0));
    rows.splice(k, size - k, ...order);
    const pivot = rows[k];
    if (pivot === undefined) return right;
    for (let i = 0; i < size; i += 1) {
      const row = rows[i];
      if (i === k || row === undefined) continue;
      const share = (row[k] ?? 0) / (pivot[k] ?? 1);
      rows[i] = row.map((value, l) => value - share * (pivot[l] ?? 0));
    }
  }
  return rows.map((row, k) => (row[size] ?? 0) / (row[k] ?? 1));
}

function apart(one: readonly number[], other: readonly number[]): number {
  return Math.max(
    ...one.map((angle, k) => {
      const difference = wrapped(angle - (other[k] ?? NaN));
      return Math.min(difference, Math.PI - difference);
    }),
  );
}

export function isAmong(
  list: readonly { readonly fastAxesRad: readonly number[] }[],
  angles: readonly number[],
  closerThan: number,
): boolean {
  return list.some((known) => apart(known.fastAxesRad, angles) < closerThan);
}

function gridOfStarts(plates: number, side: number): readonly (readonly number[])[] {
  return Array.from({ length: side ** plates }, (_, index) =>
    Array.from(
      { length: plates },
      (__, k) => (((Math.floor(index / side ** k) % side) + 0.31) * Math.PI) / side,
    ),
  );
}

/** Every setting with no miss that a grid of starts leads to. */
export function searchedZeros(problem: UnitaryProblem, side: number): readonly FoundUnitary[] {
  const found: FoundUnitary[] = [];
  for (const start of gridOfStarts(problem.retardancesRad.length, side)) {
    const end = descend(problem, start, 40);
    if (end.miss < 1e-22 && !isAmong(found, end.fastAxesRad, 1e-6)) found.push(end);
  }
  return found;
}

/** Every minimum of the miss that a grid of starts leads to: points from which no small step in any direction gains. */
export function searchedMinima(problem: UnitaryProblem, side: number): readonly FoundUnitary[] {
  const found: FoundUnitary[] = [];
  for (const start of gridOfStarts(problem.retardancesRad.length, side)) {
    const end = descend(problem, start, 300);
    if (isMinimum(problem, end) && !isAmong(found, end.fastAxesRad, 1e-3)) found.push(end);
  }
  return found;
}

/** Whether the miss is not smaller at any of the neighbours, in all sign patterns of steps by `by`. */
export function isMinimum(problem: UnitaryProblem, { fastAxesRad, miss }: FoundUnitary, by = 1e-4): boolean {
  const plates = fastAxesRad.length;
  for (let pattern = 0; pattern < 3 ** plates; pattern += 1) {
    const moved = fastAxesRad.map((angle, k) => angle + ((Math.floor(pattern / 3 ** k) % 3) - 1) * by);
    if (unitaryMiss(problem, moved) < miss - 1e-14) return false;
  }
  return true;
}

/** Haar: a direction in four dimensions, from a stream of numbers in [0, 1). */
export function randomUnitary(random: () => number): readonly [number, number, number, number] {
  const pair = (): readonly [number, number] => {
    const radius = Math.sqrt(-2 * Math.log(1 - random()));
    const angle = 2 * Math.PI * random();
    return [radius * Math.cos(angle), radius * Math.sin(angle)];
  };
  const [w, x] = pair();
  const [y, z] = pair();
  const length = Math.hypot(w, x, y, z);
  return [w / length, x / length, y / length, z / length];
}
