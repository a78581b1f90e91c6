import { EXACT_INFIDELITY } from './distinct-settings';
import { spreadAngles } from './spread-angles';
import { chosenAxes, type Window, windowSettings } from './state-family';
import type { StateTask } from './state-task';

/** How much of a fixed set of the free plates' angles a window can answer. */
interface Reach {
  readonly window: Window;
  readonly positions: number;
  readonly members: number;
  /** Positions at which the window has a continuum of answers: it is larger than it need be. */
  readonly continua: number;
}

// Positions of the free plates at which windows are compared.
const POSITIONS = 16;

/**
 * The neighbouring plates that follow in a family that makes the target, or null where none does at any of the compared
 * positions. Of two plates: those with the most members, the first of equals. Where they have a continuum of their own one
 * plate is enough to follow, and where that may stand anywhere none is.
 */
export function familyWindow(task: StateTask): Window | null {
  const pairs = best(task, 2);
  if (pairs.positions > 0 && 2 * pairs.continua < pairs.positions) return pairs.window;
  const singles = best(task, 1);
  if (singles.positions > 0 && 2 * singles.positions >= pairs.positions) {
    return 2 * singles.continua < singles.positions ? singles.window : { start: 0, count: 0 };
  }
  return pairs.positions > 0 ? pairs.window : null;
}

function best(task: StateTask, count: 1 | 2): Reach {
  let most: Reach = { window: { start: 0, count }, positions: 0, members: 0, continua: 0 };
  for (let start = 0; start + count <= task.plates.length; start += 1) {
    const reach = reachOf(task, { start, count });
    // A continuum anywhere settles the dimension of the whole, whichever window shows it.
    const larger = reach.continua !== most.continua ? reach.continua > most.continua : more(reach, most);
    if (larger) most = reach;
  }
  return most;
}

function more(one: Reach, other: Reach): boolean {
  return one.members !== other.members ? one.members > other.members : one.positions > other.positions;
}

function reachOf(task: StateTask, window: Window): Reach {
  const { start, count } = window;
  const freePlates = task.plates.map((_, k) => k).filter((k) => k < start || k >= start + count);
  let [positions, members, continua] = [0, 0, 0];
  for (const angles of spreadAngles(freePlates.length, POSITIONS)) {
    const { found, continuous } = windowSettings(task, window, chosenAxes(task, freePlates, angles));
    const exact = found.filter(({ infidelity }) => infidelity < EXACT_INFIDELITY).length;
    if (exact === 0) continue;
    positions += 1;
    members += exact;
    if (continuous) continua += 1;
  }
  return { window, positions, members, continua };
}
