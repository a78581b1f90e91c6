import { sincos } from '../elementary';
import type { Quaternion } from '../quaternion';
import { onePlate, pairPoints } from './apply-exact';
import { climb } from './apply-newton';
import { type Candidate, candidateAt, type Half, targetWithin } from './apply-stack';
import { spreadAngles } from './spread-angles';
import type { CirclePoint } from './trig-quadratic';

/** Every local optimum of |cos(ε/2)| of up to three plates; of more, those that a fixed set of starts climbs to. */
export function nearestSettings(halves: readonly Half[], target: Quaternion): readonly Candidate[] {
  const [first, second, third] = halves;
  if (first === undefined) return [candidateAt([], [], target)];
  if (second === undefined) return nearestOne(first, target);
  if (third === undefined) {
    const table = circleTable(PAIR_STEPS);
    return climbed(
      halves,
      pairRidges(first, second, target, table).map(({ points }) => points),
      target,
    );
  }
  if (halves.length === 3) return climbed(halves, threeStarts(first, second, third, target), target);
  const starts = spreadAngles(halves.length, MANY_STARTS).map((angles) =>
    angles.map((angle) => sincos(2 * angle)),
  );
  return climbed(halves, starts, target);
}

const MANY_STARTS = 160;
// The angle between a pair's plates, in steps of 7.5° on the sphere; where it is searched, the first plate of three.
const PAIR_STEPS = 48;
const FIRST_STEPS = 72;

function climbed(
  halves: readonly Half[],
  starts: readonly (readonly CirclePoint[])[],
  target: Quaternion,
): readonly Candidate[] {
  return starts.map((start) => climb(halves, start, target)).filter((found) => found !== null);
}

// cos(ε/2) = wC + S|β| cos(u − arg β): both ends are optima of its size unless they have one sign.
function nearestOne(plate: Half, target: Quaternion): readonly Candidate[] {
  const found = onePlate(plate, target);
  const across = plate.sin * Math.sqrt(target.z * target.z + target.x * target.x);
  if (across > Math.abs(plate.cos * target.w)) return found;
  const best = Math.min(...found.map(({ miss }) => miss));
  return found.filter(({ miss }) => miss === best).slice(0, 1);
}

interface Step extends CirclePoint {
  readonly angle: number;
}

// Turned off the round angles, where a pair of equal plates may have a kink.
function circleTable(steps: number): readonly Step[] {
  return Array.from({ length: steps + 1 }, (_, k) => {
    const angle = (2 * Math.PI * (k + 0.37)) / steps;
    return { angle, ...sincos(angle) };
  });
}

/** An optimum of two plates, with the sign of the target it is near to. */
interface Ridge {
  readonly points: readonly [CirclePoint, CirclePoint];
  readonly sign: number;
}

/**
 * The best angle of a pair as a whole has a closed form, which leaves, for ±target and in D alone,
 * h(D) = ±Re ᾱ(C₁C₂ − S₁S₂e^{iD}) + |β| |C₂S₁ + S₂C₁e^{iD}|. Its maxima: the falling zeros of h', bracketed on a fixed grid.
 */
function pairRidges(first: Half, second: Half, target: Quaternion, table: readonly Step[]): readonly Ridge[] {
  const [m, n] = [second.cos * first.sin, second.sin * first.cos];
  const plane = Math.sqrt(target.z * target.z + target.x * target.x) * m * n;
  const squares = m * m + n * n;
  const ridges: Ridge[] = [];
  for (const sign of [1, -1]) {
    const even = sign * first.sin * second.sin * target.w;
    const odd = sign * first.sin * second.sin * target.y;
    const slope = ({ cos, sin }: CirclePoint): number => {
      const length = squares + 2 * m * n * cos;
      return even * sin - odd * cos - (length > 0 ? (plane * sin) / Math.sqrt(length) : 0);
    };
    const add = (apart: CirclePoint): void => {
      ridges.push({ points: pairPoints(first, second, apart, sign * target.z, sign * target.x), sign });
    };
    let before: Step | null = null;
    let slopeBefore = 0;
    let rising = false;
    for (const step of table) {
      const here = slope(step);
      if (before !== null && slopeBefore > 0 && here <= 0) add(falling(slope, before.angle, step.angle));
      rising ||= Math.abs(here) > LEVEL;
      before = step;
      slopeBefore = here;
    }
    if (!rising) for (const apart of LEVEL_POINTS) add(apart);
  }
  return ridges;
}

// Slopes below this everywhere are a level line without a summit: any of its points stands for it.
const LEVEL = 1e-13;
const LEVEL_POINTS: readonly CirclePoint[] = [
  { cos: 1, sin: 0 },
  { cos: -1, sin: 0 },
];

// Regula falsi with the stale end halved; the climb that follows does the last digits.
function falling(slope: (point: CirclePoint) => number, from: number, to: number): CirclePoint {
  let [low, high] = [from, to];
  let [lowSlope, highSlope] = [slope(sincos(low)), slope(sincos(high))];
  let middle = sincos(low);
  for (let step = 0; step < 12; step += 1) {
    const angle = (low * highSlope - high * lowSlope) / (highSlope - lowSlope);
    if (!(angle > low && angle < high)) break;
    middle = sincos(angle);
    const value = slope(middle);
    if (Math.abs(value) < 1e-12) break;
    if (value > 0) {
      [low, lowSlope] = [angle, value];
      highSlope /= 2;
    } else {
      [high, highSlope] = [angle, value];
      lowSlope /= 2;
    }
  }
  return middle;
}

/**
 * Starts for three plates: along each ridge, the optimum of the last two for a given first, both neighbours of a summit on
 * a fixed grid, and the ends of ridges.
 */
function threeStarts(
  first: Half,
  second: Half,
  third: Half,
  target: Quaternion,
): readonly (readonly CirclePoint[])[] {
  const table = circleTable(PAIR_STEPS);
  const slices = circleTable(FIRST_STEPS)
    .slice(0, FIRST_STEPS)
    .map((a) => {
      const rest = targetWithin(target, [[first], [a]], [[], []]);
      return pairRidges(second, third, rest, table).map(({ points: [b, c], sign }) => {
        const points = [a, b, c];
        return { points, sign, height: heightOf([first, second, third], points, target, sign) };
      });
    });
  const starts: (readonly CirclePoint[])[] = [];
  slices.forEach((slice, k) => {
    const next = slices[(k + 1) % FIRST_STEPS] ?? [];
    const last = slices[(k + FIRST_STEPS - 1) % FIRST_STEPS] ?? [];
    for (const ridge of slice) {
      const ahead = sameRidge(ridge, next);
      const behind = sameRidge(ridge, last);
      const below = (other: number | null): boolean => other === null || other <= ridge.height;
      if (below(ahead) && below(behind)) starts.push(ridge.points);
    }
  });
  return starts;
}

interface RidgePoint {
  readonly points: readonly CirclePoint[];
  readonly sign: number;
  readonly height: number;
}

// Neighbouring points of one ridge are within about 50° in both angles of the pair.
const SAME_RIDGE = 1.28;

function sameRidge(ridge: RidgePoint, ridges: readonly RidgePoint[]): number | null {
  let nearest = SAME_RIDGE;
  let height: number | null = null;
  for (const other of ridges) {
    if (other.sign !== ridge.sign) continue;
    const overlap = overlapAt(ridge, other, 1) + overlapAt(ridge, other, 2);
    if (overlap > nearest) [nearest, height] = [overlap, other.height];
  }
  return height;
}

function overlapAt(one: RidgePoint, other: RidgePoint, plate: number): number {
  const [p, q] = [one.points[plate], other.points[plate]];
  return p === undefined || q === undefined ? -1 : p.cos * q.cos + p.sin * q.sin;
}

// cos(ε/2) with the sign of the target that the ridge is near to.
function heightOf(
  halves: readonly Half[],
  points: readonly CirclePoint[],
  target: Quaternion,
  sign: number,
): number {
  return sign * targetWithin(target, [halves, points], [[], []]).w;
}
