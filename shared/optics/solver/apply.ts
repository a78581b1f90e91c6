import { asin } from '../elementary';
import type { Quaternion } from '../quaternion';
import { type Radians, radians, wrap } from '../units';
import { exactSettings } from './apply-exact';
import { asNearAs, familyOfMany, familiesOf, representatives, spreadMembers, widestOf } from './apply-family';
import { nearestSettings } from './apply-nearest';
import { polish } from './apply-newton';
import { type Candidate, EXACT_MISS, type Half, halfOf, settingOf } from './apply-stack';
import { bestFirst, distinctSettings } from './distinct-settings';
import type { Family, Setting, Solved } from './setting';

/** One to six plates in beam order, by their retardances, that are to be the unitary `target` up to its phase. */
export interface ApplyProblem {
  readonly target: Quaternion;
  readonly retardancesRad: readonly Radians[];
}

const MOST_PLATES = 6;
// sin of half the retardance of a plate that does nothing but for rounding.
const NOTHING = 1e-14;
// Optima this close are one: on a shallow summit the climb leaves some digits.
const SAME_OPTIMUM_RAD = 1e-6;
// Angles that differ by rounding are in no order; the next plate's decide.
const SAME_ANGLE_RAD = 2e-9;

/**
 * Every setting of a stack for one unitary, up to its phase. Three plates by a closed form (apply-exact.ts), polished; more
 * as a family, three neighbours following the others. Where the unitary is out of reach, the local optima. No random
 * start, so the same answer in the same order everywhere.
 * @throws RangeError unless there are 1 to 6 plates with finite retardances and the quaternion has a direction.
 */
export function apply({ target, retardancesRad }: ApplyProblem): Solved {
  const count = retardancesRad.length;
  if (!(count >= 1 && count <= MOST_PLATES)) throw new RangeError('a unitary is made with 1 to 6 plates');
  const halves = retardancesRad.map(halfOf);
  const wanted = normalised(target);
  const active = halves.map((_, k) => k).filter((k) => (halves[k]?.sin ?? 0) > NOTHING);
  const solved = solve(
    halves.filter(({ sin }) => sin > NOTHING),
    wanted,
  );
  return active.length === count ? solved : withIdle(solved, active, count);
}

function normalised({ w, x, y, z }: Quaternion): Quaternion {
  const length = Math.sqrt(w * w + x * x + y * y + z * z);
  if (!(length > 0) || length === Infinity)
    throw new RangeError('a quaternion of length 0 is no turn of the sphere');
  return { w: w / length, x: x / length, y: y / length, z: z / length };
}

function solve(halves: readonly Half[], target: Quaternion): Solved {
  if (halves.length > 3) {
    const family = familyOfMany(halves, target);
    if (family !== null) return reachedFamily(family, []);
    return nearest(halves, target);
  }
  const { candidates, suspects } = exactSettings(halves, target);
  if (candidates.length + suspects.length === 0) return nearest(halves, target);
  return reached(halves, target, candidates, suspects);
}

function reached(
  halves: readonly Half[],
  target: Quaternion,
  candidates: readonly Candidate[],
  suspects: readonly Candidate[],
  sameRad: number = SAME_ANGLE_RAD,
): Solved {
  const isolated = candidates.map(settingOf);
  // Three plates in general position have isolated settings, none found twice; fewer reach a target by chance or design.
  if (halves.length === 3 && suspects.length === 0) {
    return { kind: 'exact', solutions: isolated.sort(byAngles), shortfallRad: radians(0), family: null };
  }
  const families = widestOf(familiesOf(halves, target, suspects[0], EXACT_MISS), halves, target);
  const [family] = families;
  if (family !== undefined) {
    const solutions = distinctSettings([...representatives(families), ...isolated]);
    return { kind: 'family', solutions, shortfallRad: radians(0), family };
  }
  const solutions = distinctSettings([...isolated, ...suspects.map(settingOf)], sameRad);
  return { kind: 'exact', solutions, shortfallRad: radians(0), family: null };
}

function byAngles(one: Setting, other: Setting): number {
  for (let plate = 0; plate < one.fastAxesRad.length; plate += 1) {
    const difference = (one.fastAxesRad[plate] ?? 0) - (other.fastAxesRad[plate] ?? 0);
    if (Math.abs(difference) > SAME_ANGLE_RAD) return difference;
  }
  return 0;
}

function reachedFamily(family: Family, known: readonly Setting[]): Solved {
  const round = representatives([family]);
  const members = round.length > 0 ? round : spreadMembers(family);
  const solutions = members.length > 0 ? members : known;
  return { kind: 'family', solutions, shortfallRad: radians(0), family };
}

// Optima this near are polished as solutions: of a stack that hardly reaches its target some do make it.
const NEARLY_EXACT = 1e-12;

function nearest(halves: readonly Half[], target: Quaternion): Solved {
  const optima = nearestSettings(halves, target).map((found) =>
    found.miss < NEARLY_EXACT ? polish(halves, found.points, target) : found,
  );
  const best = optima.reduce<Candidate | undefined>(
    (least, found) => (least === undefined || found.miss < least.miss ? found : least),
    undefined,
  );
  const miss = best?.miss ?? 1;
  if (miss < EXACT_MISS) {
    const found = optima.filter((each) => each.miss < EXACT_MISS);
    return reached(halves, target, [], found, SAME_OPTIMUM_RAD);
  }
  const shortfallRad = radians(2 * asin(Math.sqrt(miss)));
  const families = familiesOf(halves, target, best, asNearAs(miss));
  const [family] = families;
  if (family !== undefined) {
    return { kind: 'family', solutions: bestFirst(representatives(families)), shortfallRad, family };
  }
  const solutions = bestFirst(distinctSettings(optima.map(settingOf), SAME_OPTIMUM_RAD));
  return { kind: 'nearest', solutions, shortfallRad, family: null };
}

/** The answer of the plates that do something, with the others free to stand anywhere and shown at H. */
function withIdle(solved: Solved, active: readonly number[], count: number): Solved {
  const idle = Array.from({ length: count }, (_, k) => k).filter((k) => !active.includes(k));
  const inner = solved.family;
  const freePlates = [...idle, ...(inner?.freePlates ?? []).map((k) => active[k] ?? 0)].sort((a, b) => a - b);
  const placed = (setting: Setting, angleOf: (plate: number) => Radians): Setting => ({
    fastAxesRad: Array.from({ length: count }, (_, plate) => {
      const k = active.indexOf(plate);
      return k < 0 ? angleOf(plate) : (setting.fastAxesRad[k] ?? radians(0));
    }),
    infidelity: setting.infidelity,
  });
  const membersAt = (angles: readonly Radians[]): readonly Setting[] => {
    const angleOf = (plate: number): Radians =>
      radians(wrap(angles[freePlates.indexOf(plate)] ?? NaN, Math.PI));
    const members =
      inner === null
        ? solved.solutions
        : inner.membersAt(inner.freePlates.map((k) => angleOf(active[k] ?? 0)));
    return members.map((member) => placed(member, angleOf));
  };
  return {
    kind: 'family',
    solutions: solved.solutions.map((setting) => placed(setting, () => radians(0))),
    shortfallRad: solved.shortfallRad,
    family: { freePlates, membersAt },
  };
}
