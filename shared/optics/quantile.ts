import type { SpaceSpread } from './budget-spread';
import { exp, log, sincosInto } from './elementary';

/*
 * Distribution of Q = Σ (c_j + σ_j z_j)² with z standard normal, from its Laplace transform
 *   M(p) = E[e^{−pQ}] = Π (1 + 2σ_j² p)^{−1/2} exp(−c_j² p / (1 + 2σ_j² p)),
 * whose singularities all lie on the negative real axis. P(Q ≤ x) = (1/2πi) ∫ M(p) e^{px} dp/p along any path that passes
 * them on the right. The path here is the parabola that leaves the saddle point of the integrand in its direction of
 * steepest descent, where even steps converge geometrically: the numeric inversion of Imhof (Biometrika 48, 419 (1961))
 * and Davies (Appl. Statist. 29, 323 (1980)), on the contour of Rice (SIAM J. Sci. Stat. Comput. 1, 438 (1980)).
 */

/** In the saddle's own width. What scipy gives is met within 1e-11 (tests/optics/budget-quantile.test.ts). */
const STEP = 0.2;
const MOST_STEPS = 4000;
const MOST_PATHS = 12;

/**
 * The value that Q stays below with the given probability. Deterministic.
 * @throws RangeError for a probability outside (0, 1).
 */
export function quadraticFormQuantile(spread: SpaceSpread, probability: number): number {
  if (!(probability > 0 && probability < 1)) throw new RangeError('a probability lies between 0 and 1');
  const { floor, axes } = uncertainAxes(spread);
  if (axes.length === 0) return floor;
  const mean = meanOf(axes);
  const deviation = Math.sqrt(axes.reduce((sum, axis) => sum + varianceOfSquare(axis), 0));
  // Cantelli's inequality encloses the quantile; a logistic curve's quantile is a fair first guess.
  const odds = probability / (1 - probability);
  let low = Math.max(0, mean - deviation / Math.sqrt(odds));
  let high = mean + deviation * Math.sqrt(odds);
  let x = Math.max(mean + (deviation * log(odds)) / 1.8, low + (mean - low) / 8);
  for (let step = 0; step < 200 && high - low > 1e-13 * high; step += 1) {
    const { below, density } = probabilityBelow(axes, x);
    const off = below - probability;
    if (Math.abs(off) < 1e-13) break;
    if (off < 0) low = x;
    else high = x;
    const newton = x - off / density;
    x = newton > low && newton < high ? newton : (low + high) / 2;
  }
  return floor + x;
}

/** P(Q ≤ value). */
export function quadraticFormBelow(spread: SpaceSpread, value: number): number {
  const { floor, axes } = uncertainAxes(spread);
  if (value <= floor) return axes.length === 0 && value === floor ? 1 : 0;
  return axes.length === 0 ? 1 : probabilityBelow(axes, value - floor).below;
}

interface Axis {
  readonly variance: number;
  readonly centre: number;
}

// An axis along which nothing that matters is uncertain adds its centre's square, and has no place in the transform.
function uncertainAxes({ variances, centre }: SpaceSpread): {
  readonly floor: number;
  readonly axes: readonly Axis[];
} {
  const all = variances.map((variance, j): Axis => ({ variance, centre: centre[j] ?? 0 }));
  const whole = all.reduce((sum, axis) => sum + varianceOfSquare(axis), 0);
  const axes = all.filter((axis) => varianceOfSquare(axis) > 1e-24 * whole);
  const fixed = all.filter((axis) => !axes.includes(axis));
  return { floor: fixed.reduce((sum, axis) => sum + axis.centre * axis.centre, 0), axes };
}

function meanOf(axes: readonly Axis[]): number {
  return axes.reduce((sum, { centre, variance }) => sum + centre * centre + variance, 0);
}

function varianceOfSquare({ variance, centre }: Axis): number {
  return variance * (2 * variance + 4 * centre * centre);
}

interface Probability {
  readonly below: number;
  readonly density: number;
}

function probabilityBelow(axes: readonly Axis[], value: number): Probability {
  // Above the mean the path passes the pole at 0 on its other side, and the residue there is the whole probability.
  const isAbove = value > meanOf(axes);
  const saddle = isAbove ? saddleBelowZero(axes, value) : saddleAboveZero(axes, value);
  const { second, third } = curvature(axes, saddle);
  const step = STEP / Math.sqrt(second + 1 / (saddle * saddle));
  let bend = -third / (6 * second);
  // Far from the saddle the parabola may climb again where a long narrow cloud lies far off. A straighter one takes more
  // steps and climbs later.
  for (let path = 0; path < MOST_PATHS; path += 1) {
    const found = alongParabola(axes, value, saddle, bend, step);
    if (found !== null) return isAbove ? { ...found, below: 1 + found.below } : found;
    bend /= 2;
  }
  throw new RangeError('the distribution could not be worked out');
}

// Both integrals by even steps; null when the integrand grows before it has died away.
function alongParabola(
  axes: readonly Axis[],
  value: number,
  saddle: number,
  bend: number,
  step: number,
): Probability | null {
  const trig = { sin: 0, cos: 0 };
  let [below, density, least] = [0, 0, Infinity];
  for (let k = 0; k < MOST_STEPS; k += 1) {
    const im = k * step;
    const re = saddle - bend * im * im;
    const p = re * re + im * im;
    // log M(p) e^{px} without its square roots, and their product. Sums arranged so that what nearly cancels does so first.
    let [left, damping, rootRe, rootIm] = [value, 0, 1, 0];
    for (const { variance, centre } of axes) {
      const [wRe, wIm] = [1 + 2 * variance * re, 2 * variance * im];
      const size = wRe * wRe + wIm * wIm;
      const noncentral = (centre * centre) / size;
      left -= noncentral;
      damping += 2 * variance * noncentral;
      // Upper half plane in, first quadrant out.
      const length = Math.sqrt(size);
      const sRe = Math.sqrt(Math.max(0, (length + wRe) / 2));
      const sIm = Math.sqrt(Math.max(0, (length - wRe) / 2));
      [rootRe, rootIm] = [rootRe * sRe - rootIm * sIm, rootRe * sIm + rootIm * sRe];
    }
    sincosInto(im * left, trig);
    const magnitude = exp(re * left - damping * p) / (rootRe * rootRe + rootIm * rootIm);
    const gRe = magnitude * (trig.cos * rootRe + trig.sin * rootIm);
    const gIm = magnitude * (trig.sin * rootRe - trig.cos * rootIm);
    const along = -2 * bend * im;
    const [dRe, dIm] = [gRe * along - gIm, gRe + gIm * along];
    const weight = k === 0 ? 0.5 : 1;
    density += weight * dIm;
    below += (weight * (dIm * re - dRe * im)) / p;
    const size = magnitude * Math.sqrt(1 + along * along);
    if (size === 0 || (k > 4 && size < 1e-17 * (Math.abs(density) + Math.sqrt(p) * Math.abs(below)))) {
      return { below: (below * step) / Math.PI, density: (density * step) / Math.PI };
    }
    if (magnitude > 1.01 * least) return null;
    least = Math.min(least, magnitude);
  }
  return null;
}

/*
 * Where px + log M(p) − log |p| is least, on either side of 0: its slope rises between its singularities. Only the path
 * depends on it, not the integral: a few parts in a hundred are plenty.
 */
function saddleAboveZero(axes: readonly Axis[], value: number): number {
  let low = 1 / value;
  let high = low;
  while (slope(axes, value, high) < 0) high *= 4;
  while (high > 1.05 * low) {
    const middle = Math.sqrt(low * high);
    if (slope(axes, value, middle) < 0) low = middle;
    else high = middle;
  }
  return low;
}

function saddleBelowZero(axes: readonly Axis[], value: number): number {
  let low = -1 / (2 * Math.max(...axes.map(({ variance }) => variance)));
  let high = low / 2;
  while (slope(axes, value, high) < 0) {
    low = high;
    high /= 4;
  }
  for (let step = 0; step < 6; step += 1) {
    const middle = (low + high) / 2;
    if (slope(axes, value, middle) < 0) low = middle;
    else high = middle;
  }
  return high;
}

function slope(axes: readonly Axis[], value: number, p: number): number {
  let sum = value - 1 / p;
  for (const { variance, centre } of axes) {
    const w = 1 + 2 * variance * p;
    sum -= variance / w + (centre * centre) / (w * w);
  }
  return sum;
}

// Second and third derivative of px + log M(p). The pole at 0 is left out: it would bend the path too much.
function curvature(axes: readonly Axis[], p: number): { readonly second: number; readonly third: number } {
  let [second, third] = [0, 0];
  for (const { variance, centre } of axes) {
    const w = 1 + 2 * variance * p;
    const v = variance / w;
    const noncentral = (v * centre * centre) / (w * w);
    second += 2 * v * v + 4 * noncentral;
    third -= 8 * v * v * v + 24 * v * noncentral;
  }
  return { second, third };
}
