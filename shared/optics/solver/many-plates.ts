import { type Radians, radians } from '../units';
import { bestFirst, distinctSettings, EXACT_INFIDELITY } from './distinct-settings';
import { familyWindow } from './family-window';
import type { Family, Setting, Solved } from './setting';
import { roundAngles, spreadAngles } from './spread-angles';
import { stackOptima } from './stack-optima';
import { stackSlopes } from './stack-slopes';
import { chosenAxes, ridgeFamily, windowFamily } from './state-family';
import { angleOfInfidelity, type StateTask } from './state-task';
import { independentRows } from './symmetric-matrix';

/** Representatives of a family are cut at this many, all members of one position or none. */
const REPRESENTATIVES = 16;
/** What 1 − F may differ by along a ridge. */
export const RIDGE_TOLERANCE = 1e-12;
// Second derivatives below this are a direction in which the fidelity doesn't change.
const NO_BEND = 1e-6;

/**
 * Three plates and more. Where they reach the target the answer is a family: two neighbouring plates (fewer where the target is
 * degenerate) follow, and the others are free. Where they don't, it is every local optimum that a climb from a fixed set of
 * starts finds, or a family where the best of them is a ridge.
 */
export function manyPlates(task: StateTask): Solved {
  const window = familyWindow(task);
  if (window !== null) {
    const family = windowFamily(task, window, EXACT_INFIDELITY);
    const solutions = representatives(family);
    if (solutions.length > 0) return { kind: 'family', solutions, shortfallRad: radians(0), family };
  }
  return closestStack(task);
}

function closestStack(task: StateTask): Solved {
  const everyPlate = task.plates.map((_, k) => k);
  const optima = bestFirst(stackOptima(task, chosenAxes(task, [], []), everyPlate));
  const [best] = optima;
  if (best === undefined) throw new Error('a continuous function on a closed surface has a maximum');
  const reached = best.infidelity < EXACT_INFIDELITY;
  const shortfallRad = reached ? radians(0) : angleOfInfidelity(best.infidelity);
  const limit = reached ? EXACT_INFIDELITY : best.infidelity + RIDGE_TOLERANCE;
  const asGood = optima.filter(({ infidelity }) => infidelity < limit);
  const family = ridgeThrough(task, best, limit);
  if (family !== null) {
    const listed = representatives(family);
    const solutions = listed.length > 0 ? listed : distinctSettings(asGood.slice(0, REPRESENTATIVES));
    return { kind: 'family', solutions, shortfallRad, family };
  }
  if (reached) return { kind: 'exact', solutions: distinctSettings(asGood), shortfallRad, family: null };
  return { kind: 'nearest', solutions: optima, shortfallRad, family: null };
}

// The fourth power of this is far above the tolerance of a ridge.
const ASIDE_RAD = 0.03;

// The family of the ridge that an optimum lies on; null where it stands alone.
function ridgeThrough(task: StateTask, { fastAxesRad }: Setting, limit: number): Family | null {
  const everyPlate = task.plates.map((_, k) => k);
  const { bend } = stackSlopes(task, chosenAxes(task, everyPlate, fastAxesRad), everyPlate);
  const following = independentRows(
    bend.map((row) => row.map((value) => -value)),
    NO_BEND,
  );
  if (following.length === everyPlate.length) return null;
  const family = ridgeFamily(task, following, limit);
  const held = family.freePlates.map((plate) => fastAxesRad[plate] ?? radians(0));
  // A blunt summit has no bend either, but no neighbours that are as good.
  const goesOn = [ASIDE_RAD, -ASIDE_RAD].some((aside) => {
    const [first = radians(0), ...others] = held;
    return family.membersAt([radians(first + aside), ...others]).length > 0;
  });
  return goesOn ? family : null;
}

/** Members at round angles of the free plates; where there are none, at some of the compared positions. */
export function representatives(family: Family): readonly Setting[] {
  const round = membersAtAll(family, roundAngles(family.freePlates.length));
  return round.length > 0
    ? round
    : membersAtAll(family, spreadAngles(family.freePlates.length, REPRESENTATIVES));
}

function membersAtAll(family: Family, positions: readonly (readonly Radians[])[]): readonly Setting[] {
  const listed: Setting[] = [];
  for (const position of positions) {
    const members = family.membersAt(position);
    if (listed.length > 0 && listed.length + members.length > REPRESENTATIVES) break;
    listed.push(...members);
  }
  return distinctSettings(listed.slice(0, REPRESENTATIVES));
}
