import { cos } from '../elementary';
import { wrap } from '../units';
import { type CoefficientFit, type CoefficientProblem, fitCoefficients } from './coefficient-fit';
import { quadratic } from './linear-squares';
import {
  type KnownInput,
  type LinearPrior,
  offPrior,
  priorSize,
  ROTATED_RETARDANCE,
  ROTATED_X0,
  rotatingShape,
  SHAPE,
} from './rotating-model';

/** A plate of the search: every physical plate is in 0 ≤ x0 < π, 0 ≤ δ ≤ π once. */
interface Spot {
  readonly x0: number;
  readonly retardance: number;
  readonly excess: number;
}

/** Part of that strip: half the plates are within π/4 of an axis and half within π/4 of the one across. */
export interface Strip {
  readonly fromX0: number;
  readonly width: number;
}

export type Landscape = (x0: number, retardanceRad: number) => number;

/** χ² beyond the linear fit as a function of axis and retardance, power and drift being linear and solved on the spot. */
export function landscapeOf(
  { target, normal }: CoefficientProblem,
  input: KnownInput,
  prior: LinearPrior | null,
  leak: number,
): Landscape {
  const n = SHAPE;
  const size = 2 * n + priorSize(prior);
  const shape = new Float64Array(n);
  const off = new Float64Array(size);
  // The blocks of steady with steady, steady with drifting, drifting with drifting, one behind another.
  const blocks = Float64Array.from({ length: 3 * n * n }, (_, k) => {
    const [block, i, j] = [Math.floor(k / (n * n)), Math.floor(k / n) % n, k % n];
    return normal[((block === 2 ? n : 0) + i) * size + (block === 0 ? 0 : n) + j] ?? 0;
  });
  const along = Float64Array.from({ length: 2 * n }, (_, i) => {
    let sum = 0;
    for (let j = 0; j < 2 * n; j += 1) sum += (normal[i * size + j] ?? 0) * (target[j] ?? 0);
    return sum;
  });
  return (x0, retardanceRad) => {
    rotatingShape(input, x0, retardanceRad, leak, shape, null);
    let aa = 0;
    let ab = 0;
    let bb = 0;
    let ra = 0;
    let rb = 0;
    for (let i = 0; i < n; i += 1) {
      const mi = shape[i] ?? 0;
      ra += mi * (along[i] ?? 0);
      rb += mi * (along[n + i] ?? 0);
      for (let j = 0; j < n; j += 1) {
        const product = mi * (shape[j] ?? 0);
        const k = i * n + j;
        aa += product * (blocks[k] ?? 0);
        ab += product * (blocks[n * n + k] ?? 0);
        bb += product * (blocks[2 * n * n + k] ?? 0);
      }
    }
    const determinant = aa * bb - ab * ab;
    const steady = (ra * bb - rb * ab) / determinant;
    const drifting = (rb * aa - ra * ab) / determinant;
    for (let i = 0; i < n; i += 1) {
      off[i] = steady * (shape[i] ?? 0) - (target[i] ?? 0);
      off[n + i] = drifting * (shape[i] ?? 0) - (target[n + i] ?? 0);
    }
    if (prior !== null) off[2 * n] = offPrior(x0, prior);
    if (prior?.modulation) off[2 * n + 1] = (1 - cos(retardanceRad)) / 2 - prior.modulation.value;
    return quadratic(normal, off);
  };
}

/** Harmonics up to 4x0 and one of δ: their valleys are several of these steps wide. */
const STEP_X0 = Math.PI / 36;
const STEP_RETARDANCE = Math.PI / 30;
const MOST_VALLEYS = 6;
const FINEST = 1e-6;

/** The valleys of a grid over the strip, deepest first. A valley at the strip's edge counts. */
export function valleys(landscape: Landscape, { fromX0, width }: Strip): readonly Spot[] {
  const columns = Math.round(width / STEP_X0) + 1;
  const rows = Math.round(Math.PI / STEP_RETARDANCE) + 1;
  const grid = Float64Array.from({ length: columns * rows }, (_, k) =>
    landscape(fromX0 + Math.floor(k / rows) * STEP_X0, (k % rows) * STEP_RETARDANCE),
  );
  const found: Spot[] = [];
  for (let i = 0; i < columns; i += 1) {
    for (let j = 0; j < rows; j += 1) {
      const excess = grid[i * rows + j] ?? 0;
      let isLowest = true;
      for (let k = Math.max(0, i - 1); k <= Math.min(columns - 1, i + 1); k += 1)
        for (let l = Math.max(0, j - 1); l <= Math.min(rows - 1, j + 1); l += 1)
          isLowest &&= excess <= (grid[k * rows + l] ?? 0);
      if (isLowest) found.push({ x0: fromX0 + i * STEP_X0, retardance: j * STEP_RETARDANCE, excess });
    }
  }
  return found.sort((a, b) => a.excess - b.excess).slice(0, MOST_VALLEYS);
}

/** Downhill within the strip by steps that halve where none leads down: the bottom may lie on the strip's edge. */
export function descend(landscape: Landscape, { fromX0, width }: Strip, start: Spot): Spot {
  let [now, stepX0, stepRetardance] = [start, STEP_X0 / 2, STEP_RETARDANCE / 2];
  while (stepX0 > FINEST) {
    let best = now;
    for (const [i, j] of [
      [1, 0],
      [-1, 0],
      [0, 1],
      [0, -1],
      [1, 1],
      [-1, -1],
      [1, -1],
      [-1, 1],
    ] as const) {
      const x0 = Math.min(fromX0 + width, Math.max(fromX0, now.x0 + i * stepX0));
      const retardance = Math.min(Math.PI, Math.max(0, now.retardance + j * stepRetardance));
      const excess = landscape(x0, retardance);
      if (excess < best.excess) best = { x0, retardance, excess };
    }
    if (best === now) [stepX0, stepRetardance] = [stepX0 / 2, stepRetardance / 2];
    now = best;
  }
  return now;
}

/** Power and drift that go with an axis and a retardance come out of the search itself: it starts at the mean power. */
export function polish(problem: CoefficientProblem, spot: Spot, leak: number): CoefficientFit {
  const mean = problem.target[0] ?? 1;
  return fitCoefficients(problem, Float64Array.of(spot.x0, spot.retardance, leak, 2 * mean, 0));
}

/** A fit named so that 0 ≤ x0 < π and 0 ≤ δ ≤ π: beyond half a wave the other axis is called fast. */
export function inStrip(fit: CoefficientFit): { readonly x0: number; readonly retardance: number } {
  const x0 = fit.parameters[ROTATED_X0] ?? 0;
  const retardance = wrap(fit.parameters[ROTATED_RETARDANCE] ?? 0, 2 * Math.PI);
  return retardance <= Math.PI
    ? { x0: wrap(x0, Math.PI), retardance }
    : { x0: wrap(x0 + Math.PI / 2, Math.PI), retardance: 2 * Math.PI - retardance };
}
