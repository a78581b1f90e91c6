import type { Quaternion } from '../quaternion';
import { polish } from './apply-newton';
import { type Candidate, candidateAt, EXACT_MISS, type Half } from './apply-stack';
import type { CirclePoint } from './trig-quadratic';

/** The settings that make a target exactly, and whether a continuous family may run through them. */
export interface Exact {
  readonly candidates: readonly Candidate[];
  /** Those found where two numbers vanish together: one of a family, most likely. */
  readonly suspects: readonly Candidate[];
}

/** All settings of up to three plates that make `target` or its negative. */
export function exactSettings(halves: readonly Half[], target: Quaternion): Exact {
  const [first, second, third] = halves;
  if (first === undefined) return kept([candidateAt([], [], target)], []);
  if (second === undefined) return kept(onePlate(first, target), []);
  if (third === undefined) return kept(twoPlatesExact(first, second, target), []);
  return threePlates(first, second, third, target);
}

function kept(candidates: readonly Candidate[], suspects: readonly Candidate[]): Exact {
  const exact = ({ miss }: Candidate): boolean => miss < EXACT_MISS;
  return { candidates: candidates.filter(exact), suspects: suspects.filter(exact) };
}

const ANYWHERE: CirclePoint = { cos: 1, sin: 0 };

/** The direction of a complex number; `ANYWHERE` for 0. */
export function direction(re: number, im: number): CirclePoint {
  const length = Math.sqrt(re * re + im * im);
  return length > 0 ? { cos: re / length, sin: im / length } : ANYWHERE;
}

/** The two stationary points of one plate: its axis along the target's, and across it. */
export function onePlate(plate: Half, target: Quaternion): readonly Candidate[] {
  const along = direction(target.z, target.x);
  const across = { cos: -along.cos, sin: -along.sin };
  return [along, across].map((point) => candidateAt([plate], [point], target));
}

// A pair this far from making the target is left to the search for the nearest setting.
const NEAR = 1e-6;

function twoPlatesExact(first: Half, second: Half, target: Quaternion): readonly Candidate[] {
  const found: Candidate[] = [];
  for (const sign of [1, -1]) {
    const re = first.cos * second.cos - sign * target.w;
    const im = -sign * target.y;
    const off = Math.sqrt(re * re + im * im) - first.sin * second.sin;
    if (Math.abs(off) > NEAR) continue;
    const points = pairPoints(first, second, direction(re, im), sign * target.z, sign * target.x);
    found.push(polish([first, second], points, target));
  }
  return found;
}

/**
 * Both plates of a pair from the angle D between their axes (on the sphere, second minus first) and the in-plane part of
 * what they make, (C₂S₁ + S₂C₁ e^{iD}) e^{iu₁}.
 */
export function pairPoints(
  first: Half,
  second: Half,
  apart: CirclePoint,
  planeRe: number,
  planeIm: number,
): readonly [CirclePoint, CirclePoint] {
  const re = second.cos * first.sin + second.sin * first.cos * apart.cos;
  const im = second.sin * first.cos * apart.sin;
  const u = direction(planeRe * re + planeIm * im, planeIm * re - planeRe * im);
  return [u, { cos: u.cos * apart.cos - u.sin * apart.sin, sin: u.sin * apart.cos + u.cos * apart.sin }];
}

/** How far a pair's in-plane part stays from 0 whatever the angle between its plates. */
function leastInPlane(one: Half, other: Half): number {
  return Math.abs(Math.abs(one.cos) * other.sin - one.sin * Math.abs(other.cos));
}

function threePlates(first: Half, second: Half, third: Half, target: Quaternion): Exact {
  // The pair's own angle comes from its in-plane part: search the plate at the end that leaves the better pair. Seen from
  // the other side of the beam a stack's y changes its sign and nothing else.
  if (leastInPlane(second, third) >= leastInPlane(first, second) - 1e-12)
    return fromFirst(first, second, third, target, false);
  return fromFirst(third, second, first, { ...target, y: -target.y }, true);
}

// A triangle this far from closing is left to the search for the nearest setting; Newton closes what is only rounding.
const CLOSES = 1e-11;
// Squared sides this small are rounding's, and mirror images that near to each other are then the one of a double root.
const GRAZES = 4e-15;
const SAME_POINT = 1e-5;
// Below this a family may run through the solution.
const VANISHES = 1e-7;

function areOne(one: Candidate, other: Candidate): boolean {
  return one.points.every(({ cos, sin }, k) => {
    const point = other.points[k] ?? ANYWHERE;
    return Math.abs(sin * point.cos - cos * point.sin) < SAME_POINT && cos * point.cos + sin * point.sin > 0;
  });
}

/**
 * V = U J₁(a)⁻¹ must be a product of the other two, and that is so exactly when |C₃C₂ − α_V| = S₃S₂. With
 * α_V = C₁α + S₁β e^{−ia} and K = C₃C₂ − C₁α: |K − S₁β e^{−ia}| = S₃S₂, a triangle with the sides |K|, S₁|β|, S₃S₂ and
 * two mirror images; the same for −U. Then D between the other two's axes is the direction of C₃C₂ − α_V, and their own
 * direction that of β_V.
 */
function fromFirst(first: Half, second: Half, third: Half, target: Quaternion, backwards: boolean): Exact {
  const candidates: Candidate[] = [];
  const suspects: Candidate[] = [];
  const beam = backwards ? [third, second, first] : [first, second, third];
  const wanted = backwards ? { ...target, y: -target.y } : target;
  const side = first.sin * Math.sqrt(target.z * target.z + target.x * target.x);
  const reach = third.sin * second.sin;
  for (const sign of [1, -1]) {
    const [w, x, y, z] = [sign * target.w, sign * target.x, sign * target.y, sign * target.z];
    const kRe = third.cos * second.cos - first.cos * w;
    const kIm = -first.cos * y;
    const k = Math.sqrt(kRe * kRe + kIm * kIm);
    const upper = (k + side - reach) * (k + side + reach);
    const lower = (reach - k + side) * (reach + k - side);
    if (upper < -CLOSES || lower < -CLOSES) continue;
    const twice = 2 * k * side;
    const grazes = upper < GRAZES || lower < GRAZES;
    // cos φ = upper/twice − 1 = 1 − lower/twice; each is exact where it is small.
    const sin = twice > 0 ? Math.min(1, Math.sqrt(Math.max(0, upper * lower)) / twice) : 0;
    const size = Math.sqrt(1 - sin * sin);
    const cos = upper < lower ? -size : size;
    const base = direction(z * kRe + x * kIm, x * kRe - z * kIm);
    let found: Candidate | null = null;
    for (const mirror of [1, -1]) {
      const a = {
        cos: base.cos * cos - mirror * base.sin * sin,
        sin: base.sin * cos + mirror * base.cos * sin,
      };
      const apart = direction(
        kRe - first.sin * (z * a.cos + x * a.sin),
        kIm - first.sin * (x * a.cos - z * a.sin),
      );
      const planeRe = first.cos * z - first.sin * (w * a.cos - y * a.sin);
      const planeIm = first.cos * x - first.sin * (y * a.cos + w * a.sin);
      const [b, c] = pairPoints(second, third, apart, planeRe, planeIm);
      const candidate = polish(beam, backwards ? [c, b, a] : [a, b, c], wanted);
      if (found !== null && grazes && areOne(found, candidate)) continue;
      found = candidate;
      const family = twice < VANISHES || planeRe * planeRe + planeIm * planeIm < VANISHES * VANISHES;
      (family ? suspects : candidates).push(candidate);
    }
  }
  return kept(candidates, suspects);
}
