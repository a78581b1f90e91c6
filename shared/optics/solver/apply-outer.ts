import type { Quaternion } from '../quaternion';
import { direction } from './apply-exact';
import { polish } from './apply-newton';
import { type Candidate, EXACT_MISS, type Half } from './apply-stack';
import type { CirclePoint } from './trig-quadratic';

// |A|² and |B|² this close: the two linear equations for e^{ic} are one, and a line cuts the circle twice.
const SAME_SIZE = 1e-9;

/**
 * The settings of three plates with the middle one at a given point. J₂J₁ = J₃(c)⁻¹U has two parts, each of which gives
 * e^{ia}; equating them leaves, with p = e^{ic}, A p̄ + B p = G where A = −C₂S₃βe^{ib}, B = S₂S₃ᾱ and
 * G = S₂C₃β + (C₂C₃ᾱ − C₁)e^{ib}.
 */
export function outerSettings(
  halves: readonly [Half, Half, Half],
  middle: CirclePoint,
  target: Quaternion,
): readonly Candidate[] {
  const [first, second, third] = halves;
  const found: Candidate[] = [];
  for (const sign of [1, -1]) {
    const [w, x, y, z] = [sign * target.w, sign * target.x, sign * target.y, sign * target.z];
    const across = third.sin * second.cos;
    const along = third.sin * second.sin;
    const aRe = -across * (z * middle.cos - x * middle.sin);
    const aIm = -across * (z * middle.sin + x * middle.cos);
    const [bRe, bIm] = [along * w, -along * y];
    const even = second.cos * third.cos;
    const [eRe, eIm] = [even * w - first.cos, -even * y];
    const gRe = second.sin * third.cos * z + eRe * middle.cos - eIm * middle.sin;
    const gIm = second.sin * third.cos * x + eRe * middle.sin + eIm * middle.cos;
    for (const c of ends(aRe, aIm, bRe, bIm, gRe, gIm)) {
      const re = second.cos * first.cos - third.cos * w - third.sin * (z * c.cos + x * c.sin);
      const im = third.cos * y - third.sin * (x * c.cos - z * c.sin);
      const a = direction(re * middle.cos - im * middle.sin, re * middle.sin + im * middle.cos);
      const candidate = polish(halves, [a, middle, c], target, [1]);
      if (candidate.miss < EXACT_MISS) found.push(candidate);
    }
  }
  return found;
}

function ends(
  aRe: number,
  aIm: number,
  bRe: number,
  bIm: number,
  gRe: number,
  gIm: number,
): readonly CirclePoint[] {
  const [a, b] = [aRe * aRe + aIm * aIm, bRe * bRe + bIm * bIm];
  if (Math.abs(a - b) > SAME_SIZE) {
    // p = (B̄G − AḠ) / (|B|² − |A|²), a point of the circle where there is a setting.
    const side = b > a ? 1 : -1;
    return [
      direction(
        side * (bRe * gRe + bIm * gIm - aRe * gRe - aIm * gIm),
        side * (bRe * gIm - bIm * gRe - aIm * gRe + aRe * gIm),
      ),
    ];
  }
  if (!(a > 0)) return [];
  // A = r f ḡ and B = r f g with unit f, g: 2r f Re(g p) = G.
  const size = Math.sqrt(a * b);
  const square = direction(bRe * aRe + bIm * aIm, bIm * aRe - bRe * aIm);
  const g = rootOf(square);
  const f = direction(aRe * g.cos - aIm * g.sin, aRe * g.sin + aIm * g.cos);
  const cos = Math.max(-1, Math.min(1, (gRe * f.cos + gIm * f.sin) / (2 * Math.sqrt(size))));
  const sin = Math.sqrt(1 - cos * cos);
  return [sin, -sin].map((each) => ({ cos: cos * g.cos + each * g.sin, sin: each * g.cos - cos * g.sin }));
}

/** The point at half the angle, without an angle: a square root on the circle. */
function rootOf({ cos, sin }: CirclePoint): CirclePoint {
  if (cos < 0 && sin === 0) return { cos: 0, sin: 1 };
  return direction(1 + cos, sin);
}
