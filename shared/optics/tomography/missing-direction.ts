import { symmetricEigen } from '../robust/small-matrix';
import type { Stokes } from '../stokes';

/**
 * A change of the light, of length 1 in (S0, S), that no count notices. `intensity` is its part along S0, never negative:
 * 0 for a part of the Stokes vector that isn't measured at all; otherwise brighter light with that change of S looks the same.
 */
export interface MissingDirection {
  readonly intensity: number;
  readonly stokes: Stokes;
}

/** Settings closer than this to leaving a direction out, as a ratio to what they measure best, are taken to leave it out. */
const TOLERANCE = 1e-5;
/** For telling, within what is missing, an axis or a pure change of polarisation from the rest. */
const SAME_DIRECTION = 1e-5;

type Four = readonly number[];

const dot = (a: Four, b: Four): number => a.reduce((sum, value, k) => sum + value * (b[k] ?? 0), 0);
const AXES: readonly Four[] = [
  [0, 1, 0, 0],
  [0, 0, 1, 0],
  [0, 0, 0, 1],
];

/**
 * What these settings leave undetermined of (S0, S1, S2, S3), canonical frame, as orthonormal directions; none where they are
 * informationally complete. Changes of the Stokes vector alone come first, S1, S2 and S3 themselves where they are missing.
 */
export function missingDirections(
  projectors: readonly Stokes[],
  exposures: readonly number[],
): readonly MissingDirection[] {
  const missing = nullSpace(projectors, exposures);
  if (missing.length === 0) return [];
  if (missing.length === 4) return [{ intensity: 1, stokes: [0, 0, 0] }, ...AXES.map(direction)];
  // What is left of each axis within the null space; the part with an intensity, of which there is one at most, goes first.
  const left: Four[] = [];
  const take = (axis: Four): Four | null => {
    const inside = missing.reduce<Four>((sum, v) => add(sum, v, dot(axis, v)), [0, 0, 0, 0]);
    const fresh = left.reduce<Four>((rest, v) => add(rest, v, -dot(inside, v)), inside);
    const length = Math.sqrt(dot(fresh, fresh));
    return length > SAME_DIRECTION ? fresh.map((value) => value / length) : null;
  };
  const bright = take([1, 0, 0, 0]);
  if (bright !== null) left.push(bright);
  const found: MissingDirection[] = [];
  while (left.length < missing.length) {
    const candidates = AXES.map(take).filter((each) => each !== null);
    const best = candidates.reduce<Four | null>(
      (most, each) => (most === null || largest(each) > largest(most) + SAME_DIRECTION ? each : most),
      null,
    );
    if (best === null) break;
    left.push(best);
    found.push(direction(best));
  }
  return bright === null ? found : [...found, direction(bright)];
}

const largest = (v: Four): number => Math.max(...v.map(Math.abs));
const add = (a: Four, b: Four, by: number): Four => a.map((value, k) => value + by * (b[k] ?? 0));

// The largest part counts as positive, S0 first: the other sign is the same direction.
function direction(v: Four): MissingDirection {
  const [s0 = 0, s1 = 0, s2 = 0, s3 = 0] = v;
  const intensity = Math.abs(s0) > SAME_DIRECTION ? s0 : 0;
  const deciding =
    intensity === 0 ? (v.find((value) => Math.abs(value) > largest(v) - SAME_DIRECTION) ?? 1) : intensity;
  const sign = deciding < 0 ? -1 : 1;
  return { intensity: sign * intensity, stokes: [sign * s1 + 0, sign * s2 + 0, sign * s3 + 0] };
}

function nullSpace(projectors: readonly Stokes[], exposures: readonly number[]): readonly Four[] {
  const most = Math.max(0, ...exposures);
  if (most === 0) return [[1, 0, 0, 0], ...AXES];
  const gram = new Float64Array(16);
  for (let k = 0; k < projectors.length; k += 1) {
    const [m1, m2, m3] = projectors[k] ?? [0, 0, 0];
    const by = (exposures[k] ?? 0) / most;
    addSquare(gram, by, by * m1, by * m2, by * m3);
  }
  // Squares of the singular values. Their sum and product bound the least of them from below, which mostly settles it.
  const trace = (gram[0] ?? 0) + (gram[5] ?? 0) + (gram[10] ?? 0) + (gram[15] ?? 0);
  const limit = TOLERANCE * TOLERANCE * trace;
  const third = trace / 3;
  if (determinant(gram) / (third * third * third) > limit) return [];
  const { values, vectors } = symmetricEigen(gram, 4);
  return [0, 1, 2, 3]
    .filter((k) => (values[k] ?? 0) <= limit)
    .map((k) => [0, 1, 2, 3].map((i) => vectors[4 * i + k] ?? 0));
}

function addSquare(gram: Float64Array, r0: number, r1: number, r2: number, r3: number): void {
  for (let i = 0; i < 4; i += 1) {
    const left = i === 0 ? r0 : i === 1 ? r1 : i === 2 ? r2 : r3;
    gram[4 * i] = (gram[4 * i] ?? 0) + left * r0;
    gram[4 * i + 1] = (gram[4 * i + 1] ?? 0) + left * r1;
    gram[4 * i + 2] = (gram[4 * i + 2] ?? 0) + left * r2;
    gram[4 * i + 3] = (gram[4 * i + 3] ?? 0) + left * r3;
  }
}

// By the 2 × 2 minors of the upper and the lower two rows (Laplace).
function determinant(m: Float64Array): number {
  const minor = (row: number, i: number, j: number): number =>
    (m[row + i] ?? 0) * (m[row + 4 + j] ?? 0) - (m[row + j] ?? 0) * (m[row + 4 + i] ?? 0);
  return (
    minor(0, 0, 1) * minor(8, 2, 3) -
    minor(0, 0, 2) * minor(8, 1, 3) +
    minor(0, 0, 3) * minor(8, 1, 2) +
    minor(0, 1, 2) * minor(8, 0, 3) -
    minor(0, 1, 3) * minor(8, 0, 2) +
    minor(0, 2, 3) * minor(8, 0, 1)
  );
}

const AXIS_NAMES = ['S1', 'S2', 'S3'] as const;

/** In words for a message, in the canonical frame: "S3", or a direction by its parts. */
export function nameMissing({ intensity, stokes }: MissingDirection): string {
  const parts = `(${stokes.map((part) => part.toFixed(3)).join(', ')})`;
  if (intensity > 0) {
    return `the intensity S0 apart from a change of (S1, S2, S3) along ${parts} for a change of ${intensity.toFixed(3)} in S0`;
  }
  const axis = stokes.findIndex((part) => Math.abs(part) > 1 - SAME_DIRECTION);
  return AXIS_NAMES[axis] ?? `the direction ${parts} of (S1, S2, S3)`;
}
