import { sincos } from '../elementary';
import { distinctSettings, halfAngle } from './distinct-settings';
import type { Setting } from './setting';
import { spreadAngles } from './spread-angles';
import { stackSetting, stackSlopes } from './stack-slopes';
import { type AxesSetting, type StateTask } from './state-task';
import { solveDamped } from './symmetric-matrix';
import type { CirclePoint } from './trig-quadratic';
import { turned } from './turned';

// Starting points for as many moving plates as the index: a fidelity is a trigonometric polynomial of degree 2 in each angle.
const STARTS = [1, 8, 64, 256, 512, 768, 1024] as const;
// Optima of a stack are as sharp as the square root of rounding where they are blunt.
const SAME_OPTIMUM_RAD = 1e-6;

/**
 * Local optima of the fidelity over the angles of the plates in `moving`, the others standing as in `axes`, by damped Newton
 * with exact derivatives from a fixed set of starts. Sorted by angles. On a ridge these are some of its points.
 */
export function stackOptima(
  task: StateTask,
  axes: readonly CirclePoint[],
  moving: readonly number[],
): readonly Setting[] {
  const found: Setting[] = [];
  for (const angles of spreadAngles(moving.length, STARTS[moving.length] ?? 1024)) {
    const start = [...axes];
    moving.forEach((plate, k) => (start[plate] = sincos(2 * (angles[k] ?? 0))));
    const summit = climbStack(task, start, moving);
    if (summit !== null) {
      found.push({ fastAxesRad: summit.axes.map(halfAngle), infidelity: summit.infidelity });
    }
  }
  return distinctSettings(found, SAME_OPTIMUM_RAD);
}

const LEAST_DAMPING = 1e-10;
const MOST_DAMPING = 1e4;

/** The summit of the fidelity that a climb from these angles ends on; null where it ends on a saddle. */
export function climbStack(
  task: StateTask,
  start: readonly CirclePoint[],
  moving: readonly number[],
): AxesSetting | null {
  let axes = start;
  let here = stackSlopes(task, axes, moving);
  let damping = 1e-3;
  for (let step = 0; step < 80; step += 1) {
    if (here.slope.every((value) => Math.abs(value) < 2e-16)) break;
    const hollow = here.bend.map((row) => row.map((value) => -value));
    const by = solveDamped(hollow, damping, here.slope);
    const next = by === null ? null : stepped(axes, moving, by);
    const there = next === null ? null : stackSlopes(task, next, moving);
    if (by === null || next === null || there === null || there.overlap < here.overlap - 4e-16) {
      if (damping > MOST_DAMPING) break;
      damping = Math.max(1e-2, 4 * damping);
      continue;
    }
    [axes, here] = [next, there];
    damping = Math.max(LEAST_DAMPING, damping / 16);
    if (by.every((value) => Math.abs(value) < 1e-15)) break;
  }
  const flat = here.bend.map((row) => row.map((value) => -value));
  if (solveDamped(flat, 1e-7, here.slope) === null) return null;
  return stackSetting(task, axes);
}

function stepped(
  axes: readonly CirclePoint[],
  moving: readonly number[],
  by: readonly number[],
): readonly CirclePoint[] {
  const next = [...axes];
  moving.forEach((plate, k) => {
    const axis = axes[plate];
    if (axis !== undefined) next[plate] = turned(axis, by[k] ?? 0);
  });
  return next;
}
