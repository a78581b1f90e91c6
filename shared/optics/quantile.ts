import { exp, sincos } from './elementary';
import type { PlaneSpread } from './budget-spread';

const DIRECTIONS = 128;

/**
 * The value that |X|² stays below with the given probability, for X Gaussian in a plane about `centre` (a generalised
 * chi-square with two eigenvalues). In the direction φ of the whitened plane X = centre + ρ (σ1 cos φ, σ2 sin φ) with
 * P(ρ > r) = e^{−r²/2}; the probability is the mean over φ, and the quantile its zero by bracketed secants.
 * Deterministic. Within 1e-4 of itself for a setting that makes its target (tests/optics/budget.test.ts).
 * @throws RangeError for a probability outside (0, 1).
 */
export function chiSquareQuantile(spread: PlaneSpread, probability: number): number {
  if (!(probability > 0 && probability < 1)) throw new RangeError('a probability lies between 0 and 1');
  const rays = raysOf(spread);
  const { sigma, centre } = spread;
  const offset = centre[0] * centre[0] + centre[1] * centre[1];
  const scale = sigma[0] * sigma[0] + sigma[1] * sigma[1];
  if (scale === 0) return offset;
  let low = 0;
  let high = offset + 2 * scale;
  for (let doubling = 0; doubling < 60 && probabilityBelow(spread, rays, high) < probability; doubling += 1)
    high *= 2;
  let belowLow = -probability;
  let belowHigh = probabilityBelow(spread, rays, high) - probability;
  for (let step = 0; step < 200 && high - low > 1e-7 * high; step += 1) {
    // Secant when it falls well inside, halving otherwise: neither end can stand still for long.
    const secant = low - (belowLow * (high - low)) / (belowHigh - belowLow);
    const margin = 0.02 * (high - low);
    const x = step % 3 !== 2 && secant > low + margin && secant < high - margin ? secant : (low + high) / 2;
    const below = probabilityBelow(spread, rays, x) - probability;
    if (Math.abs(below) < 1e-8) return x;
    if (below < 0) {
      low = x;
      belowLow = below;
    } else {
      high = x;
      belowHigh = below;
    }
  }
  return (low + high) / 2;
}

/** One direction of the whitened plane with its part of the whole turn. */
interface Ray {
  readonly x: number;
  readonly y: number;
  readonly weight: number;
}

// The more the two σ differ, the more happens near φ = ±90°, where the long axis adds nothing: tan φ = tan τ / r with
// even steps in τ puts 1/r times as many directions there. A periodic smooth integrand makes even steps the best rule.
function raysOf({ sigma: [long, short] }: PlaneSpread): readonly Ray[] {
  const r = long > 0 ? Math.max(Math.sqrt(short / long), 0.2) : 1;
  return Array.from({ length: DIRECTIONS }, (_, k) => {
    const { sin, cos } = sincos((2 * Math.PI * (k + 0.5)) / DIRECTIONS);
    const squared = r * r * cos * cos + sin * sin;
    const size = Math.sqrt(squared);
    return { x: (long * r * cos) / size, y: (short * sin) / size, weight: r / squared / DIRECTIONS };
  });
}

// P(|X|² ≤ value): along each ray, |centre + ρ(x, y)|² = value solved for ρ.
function probabilityBelow({ centre }: PlaneSpread, rays: readonly Ray[], value: number): number {
  const c = centre[0] * centre[0] + centre[1] * centre[1] - value;
  let sum = 0;
  for (const { x, y, weight } of rays) {
    const a = x * x + y * y;
    const b = centre[0] * x + centre[1] * y;
    if (a === 0) {
      if (c <= 0) sum += weight;
      continue;
    }
    const discriminant = b * b - a * c;
    if (discriminant <= 0) continue;
    const root = Math.sqrt(discriminant);
    const far = (root - b) / a;
    if (far <= 0) continue;
    const near = Math.max(0, (-b - root) / a);
    sum += weight * (exp((-near * near) / 2) - exp((-far * far) / 2));
  }
  return sum;
}
