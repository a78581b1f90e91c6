import { solveDamped } from '../solver/symmetric-matrix';
import { invertPositive } from './linear-squares';
import type { Stated } from './scan-rows';

/*
 * All models of a scan are a few basis functions whose coefficients depend on a few physical parameters. The weighted sum
 * of squares over the rows is then exactly the linear fit's plus (c(p) − ĉ)ᵀ N (c(p) − ĉ), N the linear fit's normal
 * matrix: ten thousand rows are gone through once, and fits, profiles and searches run on a dozen numbers.
 */

export interface CoefficientModel {
  /** Number of coefficients. */
  readonly size: number;
  /** Writes the coefficients at `parameters`, and their derivatives (a row for each coefficient). */
  readonly evaluate: (parameters: Float64Array, coefficients: Float64Array, jacobian: Float64Array) => void;
}

export interface CoefficientProblem {
  readonly model: CoefficientModel;
  readonly target: Float64Array;
  readonly normal: Float64Array;
  /** What is known of each parameter beforehand; a σ of 0 holds it, null leaves it free. */
  readonly known: readonly (Stated | null)[];
}

export interface CoefficientFit {
  readonly parameters: Float64Array;
  /** χ² beyond that of the linear fit, what was known beforehand included. */
  readonly excess: number;
  /** Half the second derivatives of χ² (Gauss and Newton's), held parameters as 0. */
  readonly information: Float64Array;
  readonly isFree: readonly boolean[];
}

const MOST_STEPS = 200;
const MOST_DAMPING = 1e14;
/** A step shorter than this many σ ends the search. */
const SHORTEST_STEP = 1e-10;
/** Of a parameter, all of which are of order 1 or relative to themselves. */
const LONGEST_STEP = 0.5;

interface Point {
  readonly excess: number;
  readonly slope: Float64Array;
  readonly information: Float64Array;
}

function pointAt(problem: CoefficientProblem, parameters: Float64Array): Point {
  const { model, target, normal, known } = problem;
  const [m, n] = [model.size, parameters.length];
  const off = new Float64Array(m);
  const jacobian = new Float64Array(m * n);
  model.evaluate(parameters, off, jacobian);
  for (let i = 0; i < m; i += 1) off[i] = (off[i] ?? 0) - (target[i] ?? 0);
  // Rows of N J and N off first: far fewer products than term by term.
  const slope = new Float64Array(n);
  const information = new Float64Array(n * n);
  const weighted = new Float64Array(n);
  let excess = 0;
  for (let i = 0; i < m; i += 1) {
    weighted.fill(0);
    let pull = 0;
    for (let j = 0; j < m; j += 1) {
      const weight = normal[i * m + j] ?? 0;
      pull += weight * (off[j] ?? 0);
      for (let p = 0; p < n; p += 1) weighted[p] = (weighted[p] ?? 0) + weight * (jacobian[j * n + p] ?? 0);
    }
    excess += pull * (off[i] ?? 0);
    for (let p = 0; p < n; p += 1) {
      const left = jacobian[i * n + p] ?? 0;
      if (left === 0) continue;
      slope[p] = (slope[p] ?? 0) + left * pull;
      for (let q = 0; q < n; q += 1)
        information[p * n + q] = (information[p * n + q] ?? 0) + left * (weighted[q] ?? 0);
    }
  }
  known.forEach((stated, p) => {
    if (stated === null || stated.sigma === 0) return;
    const away = ((parameters[p] ?? 0) - stated.value) / stated.sigma;
    excess += away * away;
    slope[p] = (slope[p] ?? 0) + away / stated.sigma;
    information[p * n + p] = (information[p * n + p] ?? 0) + 1 / (stated.sigma * stated.sigma);
  });
  return { excess, slope, information };
}

/** Levenberg's and Marquardt's search. A parameter that is known exactly starts at what is known and stays there. */
export function fitCoefficients(problem: CoefficientProblem, start: Float64Array): CoefficientFit {
  const n = start.length;
  const isFree = problem.known.map((stated) => stated?.sigma !== 0);
  const free = isFree.flatMap((is, p) => (is ? [p] : []));
  let parameters = Float64Array.from(start, (value, p) => {
    const stated = problem.known[p] ?? null;
    return stated?.sigma === 0 ? stated.value : value;
  });
  let now = pointAt(problem, parameters);
  let damping = 1e-3;
  for (let step = 0; step < MOST_STEPS && damping < MOST_DAMPING; step += 1) {
    // In units of each parameter's own σ, so that radians, shares and powers weigh alike.
    const units = free.map((p) => {
      const known = now.information[p * n + p] ?? 0;
      return known > 0 ? 1 / Math.sqrt(known) : 0;
    });
    const scaled = free.map((p, i) =>
      free.map((q, j) => (now.information[p * n + q] ?? 0) * (units[i] ?? 0) * (units[j] ?? 0)),
    );
    const right = free.map((p, i) => -(now.slope[p] ?? 0) * (units[i] ?? 0));
    const move = solveDamped(scaled, damping, right);
    if (move === null) {
      damping = Math.max(damping, 1e-12) * 10;
      continue;
    }
    const tried = Float64Array.from(parameters);
    // Where a direction hardly matters its step would leave every angle's range: the whole step is shortened then.
    const share = free.reduce((least, p, i) => {
      const longest = LONGEST_STEP * Math.max(1, Math.abs(parameters[p] ?? 0));
      return Math.min(least, longest / Math.abs((move[i] ?? 0) * (units[i] ?? 0)));
    }, 1);
    free.forEach((p, i) => (tried[p] = (tried[p] ?? 0) + share * (move[i] ?? 0) * (units[i] ?? 0)));
    const then = pointAt(problem, tried);
    const length = share * Math.sqrt(move.reduce((sum, along) => sum + along * along, 0));
    if (then.excess <= now.excess) {
      parameters = tried;
      now = then;
      damping /= 10;
    } else damping *= 8;
    if (length < SHORTEST_STEP) break;
  }
  const information = now.information.map((value, k) =>
    isFree[Math.floor(k / n)] === true && isFree[k % n] === true ? value : 0,
  );
  return { parameters, excess: now.excess, information, isFree };
}

/** Covariance of the parameters, rows first, 0 for held ones; null where a direction is left open. */
export function parameterCovariance({ information, isFree }: CoefficientFit): Float64Array | null {
  const n = isFree.length;
  const free = isFree.flatMap((is, p) => (is ? [p] : []));
  const size = free.length;
  const inner = Float64Array.from({ length: size * size }, (_, k) => {
    const [p, q] = [free[Math.floor(k / size)] ?? 0, free[k % size] ?? 0];
    return information[p * n + q] ?? 0;
  });
  const inverse = invertPositive(inner, size);
  if (inverse === null) return null;
  const covariance = new Float64Array(n * n);
  free.forEach((p, i) => free.forEach((q, j) => (covariance[p * n + q] = inverse[i * size + j] ?? 0)));
  return covariance;
}
