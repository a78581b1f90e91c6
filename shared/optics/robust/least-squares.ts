import { normalEquations, symmetricEigen } from './small-matrix';

/** A list of residuals with its derivatives (row by row) at some angles. */
export interface Residuals {
  readonly rows: number;
  readonly value: Float64Array;
  readonly jacobian: Float64Array;
}

/** Fills and returns its own buffers: what it returned before is overwritten. */
export type ResidualFunction = (angles: Float64Array) => Residuals;

export interface Minimum {
  readonly angles: Float64Array;
  /** Sum of the squares. */
  readonly squares: number;
}

const LONGEST_STEP = 0.5;
const GIVE_UP_DAMPING = 1e12;

function sumOfSquares({ rows, value }: Residuals): number {
  let sum = 0;
  for (let r = 0; r < rows; r += 1) sum += (value[r] ?? 0) * (value[r] ?? 0);
  return sum;
}

/**
 * Levenberg–Marquardt with the normal matrix taken apart, so that directions in which nothing changes stay put.
 * @param settled a sum of squares that need not be improved on.
 */
export function levenbergMarquardt(
  residuals: ResidualFunction,
  start: Float64Array,
  { steps, settled }: { readonly steps: number; readonly settled: number },
): Minimum {
  const n = start.length;
  let angles = Float64Array.from(start);
  let now = residuals(angles);
  let squares = sumOfSquares(now);
  let damping = 1e-3;
  for (let step = 0; step < steps && squares > settled && damping < GIVE_UP_DAMPING; step += 1) {
    const { matrix, vector } = normalEquations(now.jacobian, now.value, now.rows, n);
    const { values, vectors } = symmetricEigen(matrix, n);
    const scale = Math.max(...values, 1e-30);
    let gained = 0;
    while (damping < GIVE_UP_DAMPING) {
      const tried = Float64Array.from(angles);
      for (let k = 0; k < n; k += 1) {
        let along = 0;
        for (let i = 0; i < n; i += 1) along += (vectors[i * n + k] ?? 0) * (vector[i] ?? 0);
        const stiffness = Math.max(values[k] ?? 0, 0) + damping * scale;
        const move = clamp(-along / stiffness);
        for (let i = 0; i < n; i += 1) tried[i] = (tried[i] ?? 0) + move * (vectors[i * n + k] ?? 0);
      }
      const then = sumOfSquares(residuals(tried));
      if (then < squares) {
        gained = squares - then;
        angles = tried;
        squares = then;
        damping = Math.max(damping / 10, 1e-15);
        break;
      }
      damping *= 8;
    }
    now = residuals(angles);
    if (gained <= 1e-15 * squares) break;
  }
  return { angles, squares };
}

function clamp(step: number): number {
  return Math.max(-LONGEST_STEP, Math.min(LONGEST_STEP, step));
}

/** Eigenvalues of CᵀC below this share of the largest (or this itself) are directions that the constraints leave free. */
const FREE = 1e-10;
/** Constraints of order 1 are met when their squares sum to less than this. */
export const MET = 1e-24;

/** The directions in which the constraints don't change, as unit vectors. */
export function freeDirections(constraints: Residuals, n: number): readonly Float64Array[] {
  const { matrix } = normalEquations(constraints.jacobian, constraints.value, constraints.rows, n);
  const { values, vectors } = symmetricEigen(matrix, n);
  const limit = FREE * Math.max(1, ...values);
  return Array.from(values).flatMap((value, k) =>
    value > limit ? [] : [Float64Array.from({ length: n }, (_, i) => vectors[i * n + k] ?? 0)],
  );
}

/** Back onto the constraints by shortest Newton steps; null where they can't be met near by. */
export function projected(constraints: ResidualFunction, start: Float64Array): Float64Array | null {
  const n = start.length;
  const angles = Float64Array.from(start);
  for (let step = 0; step < 12; step += 1) {
    const now = constraints(angles);
    if (sumOfSquares(now) < MET) return angles;
    const { matrix, vector } = normalEquations(now.jacobian, now.value, now.rows, n);
    const { values, vectors } = symmetricEigen(matrix, n);
    const limit = FREE * Math.max(1, ...values);
    for (let k = 0; k < n; k += 1) {
      const value = values[k] ?? 0;
      if (value <= limit) continue;
      let along = 0;
      for (let i = 0; i < n; i += 1) along += (vectors[i * n + k] ?? 0) * (vector[i] ?? 0);
      const move = clamp(-along / value);
      for (let i = 0; i < n; i += 1) angles[i] = (angles[i] ?? 0) + move * (vectors[i * n + k] ?? 0);
    }
  }
  return null;
}

/**
 * The least sum of squares of `objective` among angles that meet `constraints`, from a point that meets them: steps of
 * Levenberg–Marquardt within the free directions, each followed by a projection.
 */
export function leastWithin(
  objective: ResidualFunction,
  constraints: ResidualFunction,
  start: Float64Array,
  steps: number,
): Minimum {
  const n = start.length;
  let angles = start;
  let squares = sumOfSquares(objective(angles));
  let damping = 1e-3;
  for (let step = 0; step < steps && damping < GIVE_UP_DAMPING; step += 1) {
    const free = freeDirections(constraints(angles), n);
    if (free.length === 0) break;
    const { value, jacobian, rows } = objective(angles);
    const d = free.length;
    const along = new Float64Array(rows * d);
    for (let r = 0; r < rows; r += 1) {
      free.forEach((direction, k) => {
        let sum = 0;
        for (let i = 0; i < n; i += 1) sum += (jacobian[r * n + i] ?? 0) * (direction[i] ?? 0);
        along[r * d + k] = sum;
      });
    }
    const { matrix, vector } = normalEquations(along, value, rows, d);
    const { values, vectors } = symmetricEigen(matrix, d);
    const scale = Math.max(...values, 1e-30);
    let gained = 0;
    while (damping < GIVE_UP_DAMPING) {
      const tried = Float64Array.from(angles);
      for (let k = 0; k < d; k += 1) {
        let slope = 0;
        for (let i = 0; i < d; i += 1) slope += (vectors[i * d + k] ?? 0) * (vector[i] ?? 0);
        const move = clamp(-slope / (Math.max(values[k] ?? 0, 0) + damping * scale));
        free.forEach((direction, i) => {
          const part = move * (vectors[i * d + k] ?? 0);
          for (let j = 0; j < n; j += 1) tried[j] = (tried[j] ?? 0) + part * (direction[j] ?? 0);
        });
      }
      const back = projected(constraints, tried);
      const then = back === null ? Infinity : sumOfSquares(objective(back));
      if (back !== null && then < squares) {
        gained = squares - then;
        angles = back;
        squares = then;
        damping = Math.max(damping / 10, 1e-15);
        break;
      }
      damping *= 8;
    }
    if (gained <= 1e-14 * squares) break;
  }
  return { angles, squares };
}
