import { type AxesSetting, behindPlate, type StateTask, undone } from './state-task';
import type { Stokes } from '../stokes';
import type { CirclePoint } from './trig-quadratic';
import { curveAt, newCurvePoint, turnCurve } from './turn-curve';

/** The overlap t·p behind a stack, with its exact first and second derivatives by the doubled angles of some plates. */
export interface StackSlopes {
  readonly overlap: number;
  readonly infidelity: number;
  readonly slope: readonly number[];
  /** Symmetric, rows first. */
  readonly bend: readonly (readonly number[])[];
  /** What is left to the target, p − t. */
  readonly miss: Stokes;
  /** How p moves with each angle. */
  readonly moves: readonly Stokes[];
}

interface Tangent {
  readonly row: number;
  readonly along: Stokes;
}

/** @param moving indices of the plates, rising, by which to derive. */
export function stackSlopes(
  { from, to, plates }: StateTask,
  axes: readonly CirclePoint[],
  moving: readonly number[],
): StackSlopes {
  const targets = undoneTargets(to, plates, axes);
  const point = newCurvePoint();
  const slope = moving.map(() => 0);
  const bend = moving.map(() => moving.map(() => 0));
  let tangents: Tangent[] = [];
  let state = from;
  plates.forEach((plate, k) => {
    const axis = axes[k];
    const target = targets[k];
    if (axis === undefined || target === undefined) return;
    const [t1, t2, t3] = target;
    const column = moving.indexOf(k);
    tangents = tangents.map(({ row, along }) => {
      curveAt(turnCurve(along, plate.cos, plate.sin), axis, point);
      if (column >= 0) {
        const mixed = t1 * point.d1 + t2 * point.d2 + t3 * point.d3;
        setEntry(bend, row, column, mixed);
        setEntry(bend, column, row, mixed);
      }
      return { row, along: [point.q1, point.q2, point.q3] };
    });
    curveAt(turnCurve(state, plate.cos, plate.sin), axis, point);
    if (column >= 0) {
      slope[column] = t1 * point.d1 + t2 * point.d2 + t3 * point.d3;
      setEntry(bend, column, column, t1 * point.e1 + t2 * point.e2 + t3 * point.e3);
      tangents.push({ row: column, along: [point.d1, point.d2, point.d3] });
    }
    state = [point.q1, point.q2, point.q3];
  });
  return {
    overlap: dot(state, to),
    infidelity: missOf(state, to),
    slope,
    bend,
    miss: [state[0] - to[0], state[1] - to[1], state[2] - to[2]],
    moves: tangents.map(({ along }) => along),
  };
}

/** The state behind the whole stack, and 1 − F for the target. */
export function stackSetting({ from, to, plates }: StateTask, axes: readonly CirclePoint[]): AxesSetting {
  let state = from;
  plates.forEach((plate, k) => {
    const axis = axes[k];
    if (axis !== undefined) state = behindPlate(plate, axis, state);
  });
  return { axes, infidelity: missOf(state, to) };
}

// The target as it must be right behind each plate.
function undoneTargets(
  to: Stokes,
  plates: StateTask['plates'],
  axes: readonly CirclePoint[],
): readonly Stokes[] {
  const targets: Stokes[] = [to];
  for (let k = plates.length - 1; k > 0; k -= 1) {
    const [plate, axis, behind] = [plates[k], axes[k], targets[0]];
    if (plate !== undefined && axis !== undefined && behind !== undefined) {
      targets.unshift(behindPlate(undone(plate), axis, behind));
    }
  }
  return targets;
}

function setEntry(matrix: readonly number[][], row: number, column: number, value: number): void {
  const entries = matrix[row];
  if (entries !== undefined) entries[column] = value;
}

export function dot([a1, a2, a3]: Stokes, [b1, b2, b3]: Stokes): number {
  return a1 * b1 + a2 * b2 + a3 * b3;
}

function missOf([a1, a2, a3]: Stokes, [b1, b2, b3]: Stokes): number {
  const [r1, r2, r3] = [a1 - b1, a2 - b2, a3 - b3];
  return (r1 * r1 + r2 * r2 + r3 * r3) / 4;
}
