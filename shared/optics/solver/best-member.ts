import { type Radians, radians } from '../units';
import { settingsApart, turnBetween } from './distinct-settings';
import { lineMinimum } from './line-minimum';
import type { Family, Setting } from './setting';
import { roundAngles, spreadAngles } from './spread-angles';

interface Priced {
  readonly setting: Setting;
  readonly cost: number;
}

/** What a member costs; it must depend on the setting alone, and is called some hundreds of times. */
export type Cost = (setting: Setting) => number;

const POSITIONS = 36;
const TOLERANCE_RAD = 1e-6;
// Members further apart than this, in any plate, at neighbouring positions are of different branches.
const SAME_BRANCH_RAD = 0.5;
// Local minima on the grid that are refined, the most promising first.
const REFINED = 6;

/**
 * The member of a family that costs least, the same one each time. One free plate: all branches at 36 positions, then line
 * minima along the branches from the best of them. More: descent along one free plate after the other, and along what a round
 * of them has moved, from a fixed set of starts. Null where the family has no member at any of these positions.
 */
export function bestMember(family: Family, cost: Cost): Setting | null {
  const starts = family.freePlates.length === 1 ? minimaOfOne(family, cost) : startsOfMany(family, cost);
  let best: Priced | null = null;
  for (const start of starts.slice(0, REFINED)) {
    const end =
      family.freePlates.length === 1 ? refineOne(family, cost, start) : descend(family, cost, start);
    if (best === null || end.cost < best.cost) best = end;
  }
  return best?.setting ?? null;
}

/** The member whose free plates stand as in the given angles and whose other plates are nearest to them. */
export function memberNear(family: Family, fastAxesRad: readonly Radians[]): Setting | null {
  return nearestOf(family.membersAt(freeAngles(family, fastAxesRad)), fastAxesRad);
}

function nearestOf(members: readonly Setting[], fastAxesRad: readonly Radians[]): Setting | null {
  let nearest: Setting | null = null;
  let least = Infinity;
  for (const member of members) {
    let sum = 0;
    member.fastAxesRad.forEach((angle, k) => {
      const apart = turnBetween(angle, fastAxesRad[k] ?? angle);
      sum += apart * apart;
    });
    if (sum < least) [nearest, least] = [member, sum];
  }
  return nearest;
}

function freeAngles({ freePlates }: Family, fastAxesRad: readonly Radians[]): readonly Radians[] {
  return freePlates.map((plate) => fastAxesRad[plate] ?? radians(0));
}

function priced(members: readonly Setting[], cost: Cost): readonly Priced[] {
  return members.map((setting) => ({ setting, cost: known(cost(setting)) }));
}

// A cost that isn't a number never wins.
function known(cost: number): number {
  return cost < Infinity ? cost : Infinity;
}

// Two infinite costs are equal, not apart by NaN.
function rising(a: number, b: number): number {
  return a === b ? 0 : a - b;
}

function cheapestFirst(members: readonly Priced[]): readonly Priced[] {
  return [...members].sort((a, b) => rising(a.cost, b.cost));
}

// Members on a grid that neither neighbour on their branch undercuts, in the order of what the parabola through the three promises.
function minimaOfOne(family: Family, cost: Cost): readonly Priced[] {
  const slices = Array.from({ length: POSITIONS }, (_, k) =>
    priced(family.membersAt([radians((k * Math.PI) / POSITIONS)]), cost),
  );
  const minima = slices.flatMap((slice, k) =>
    slice.flatMap((member) => {
      const ahead = followerCost(member, slices[(k + 1) % POSITIONS]);
      const behind = followerCost(member, slices[(k + POSITIONS - 1) % POSITIONS]);
      if (ahead < member.cost || behind < member.cost) return [];
      return [{ member, promise: lowestOfParabola(behind, member.cost, ahead) }];
    }),
  );
  return minima.sort((a, b) => rising(a.promise, b.promise)).map(({ member }) => member);
}

function followerCost({ setting }: Priced, slice: readonly Priced[] = []): number {
  let cost = Infinity;
  let nearest: number = SAME_BRANCH_RAD;
  for (const other of slice) {
    const apart = settingsApart(other.setting.fastAxesRad, setting.fastAxesRad);
    if (apart < nearest) [nearest, cost] = [apart, other.cost];
  }
  return cost;
}

// Three values at equal distances, the middle one least; an open end is as good as level.
function lowestOfParabola(left: number, middle: number, right: number): number {
  if (left === Infinity || right === Infinity) return middle;
  const bend = left - 2 * middle + right;
  return bend > 0 ? middle - ((right - left) * (right - left)) / (8 * bend) : middle;
}

function refineOne(family: Family, cost: Cost, start: Priced): Priced {
  const step = Math.PI / POSITIONS;
  return alongLine(family, cost, start, [1], step);
}

// The cheapest members of a fixed spread, no two of them close together.
function startsOfMany(family: Family, cost: Cost): readonly Priced[] {
  const count = family.freePlates.length;
  const positions = [...roundAngles(count), ...spreadAngles(count, SPREAD)];
  const starts: Priced[] = [];
  for (const member of cheapestFirst(positions.flatMap((angles) => priced(family.membersAt(angles), cost)))) {
    const { fastAxesRad } = member.setting;
    const near = starts.some(
      ({ setting }) => settingsApart(setting.fastAxesRad, fastAxesRad) < SAME_BRANCH_RAD,
    );
    if (!near) starts.push(member);
    if (starts.length === REFINED) break;
  }
  return starts;
}

const SPREAD = 120;
const ROUNDS = 20;
const SCAN = 12;
// A round that gains less than this share has arrived.
const GAIN = 1e-7;

function descend(family: Family, cost: Cost, start: Priced): Priced {
  const count = family.freePlates.length;
  let here = start;
  for (let round = 0; round < ROUNDS; round += 1) {
    const before = here;
    for (let plate = 0; plate < count; plate += 1) {
      const direction = Array.from({ length: count }, (_, k) => (k === plate ? 1 : 0));
      // Every branch all round the circle, while that still finds a better one.
      const scanned = round < 3 ? scan(family, cost, here, plate) : here;
      here = alongLine(family, cost, scanned, direction, Math.PI / SCAN);
    }
    here = alongLine(family, cost, here, movedBy(family, before, here), 2);
    if (!(before.cost - here.cost > GAIN * Math.abs(before.cost))) break;
  }
  return here;
}

function scan(family: Family, cost: Cost, start: Priced, plate: number): Priced {
  const origin = freeAngles(family, start.setting.fastAxesRad);
  let best = start;
  for (let k = 0; k < SCAN; k += 1) {
    const turn = (k * Math.PI) / SCAN;
    const angles = origin.map((angle, each) => (each === plate ? radians(angle + turn) : angle));
    for (const member of priced(family.membersAt(angles), cost)) {
      if (member.cost < best.cost) best = member;
    }
  }
  return best;
}

// How far the free plates went, each in (−π/2, π/2].
function movedBy(family: Family, before: Priced, after: Priced): readonly number[] {
  return family.freePlates.map((plate) => {
    const by = (after.setting.fastAxesRad[plate] ?? 0) - (before.setting.fastAxesRad[plate] ?? 0);
    return by > Math.PI / 2 ? by - Math.PI : by <= -Math.PI / 2 ? by + Math.PI : by;
  });
}

/** The least cost on the branch of `start` when its free plates move by ±reach times `direction`. */
function alongLine(
  family: Family,
  cost: Cost,
  start: Priced,
  direction: readonly number[],
  reach: number,
): Priced {
  const longest = direction.reduce((most, part) => Math.max(most, Math.abs(part)), 0);
  if (!(longest > TOLERANCE_RAD)) return start;
  const origin = freeAngles(family, start.setting.fastAxesRad);
  let best = start;
  const valueAt = (at: number): number => {
    const angles = origin.map((angle, k) => radians(angle + at * (direction[k] ?? 0)));
    const follower = nearestOf(family.membersAt(angles), best.setting.fastAxesRad);
    if (follower === null || leap(family, follower, best.setting) > SAME_BRANCH_RAD) return Infinity;
    const value = known(cost(follower));
    if (value < best.cost) best = { setting: follower, cost: value };
    return value;
  };
  lineMinimum(valueAt, { at: 0, value: start.cost }, [-reach, reach], TOLERANCE_RAD / longest);
  return best;
}

// How far the plates that follow are from another member's.
function leap({ freePlates }: Family, one: Setting, other: Setting): number {
  let largest = 0;
  one.fastAxesRad.forEach((angle, k) => {
    if (!freePlates.includes(k))
      largest = Math.max(largest, turnBetween(angle, other.fastAxesRad[k] ?? angle));
  });
  return largest;
}
