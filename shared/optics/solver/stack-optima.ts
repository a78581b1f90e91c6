import { sincos } from '../elementary';
import { distinctSettings, EXACT_INFIDELITY, halfAngle } from './distinct-settings';
import type { Setting } from './setting';
import { spreadAngles } from './spread-angles';
import { dot, stackSetting, stackSlopes } from './stack-slopes';
import type { AxesSetting, StateTask } from './state-task';
import { solveDamped } from './symmetric-matrix';
import type { CirclePoint } from './trig-quadratic';
import { turned } from './turned';

// Starting points for as many moving plates as the index: a fidelity is a trigonometric polynomial of degree 2 in each angle.
const STARTS = [1, 8, 48, 128, 160, 192, 224] as const;
// Where an optimum is blunt (a fourth power) climbs end this far apart; otherwise at the same 1e-15.
const SAME_OPTIMUM_RAD = 3e-5;

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
  for (const angles of spreadAngles(moving.length, STARTS[moving.length] ?? 224)) {
    const start = [...axes];
    moving.forEach((plate, k) => (start[plate] = sincos(2 * (angles[k] ?? 0))));
    const summit = climbStack(task, start, moving);
    if (summit !== null) {
      found.push({ fastAxesRad: summit.axes.map(halfAngle), infidelity: summit.infidelity });
    }
  }
  return distinctSettings(found, SAME_OPTIMUM_RAD);
}

const LEAST_DAMPING = 1e-12;
const MOST_DAMPING = 1e4;
const STEPS = 200;
// Overlaps differ by this from rounding alone.
const ROUNDING = 4e-16;
// A climb that ends on a steeper slope has run out of steps in a long narrow ridge; others end at its summit.
const LEVEL = 1e-10;

/** The summit of the fidelity that a climb from these angles ends on; null where it ends on a saddle. */
function climbStack(
  task: StateTask,
  start: readonly CirclePoint[],
  moving: readonly number[],
): AxesSetting | null {
  let axes = start;
  let here = stackSlopes(task, axes, moving);
  let damping = 1e-3;
  let stalled = 0;
  for (let step = 0; step < STEPS && damping < MOST_DAMPING; step += 1) {
    if (here.slope.every((value) => Math.abs(value) < 2e-16)) break;
    const hollow = here.bend.map((row) => row.map((value) => -value));
    const by = solveDamped(hollow, damping, here.slope);
    if (by === null) {
      damping = Math.max(1e-6, 4 * damping);
      continue;
    }
    const next = stepped(axes, moving, by);
    const there = stackSlopes(task, next, moving);
    const gain = there.overlap - here.overlap;
    if (gain < -ROUNDING) {
      damping = Math.max(1e-8, 6 * damping);
      continue;
    }
    const share = gain / promised(here.slope, by, damping);
    [axes, here] = [next, there];
    stalled = gain > ROUNDING ? 0 : stalled + 1;
    if (stalled > 4 || by.every((value) => Math.abs(value) < 1e-15)) break;
    if (share > 0.6 || Math.abs(gain) <= ROUNDING) damping = Math.max(LEAST_DAMPING, damping / 12);
    else if (share < 0.25) damping *= 3;
  }
  if (here.slope.some((value) => Math.abs(value) > LEVEL)) return null;
  const flat = here.bend.map((row) => row.map((value) => -value));
  if (solveDamped(flat, 1e-7, here.slope) === null) return null;
  const summit = stackSetting(task, axes);
  return summit.infidelity > EXACT_INFIDELITY && summit.infidelity < ALMOST
    ? meet(task, summit, moving)
    : summit;
}

// On the edge of reach the summit is blunt: 1 − F falls off with the fourth power, and its slope is lost in rounding from here.
const ALMOST = 1e-12;

// Gauss–Newton on p − t = 0, which halves the distance each step on the edge.
function meet(task: StateTask, start: AxesSetting, moving: readonly number[]): AxesSetting {
  let best = start;
  for (let step = 0; step < 30; step += 1) {
    const { moves, miss } = stackSlopes(task, best.axes, moving);
    const normal = moves.map((one) => moves.map((other) => dot(one, other)));
    const by = solveDamped(
      normal,
      1e-13,
      moves.map((move) => -dot(move, miss)),
    );
    if (by === null) break;
    const next = stackSetting(task, stepped(best.axes, moving, by));
    if (!(next.infidelity < best.infidelity)) break;
    best = next;
    if (best.infidelity < 1e-30) break;
  }
  return best;
}

// The gain of a step by the quadratic model: g·s − ½ s·A·s with (A + damping) s = g.
function promised(slope: readonly number[], by: readonly number[], damping: number): number {
  let sum = 0;
  by.forEach((step, k) => (sum += step * ((slope[k] ?? 0) + damping * step)));
  return sum / 2;
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
