import { closestMeetings } from './closest';
import { EXACT_INFIDELITY } from './distinct-settings';
import { type AxesSetting, type StateTask, undone } from './state-task';
import { EIGHTHS, trigSize } from './trig-quadratic';
import {
  innerMaxima,
  type Meeting,
  meetingCondition,
  meetings,
  polish,
  type TwoPlates,
  twoPlates,
} from './two-plates';

/** Two plates with their roles for the elimination. */
export interface Pair {
  readonly plates: TwoPlates;
  /** Which of the two, in beam order, is searched for; the other is eliminated and follows. */
  readonly outer: 0 | 1;
}

/** Settings of a pair, unsorted and with repeats. */
export interface PairSettings {
  readonly found: readonly AxesSetting[];
  /** Whether they are members of a continuous family, for eight positions of the outer plate. */
  readonly family: boolean;
}

// A condition this small beside values of order 1 holds at every angle.
const ALWAYS = 1e-14;
const NO_PLATE = { sin: 0, cos: 1 };

/**
 * The elimination divides by sin and cos of half the retardance: eliminate the plate that is furthest from a half and a full
 * wave. Undoing the plates from the target's end swaps their roles.
 */
export function pairOf({ from, to, plates }: StateTask): Pair {
  const [first = NO_PLATE, second = NO_PLATE] = plates;
  return Math.abs(second.sin) >= Math.abs(first.sin)
    ? { plates: twoPlates(from, to, first, second), outer: 0 }
    : { plates: twoPlates(to, from, undone(second), undone(first)), outer: 1 };
}

/** Every setting that makes the target; none where it is out of reach. */
export function exactPair({ plates, outer }: Pair): PairSettings {
  const condition = meetingCondition(plates);
  const family = trigSize(condition) < ALWAYS;
  const found = family ? familyMembers(plates) : meetings(plates, condition);
  return {
    found: found
      .filter(({ infidelity }) => infidelity < EXACT_INFIDELITY)
      .map((meeting) => inBeamOrder(meeting, outer)),
    family,
  };
}

/** Every local optimum of the fidelity. */
export function closestPair({ plates, outer }: Pair): PairSettings {
  const { optima, family } = closestMeetings(plates);
  return { found: optima.map((meeting) => inBeamOrder(meeting, outer)), family };
}

function familyMembers(plates: TwoPlates): readonly Meeting[] {
  return EIGHTHS.flatMap((u) => innerMaxima(plates, u).map((v) => polish(plates, u, v)));
}

function inBeamOrder({ u, v, infidelity }: Meeting, outer: 0 | 1): AxesSetting {
  return { axes: outer === 0 ? [u, v] : [v, u], infidelity };
}
