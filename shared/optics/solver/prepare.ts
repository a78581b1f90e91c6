import { asin, atan2, sincos } from '../elementary';
import { normaliseStokes, type Stokes } from '../stokes';
import { type Radians, radians, wrap } from '../units';
import { closestMeetings } from './closest';
import { type CirclePoint, EIGHTHS, trigSize } from './trig-quadratic';
import {
  innerMaxima,
  type Meeting,
  meetingCondition,
  meetings,
  polish,
  type TwoPlates,
  twoPlates,
} from './two-plates';

/** Two plates in beam order, by their retardances, that are to take `input` to `target`. */
export interface PrepareProblem {
  readonly input: Stokes;
  readonly target: Stokes;
  readonly retardancesRad: readonly [Radians, Radians];
}

export interface PreparedSetting {
  /** In beam order, each in [0, π). */
  readonly fastAxesRad: readonly [Radians, Radians];
  /** 1 − F of these angles, meaningful down to 1e-32. */
  readonly infidelity: number;
}

export interface Preparation {
  /**
   * exact: every setting makes the target. nearest: the target is out of reach and the settings are all local optima.
   * family: the settings stand for a continuous family, exact where `shortfallRad` is 0 and nearest otherwise.
   */
  readonly kind: 'exact' | 'nearest' | 'family';
  /** Best first, then by angles. */
  readonly solutions: readonly PreparedSetting[];
  /** Angle on the sphere from the target to the closest reachable state; 0 when exact. */
  readonly shortfallRad: Radians;
  /** In a family: the plate (0 or 1, beam order) that may stand anywhere, with the other to match. */
  readonly freePlate: 0 | 1 | null;
}

// A condition this small beside values of order 1 holds at every angle.
const ALWAYS = 1e-14;
/** 1 − F below which a member of a family makes the target, as for a single meeting. */
const EXACT_INFIDELITY = 2.5e-25;
// Two solutions closer than this in both angles are one: a tenth of a microdegree.
const SAME_ANGLE_RAD = 2e-9;

/**
 * Every setting of two plates for one target: a closed elimination of one plate, all zeros of what remains, and Newton
 * in both angles. No random start, so the same answer in the same order everywhere.
 * @throws RangeError for a zero Stokes vector or a retardance that isn't finite.
 */
export function prepare({ input, target, retardancesRad }: PrepareProblem): Preparation {
  const from = normaliseStokes(input);
  const to = normaliseStokes(target);
  const first = sincos(retardancesRad[0]);
  const second = sincos(retardancesRad[1]);
  // The elimination divides by sin and cos of half the retardance: eliminate the plate that is furthest from a half
  // and a full wave. Undoing the plates from the target's end swaps their roles.
  const firstIsOuter = Math.abs(second.sin) >= Math.abs(first.sin);
  const plates = firstIsOuter
    ? twoPlates(from, to, first, second)
    : twoPlates(to, from, { cos: second.cos, sin: -second.sin }, { cos: first.cos, sin: -first.sin });
  const inBeamOrder = ({ u, v, infidelity }: Meeting): PreparedSetting => ({
    fastAxesRad: firstIsOuter ? [halfAngle(u), halfAngle(v)] : [halfAngle(v), halfAngle(u)],
    infidelity,
  });
  const outerPlate = firstIsOuter ? 0 : 1;

  const condition = meetingCondition(plates);
  if (trigSize(condition) < ALWAYS) {
    const members = familyMembers(plates);
    if (members.length > 0) return preparation('family', members.map(inBeamOrder), outerPlate, true);
  } else {
    const found = meetings(plates, condition);
    if (found.length > 0) return preparation('exact', found.map(inBeamOrder), null, true);
  }
  const { optima, family } = closestMeetings(plates);
  const settings = optima.map(inBeamOrder);
  const reached = settings.some(({ infidelity }) => infidelity < EXACT_INFIDELITY);
  if (family) return preparation('family', settings, outerPlate, reached);
  return preparation(reached ? 'exact' : 'nearest', settings, null, reached);
}

function familyMembers(plates: TwoPlates): readonly Meeting[] {
  return EIGHTHS.flatMap((u) => innerMaxima(plates, u).map((v) => polish(plates, u, v))).filter(
    ({ infidelity }) => infidelity < EXACT_INFIDELITY,
  );
}

function preparation(
  kind: Preparation['kind'],
  found: readonly PreparedSetting[],
  freePlate: 0 | 1 | null,
  exact: boolean,
): Preparation {
  const kept = exact ? found.filter(({ infidelity }) => infidelity < EXACT_INFIDELITY) : found;
  const solutions = distinct([...kept].sort(byAngles));
  if (!exact) solutions.sort((a, b) => comparedInfidelity(a, b) || byAngles(a, b));
  const best = solutions[0]?.infidelity ?? 1;
  const shortfallRad = radians(exact ? 0 : 2 * asin(Math.sqrt(best)));
  return { kind, solutions, shortfallRad, freePlate };
}

// Optima that are equal by symmetry differ in the last bits; their order is then that of their angles.
function comparedInfidelity(a: PreparedSetting, b: PreparedSetting): number {
  const difference = a.infidelity - b.infidelity;
  return Math.abs(difference) <= 1e-12 * Math.max(a.infidelity, b.infidelity) ? 0 : difference;
}

function byAngles(a: PreparedSetting, b: PreparedSetting): number {
  const first = a.fastAxesRad[0] - b.fastAxesRad[0];
  return Math.abs(first) > SAME_ANGLE_RAD ? first : a.fastAxesRad[1] - b.fastAxesRad[1];
}

function distinct(sorted: readonly PreparedSetting[]): PreparedSetting[] {
  const kept: PreparedSetting[] = [];
  for (const setting of sorted) {
    const twin = kept.findIndex((other) => sameAngles(other, setting));
    const held = kept[twin];
    if (held === undefined) kept.push(setting);
    else if (setting.infidelity < held.infidelity) kept[twin] = setting;
  }
  return kept;
}

function sameAngles(a: PreparedSetting, b: PreparedSetting): boolean {
  return [0, 1].every((plate) => {
    const apart = wrap((a.fastAxesRad[plate] ?? 0) - (b.fastAxesRad[plate] ?? 0), Math.PI);
    return Math.min(apart, Math.PI - apart) < SAME_ANGLE_RAD;
  });
}

/** The plate's angle in [0, π) from the doubled one; a hair below π is a hair below 0, and is 0. */
function halfAngle({ cos, sin }: CirclePoint): Radians {
  const angle = wrap(atan2(sin, cos) / 2, Math.PI);
  return radians(Math.PI - angle < 1e-14 ? 0 : angle);
}
