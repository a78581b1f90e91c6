import type { Conditions } from './conditions';
import { freeDirections, leastWithin, levenbergMarquardt, MET, projected } from './least-squares';
import { HIGHEST_ORDER } from './robustness';
import { normalEquations, symmetricEigen } from './small-matrix';

/** Angles at the end of one descent. */
export interface Found {
  readonly angles: Float64Array;
  /** Derivatives that were made to vanish; −1 when not even the goal itself is met. */
  readonly level: number;
  readonly averageInfidelity: number;
}

const STEPS = 60;
const STEPS_WITHIN = 60;

/**
 * Everything that one start leads to: the least average infidelity with no condition on the way, then with the goal met
 * at no error, then with one derivative more gone each time as long as that can be had, each from the one before; and the
 * derivatives' zeros straight from the start, which may lie in another valley.
 */
export function descendFrom(conditions: Conditions, start: Float64Array): readonly Found[] {
  const { average } = conditions;
  const loose = levenbergMarquardt(average, start, { steps: STEPS, settled: 0 });
  const climbed = climb(conditions, loose.angles, 0);
  const straight = climb(conditions, start, 1);
  return [{ angles: loose.angles, level: -1, averageInfidelity: loose.squares }, ...climbed, ...straight];
}

function climb({ average, flatTo }: Conditions, start: Float64Array, from: number): readonly Found[] {
  const found: Found[] = [];
  let angles = start;
  for (let level = from; level <= HIGHEST_ORDER; level += 1) {
    const constraints = flatTo(level);
    const met = levenbergMarquardt(constraints, angles, { steps: STEPS, settled: 1e-31 });
    if (!(met.squares < MET)) break;
    const least = leastWithin(average, constraints, met.angles, STEPS_WITHIN);
    angles = least.angles;
    found.push({ angles, level, averageInfidelity: least.squares });
  }
  return found;
}

// How far along a level direction a setting is moved to see whether its average comes back the same.
const PROBE_RAD = 0.02;
const PROBE_STEPS = 20;

/**
 * Whether the setting is one of a continuous family, all equally good: moved along a direction in which the infidelity
 * hardly changes at any error, and brought to the best there, it stays moved.
 */
export function isOneOfFamily(conditions: Conditions, found: Found): boolean {
  return levelDirections(conditions, found).some((direction) => staysMoved(conditions, found, direction));
}

function staysMoved(
  { average, flatTo }: Conditions,
  { angles, level, averageInfidelity }: Found,
  direction: Float64Array,
): boolean {
  const moved = angles.map((angle, i) => angle + PROBE_RAD * (direction[i] ?? 0));
  const met = level < 0 ? moved : projected(flatTo(level), moved);
  if (met === null) return false;
  const back =
    level < 0
      ? levenbergMarquardt(average, met, { steps: PROBE_STEPS, settled: 0 })
      : leastWithin(average, flatTo(level), met, PROBE_STEPS);
  const shift = Math.max(...back.angles.map((angle, i) => Math.abs(angle - (angles[i] ?? 0))));
  const isAsGood = Math.abs(back.squares - averageInfidelity) <= 1e-6 * averageInfidelity + 1e-18;
  return isAsGood && shift > PROBE_RAD / 10;
}

// The free directions, those first along which 1 − F changes least at all errors.
function levelDirections(
  { average, flatTo, size }: Conditions,
  { angles, level }: Found,
): readonly Float64Array[] {
  const n = angles.length;
  const free =
    level < 0
      ? Array.from(angles, (_, k) => Float64Array.from({ length: n }, (__, i) => (i === k ? 1 : 0)))
      : freeDirections(flatTo(level)(angles), n);
  const d = free.length;
  // One row for each error: how fast the square root of 1 − F changes along each free direction.
  const { rows, value, jacobian } = average(angles);
  const nodes = rows / size;
  const slopes = new Float64Array(nodes * d);
  for (let node = 0; node < nodes; node += 1) {
    let squares = 1e-300;
    for (let r = node * size; r < (node + 1) * size; r += 1) squares += (value[r] ?? 0) * (value[r] ?? 0);
    free.forEach((direction, k) => {
      let slope = 0;
      for (let r = node * size; r < (node + 1) * size; r += 1) {
        for (let i = 0; i < n; i += 1)
          slope += (value[r] ?? 0) * (jacobian[r * n + i] ?? 0) * (direction[i] ?? 0);
      }
      slopes[node * d + k] = slope / Math.sqrt(squares);
    });
  }
  const { matrix } = normalEquations(slopes, new Float64Array(nodes), nodes, d);
  const { values, vectors } = symmetricEigen(matrix, d);
  const byChange = Array.from({ length: d }, (_, k) => k).sort((a, b) => (values[a] ?? 0) - (values[b] ?? 0));
  return byChange.map((least) =>
    Float64Array.from({ length: n }, (_, i) =>
      free.reduce((sum, direction, k) => sum + (vectors[k * d + least] ?? 0) * (direction[i] ?? 0), 0),
    ),
  );
}
