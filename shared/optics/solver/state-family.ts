import { sincos } from '../elementary';
import { type Radians, radians, wrap } from '../units';
import { distinctSettings, halfAngle } from './distinct-settings';
import { onePlate } from './one-plate';
import { exactPair, pairOf } from './pair';
import type { Family, Setting } from './setting';
import { stackOptima } from './stack-optima';
import { stackSetting } from './stack-slopes';
import { type AxesSetting, type StateTask, windowTask } from './state-task';
import type { CirclePoint } from './trig-quadratic';

/** Neighbouring plates that follow when all others are chosen freely. */
export interface Window {
  readonly start: number;
  readonly count: 0 | 1 | 2;
}

/**
 * The settings of a stack in which the plates of a window follow and all others may be chosen. Members have 1 − F below
 * `limit`; with two plates in the window they make the target.
 */
export function windowFamily(task: StateTask, window: Window, limit: number): Family {
  const { start, count } = window;
  const freePlates = task.plates.map((_, k) => k).filter((k) => k < start || k >= start + count);
  return familyOf(task, freePlates, (axes) =>
    windowSettings(task, window, axes)
      .found.filter(({ infidelity }) => infidelity < limit)
      .map((setting) => ({ ...setting, axes: axes.map((axis, k) => setting.axes[k - start] ?? axis) })),
  );
}

/** The family of a ridge: `following` plates climb to their local optima, and what stays below `limit` is a member. */
export function ridgeFamily(task: StateTask, following: readonly number[], limit: number): Family {
  const freePlates = task.plates.map((_, k) => k).filter((k) => !following.includes(k));
  return {
    freePlates,
    membersAt: (angles) =>
      stackOptima(task, chosenAxes(task, freePlates, angles), following).filter(
        ({ infidelity }) => infidelity < limit,
      ),
  };
}

export interface WindowSettings {
  /** The plates of the window only. */
  readonly found: readonly AxesSetting[];
  /** Whether these stand for a continuum that the window has of its own. */
  readonly continuous: boolean;
}

/** What the plates of a window can do with the others at `axes`. */
export function windowSettings(
  task: StateTask,
  { start, count }: Window,
  axes: readonly CirclePoint[],
): WindowSettings {
  if (count === 0) {
    return { found: [{ axes: [], infidelity: stackSetting(task, axes).infidelity }], continuous: false };
  }
  const part = windowTask(task, start, count, axes);
  if (count === 1) {
    const { optima, flat } = onePlate(part);
    return { found: optima, continuous: flat };
  }
  const { found, family } = exactPair(pairOf(part));
  return { found, continuous: family };
}

/** Doubled angles of all plates of a stack; those that aren't in `freePlates` stand at H. */
export function chosenAxes(
  task: StateTask,
  freePlates: readonly number[],
  angles: readonly Radians[],
): readonly CirclePoint[] {
  const axes: CirclePoint[] = task.plates.map(() => ({ cos: 1, sin: 0 }));
  freePlates.forEach((plate, k) => (axes[plate] = sincos(2 * (angles[k] ?? 0))));
  return axes;
}

function familyOf(
  task: StateTask,
  freePlates: readonly number[],
  solve: (axes: readonly CirclePoint[]) => readonly AxesSetting[],
): Family {
  const membersAt = (angles: readonly Radians[]): readonly Setting[] => {
    const members = solve(chosenAxes(task, freePlates, angles)).map(({ axes, infidelity }): Setting => {
      const fastAxesRad = axes.map((axis, plate) => {
        const free = freePlates.indexOf(plate);
        // A chosen angle comes back as it was given, not through its sine and cosine.
        return free < 0 ? halfAngle(axis) : radians(wrap(angles[free] ?? 0, Math.PI));
      });
      return { fastAxesRad, infidelity };
    });
    return distinctSettings(members);
  };
  return { freePlates, membersAt };
}
