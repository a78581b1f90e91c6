import type { Quaternion } from '../quaternion';
import { type Radians, radians, wrap } from '../units';
import { exactSettings } from './apply-exact';
import { nearestSettings } from './apply-nearest';
import { outerSettings } from './apply-outer';
import { ridgeFamily } from './apply-ridge';
import {
  type Candidate,
  candidateAt,
  EXACT_MISS,
  type Half,
  pointOf,
  settingOf,
  targetWithin,
} from './apply-stack';
import { distinctSettings, settingsApart } from './distinct-settings';
import type { Family, Setting } from './setting';
import { roundAngles, spreadAngles } from './spread-angles';

/** Neighbouring plates that follow when all others are chosen. */
export interface Window {
  readonly start: number;
  readonly count: number;
}

/**
 * The settings in which the window's plates follow all others, with sin²(ε/2) below `limit`: the exact ones where the limit
 * is that of an exact setting, else the optima.
 */
export function windowFamily(
  halves: readonly Half[],
  target: Quaternion,
  window: Window,
  limit: number,
): Family {
  const { start, count } = window;
  const end = start + count;
  const freePlates = halves.map((_, k) => k).filter((k) => k < start || k >= end);
  const membersAt = (angles: readonly Radians[]): readonly Setting[] => {
    const chosen = new Map(freePlates.map((plate, k) => [plate, radians(wrap(angles[k] ?? NaN, Math.PI))]));
    const points = halves.map((_, plate) => pointOf(chosen.get(plate) ?? radians(0)));
    const rest = targetWithin(
      target,
      [halves.slice(0, start), points.slice(0, start)],
      [halves.slice(end), points.slice(end)],
    );
    const members = windowSettings(halves.slice(start, end), rest, limit).map((found): Setting => {
      const { fastAxesRad, infidelity } = settingOf(found);
      return {
        // A chosen angle comes back as it was given, not through its sine and cosine.
        fastAxesRad: halves.map((_, k) => chosen.get(k) ?? fastAxesRad[k - start] ?? radians(0)),
        infidelity,
      };
    });
    return distinctSettings(members);
  };
  return { freePlates, membersAt };
}

function windowSettings(halves: readonly Half[], rest: Quaternion, limit: number): readonly Candidate[] {
  if (limit > EXACT_MISS) return nearestSettings(halves, rest).filter(({ miss }) => miss < limit);
  const { candidates, suspects } = exactSettings(halves, rest);
  return [...candidates, ...suspects];
}

/** sin²(ε/2) of what is as near as `best`, but for rounding. */
export function asNearAs(best: number): number {
  const root = Math.sqrt(best) + 1e-12;
  return root * root;
}

// Positions of the free plates at all of which a family must have members: none is a round angle.
const TRIED = 5;

function isEverywhere({ freePlates, membersAt }: Family): boolean {
  return spreadAngles(freePlates.length, TRIED).every((angles) => membersAt(angles).length > 0);
}

/**
 * The families that run through a stack's settings whatever the free plates' angles, with as few following plates as will do:
 * more than one where different plates may be the free ones. Neighbours follow, up to three; of four plates or more any may,
 * along the ridge on which `best` lies. [] where the settings are isolated.
 */
export function familiesOf(
  halves: readonly Half[],
  target: Quaternion,
  best: Candidate | undefined,
  limit: number,
): readonly Family[] {
  for (let count = 0; count < Math.min(halves.length, 4); count += 1) {
    const families: Family[] = [];
    for (let start = halves.length - count; start >= 0; start -= 1) {
      const family = windowFamily(halves, target, { start, count }, limit);
      if (isEverywhere(family)) families.push(family);
      if (count === 0) break;
    }
    if (families.length > 0) return families;
  }
  if (halves.length <= 3 || best === undefined) return [];
  const ridge = ridgeFamily(halves, target, best, limit);
  return ridge !== null && isEverywhere(ridge) ? [ridge] : [];
}

/**
 * Of three plates' families, one that holds them all: where the first plate's and the last plate's hold different settings
 * (two of equal plates crossed, either the first two or the last two), the middle plate's holds both.
 */
export function widestOf(
  families: readonly Family[],
  halves: readonly Half[],
  target: Quaternion,
): readonly Family[] {
  const [main, ...others] = families;
  const [first, second, third] = halves;
  if (main?.freePlates.length !== 1 || first === undefined || second === undefined || third === undefined)
    return families;
  const apart = others.some((other) =>
    spreadAngles(1, TRIED).some((angles) => other.membersAt(angles).some((member) => !holds(main, member))),
  );
  if (!apart) return families;
  const membersAt = ([angle = radians(NaN)]: readonly Radians[]): readonly Setting[] => {
    const chosen = radians(wrap(angle, Math.PI));
    const found = outerSettings([first, second, third], pointOf(chosen), target);
    return distinctSettings(
      found.map(settingOf).map(({ fastAxesRad: [a, , c], infidelity }) => ({
        fastAxesRad: [a ?? chosen, chosen, c ?? chosen],
        infidelity,
      })),
    );
  };
  const middle: Family = { freePlates: [1], membersAt };
  return isEverywhere(middle) ? [middle, ...families] : families;
}

const MOST = 16;

/**
 * Members with the free plates at round angles: at most 16 of those positions' members in turn, and of a further family
 * only what the first does not hold. By angles.
 */
export function representatives(families: readonly Family[]): readonly Setting[] {
  const [main, ...others] = families;
  if (main === undefined) return [];
  const lists = positionsOf(main).map((angles) => main.membersAt(angles));
  for (const other of others) {
    for (const angles of positionsOf(other)) {
      lists.push(other.membersAt(angles).filter((member) => !holds(main, member)));
    }
  }
  return distinctSettings(inTurn(lists));
}

function positionsOf({ freePlates }: Family): readonly (readonly Radians[])[] {
  return roundAngles(freePlates.length);
}

function holds(family: Family, { fastAxesRad }: Setting): boolean {
  const angles = family.freePlates.map((plate) => fastAxesRad[plate] ?? radians(0));
  return family.membersAt(angles).some((member) => settingsApart(member.fastAxesRad, fastAxesRad) < 1e-7);
}

function inTurn(lists: readonly (readonly Setting[])[]): readonly Setting[] {
  const taken: Setting[] = [];
  const longest = Math.max(0, ...lists.map((list) => list.length));
  for (let rank = 0; rank < longest; rank += 1) {
    for (const list of lists) {
      const member = list[rank];
      if (member !== undefined && taken.length < MOST) taken.push(member);
    }
  }
  return taken;
}

// Positions of the free plates at which windows are compared.
const COMPARED = 16;

/**
 * The family of four plates or more: three neighbours follow all others. Where the target is one of those for which fewer
 * follow (half-wave plates side by side), the ridge on which a member lies. Null where there is no member at any position.
 */
export function familyOfMany(halves: readonly Half[], target: Quaternion): Family | null {
  let best: Family | null = null;
  let most: readonly Setting[] = [];
  for (let start = 0; start + 3 <= halves.length; start += 1) {
    const family = windowFamily(halves, target, { start, count: 3 }, EXACT_MISS);
    const members = spreadAngles(halves.length - 3, COMPARED).flatMap((angles) => family.membersAt(angles));
    if (members.length > most.length) [most, best] = [members, family];
  }
  const [member] = most;
  if (member === undefined) return null;
  const found = candidateAt(halves, member.fastAxesRad.map(pointOf), target);
  const ridge = ridgeFamily(halves, target, found, EXACT_MISS);
  const wider = ridge !== null && ridge.freePlates.length > halves.length - 3 && isEverywhere(ridge);
  return wider ? ridge : best;
}

/** Members at the compared positions, for a family that has none at round angles. */
export function spreadMembers({ freePlates, membersAt }: Family): readonly Setting[] {
  return distinctSettings(
    inTurn(spreadAngles(freePlates.length, COMPARED).map((angles) => membersAt(angles))),
  );
}
