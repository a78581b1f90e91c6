import type { Stokes } from '../stokes';
import { type Radians, radians } from '../units';
import { bestFirst, distinctSettings, EXACT_INFIDELITY, halfAngle } from './distinct-settings';
import { manyPlates, RIDGE_TOLERANCE } from './many-plates';
import { onePlate } from './one-plate';
import { closestPair, exactPair, pairOf } from './pair';
import type { Family, Setting, Solved } from './setting';
import { chosenAxes, windowFamily, windowSettings } from './state-family';
import { angleOfInfidelity, type AxesSetting, stateTask, type StateTask } from './state-task';

/** One to six plates in beam order, by their retardances, that are to take `input` to `target` (canonical frame). */
export interface PrepareProblem {
  readonly input: Stokes;
  readonly target: Stokes;
  readonly retardancesRad: readonly Radians[];
}

/** The most plates that the solver takes. */
export const MOST_PLATES = 6;

/**
 * Every setting of the plates for one target, without a random start: the same answer in the same order everywhere. One plate
 * is solved in closed form; of two, one is eliminated and all zeros of what remains are polished; of more, two follow and the
 * others are free. Where the target is out of reach the answer is every local optimum of the fidelity.
 * @throws RangeError for less than one or more than six plates, a zero Stokes vector or a retardance that isn't finite.
 */
export function prepare({ input, target, retardancesRad }: PrepareProblem): Solved {
  const task = stateTask(input, target, retardancesRad);
  const count = task.plates.length;
  if (count < 1 || count > MOST_PLATES) {
    throw new RangeError(`preparing a state takes one to ${MOST_PLATES} plates, got ${count}`);
  }
  if (count === 1) return prepareOne(task);
  return count === 2 ? prepareTwo(task) : manyPlates(task);
}

function prepareOne(task: StateTask): Solved {
  const { optima, flat } = onePlate(task);
  return solved(optima.map(setting), flat ? (limit) => windowFamily(task, NOTHING_FOLLOWS, limit) : null);
}

function prepareTwo(task: StateTask): Solved {
  const pair = pairOf(task);
  const exact = exactPair(pair);
  const { found, family } = exact.found.length > 0 ? exact : closestPair(pair);
  const window = { start: 1 - pair.outer, count: 1 } as const;
  return solved(
    found.map(setting),
    family
      ? (limit) => windowFamily(task, followerIsFree(task, pair.outer) ? NOTHING_FOLLOWS : window, limit)
      : null,
  );
}

const NOTHING_FOLLOWS = { start: 0, count: 0 } as const;

// Whether the other plate may stand anywhere too, wherever the outer one stands.
function followerIsFree(task: StateTask, outer: 0 | 1): boolean {
  return PROBES.every((angle) => {
    const axes = chosenAxes(task, [outer], [angle]);
    return windowSettings(task, { start: 1 - outer, count: 1 }, axes).continuous;
  });
}

// Two angles in general position.
const PROBES = [radians(0.4), radians(1.3)];

function setting({ axes, infidelity }: AxesSetting): Setting {
  return { fastAxesRad: axes.map(halfAngle), infidelity };
}

function solved(found: readonly Setting[], familyWithin: ((limit: number) => Family) | null): Solved {
  const exact = found.filter(({ infidelity }) => infidelity < EXACT_INFIDELITY);
  const reached = exact.length > 0;
  const sorted = distinctSettings(reached ? exact : found);
  const solutions = reached ? sorted : bestFirst(sorted);
  const best = solutions[0]?.infidelity ?? 1;
  const shortfallRad = reached ? radians(0) : angleOfInfidelity(best);
  if (familyWithin === null) {
    return { kind: reached ? 'exact' : 'nearest', solutions, shortfallRad, family: null };
  }
  const family = familyWithin(reached ? EXACT_INFIDELITY : best + RIDGE_TOLERANCE);
  return { kind: 'family', solutions, shortfallRad, family };
}
