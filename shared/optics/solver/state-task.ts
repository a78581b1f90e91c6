import { asin, type SinCos, sincos } from '../elementary';
import { normaliseStokes, type Stokes } from '../stokes';
import { type Radians, radians } from '../units';
import type { CirclePoint } from './trig-quadratic';

/** Preparing a state, unpacked for the solvers: unit vectors, and sine and cosine of each retardance in beam order. */
export interface StateTask {
  readonly from: Stokes;
  readonly to: Stokes;
  readonly plates: readonly SinCos[];
}

/** Doubled angles of some plates in beam order, as points on the circle, with 1 − F there. */
export interface AxesSetting {
  readonly axes: readonly CirclePoint[];
  readonly infidelity: number;
}

/** @throws RangeError for a Stokes vector of length 0 or a retardance that isn't finite. */
export function stateTask(input: Stokes, target: Stokes, retardancesRad: readonly Radians[]): StateTask {
  return {
    from: normaliseStokes(input),
    to: normaliseStokes(target),
    plates: retardancesRad.map((retardanceRad) => sincos(retardanceRad)),
  };
}

/** A plate as if light went through it backwards. */
export function undone({ sin, cos }: SinCos): SinCos {
  return { sin: -sin, cos };
}

/** A state behind a plate whose fast axis stands at half the angle of `axis`. */
export function behindPlate({ sin: s, cos: c }: SinCos, axis: CirclePoint, [p1, p2, p3]: Stokes): Stokes {
  const along = (1 - c) * (axis.cos * p1 + axis.sin * p2);
  return [
    c * p1 + s * axis.sin * p3 + along * axis.cos,
    c * p2 - s * axis.cos * p3 + along * axis.sin,
    c * p3 + s * (axis.cos * p2 - axis.sin * p1),
  ];
}

/**
 * What is left for `count` plates from `start` on when the plates before them have changed the input and those behind them are
 * undone from the target. `axes` holds the doubled angle of every plate; those of the window aren't read.
 */
export function windowTask(
  task: StateTask,
  start: number,
  count: number,
  axes: readonly CirclePoint[],
): StateTask {
  let { from, to } = task;
  task.plates.forEach((plate, k) => {
    const axis = axes[k];
    if (k < start && axis !== undefined) from = behindPlate(plate, axis, from);
  });
  for (let k = task.plates.length - 1; k >= start + count; k -= 1) {
    const [plate, axis] = [task.plates[k], axes[k]];
    if (plate !== undefined && axis !== undefined) to = behindPlate(undone(plate), axis, to);
  }
  return { from, to, plates: task.plates.slice(start, start + count) };
}

/** The angle between two states on the sphere from 1 − F of one for the other. */
export function angleOfInfidelity(infidelity: number): Radians {
  return radians(2 * asin(Math.sqrt(infidelity)));
}
