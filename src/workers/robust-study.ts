import type { Goal } from '../../shared/optics/goal';
import type { Retarder } from '../../shared/optics/retarder';
import {
  findRobustSteps,
  type RobustProblem,
  type RobustResult,
  robustnessOf,
} from '../../shared/optics/robust';
import { solveTarget, type TargetProblem } from '../../shared/optics/solve-target';
import { apply } from '../../shared/optics/solver/apply';
import { prepare } from '../../shared/optics/solver/prepare';
import type { Solved } from '../../shared/optics/solver/setting';
import { normaliseStokes } from '../../shared/optics/stokes';
import { type Degrees, type Radians, radians, toDegrees, toRadians } from '../../shared/optics/units';

/** Which composite settings are asked for, and what else is known of the plates. */
export interface RobustQuestion {
  readonly problem: Omit<RobustProblem, 'plain'>;
  /** The same plates as they stand at a bench, all of them in the beam; null where they are only typed. */
  readonly standing: TargetProblem | null;
}

/** The setting that nobody made to stand an error. */
export interface PlainChoice {
  /**
   * bench: the solution of all the plates that the designer puts first. fewest: as few of the plates as make the goal, the
   * ones among them that stand the error best.
   */
  readonly kind: 'bench' | 'fewest';
  /** Places of the plates in the beam, from 0; the others are left out. */
  readonly places: readonly number[];
  readonly plates: readonly Retarder[];
  readonly errorPerUnitRad: readonly number[];
  /** How far from the goal all the plates stay; 0 when it is reached. */
  readonly shortfallDeg: Degrees;
}

export interface RobustStudy {
  readonly found: RobustResult;
  readonly plain: PlainChoice;
}

type Erring = Pick<RobustProblem, 'goal' | 'retardancesRad' | 'errorPerUnitRad' | 'width'>;

function solve(goal: Goal, retardancesRad: readonly Radians[]): Solved {
  return goal.kind === 'apply'
    ? apply({ target: goal.target, retardancesRad })
    : prepare({
        input: normaliseStokes(goal.input),
        target: normaliseStokes(goal.target),
        retardancesRad,
      });
}

/** All ways to take `size` of `count` places, in beam order. */
function subsets(count: number, size: number, from = 0): readonly (readonly number[])[] {
  if (size === 0) return [[]];
  return Array.from({ length: count - from }, (_, k) => from + k).flatMap((first) =>
    subsets(count, size - 1, first + 1).map((rest) => [first, ...rest]),
  );
}

/**
 * As few of the plates as make the goal; of those the setting with the least average infidelity, so that the comparison
 * is fair. Where no number of them makes it: all plates, as near as they come.
 * @throws RangeError unless there are one to six plates with one slope each.
 */
export function fewestPlates(erring: Erring): PlainChoice {
  const count = erring.retardancesRad.length;
  for (let size = 1; size <= count; size += 1) {
    const choices = subsets(count, size).flatMap((places) => plainSettings(erring, places, size === count));
    const best = choices.reduce<Rated | null>(
      // Equal but for rounding is a tie, and the first stays.
      (least, next) => (least === null || next.average < least.average * (1 - 1e-9) ? next : least),
      null,
    );
    if (best !== null) return best.choice;
  }
  throw new RangeError('A plain setting takes one to six plates.');
}

interface Rated {
  readonly choice: PlainChoice;
  readonly average: number;
}

function plainSettings(
  { goal, retardancesRad, errorPerUnitRad, width }: Erring,
  places: readonly number[],
  evenShort: boolean,
): readonly Rated[] {
  const taken = places.flatMap((place) => retardancesRad[place] ?? []);
  const slopes = places.map((place) => errorPerUnitRad[place] ?? 0);
  const solved = solve(goal, taken);
  if (solved.shortfallRad > 0 && !evenShort) return [];
  return solved.solutions.map(({ fastAxesRad }) => {
    const plates = platesAt(taken, fastAxesRad);
    return {
      choice: {
        kind: 'fewest',
        places,
        plates,
        errorPerUnitRad: slopes,
        shortfallDeg: toDegrees(solved.shortfallRad),
      },
      average: robustnessOf(goal, plates, slopes, width).averageInfidelity,
    };
  });
}

function platesAt(retardancesRad: readonly Radians[], fastAxesRad: readonly Radians[]): readonly Retarder[] {
  return retardancesRad.map((retardanceRad, k) => ({
    retardanceRad,
    fastAxisRad: fastAxesRad[k] ?? radians(0),
  }));
}

function asSolvedAtBench({ retardancesRad, errorPerUnitRad }: Erring, standing: TargetProblem): PlainChoice {
  const { solutions, shortfallDeg } = solveTarget(standing);
  const fastAxesDeg = solutions[0]?.fastAxesDeg ?? [];
  return {
    kind: 'bench',
    places: retardancesRad.map((_, place) => place),
    plates: platesAt(retardancesRad, fastAxesDeg.map(toRadians)),
    errorPerUnitRad,
    shortfallDeg,
  };
}

// The plain setting is small beside the search.
const PLAIN_SHARE = 0.02;

/** The whole study, telling the share of it that is done. @throws RangeError as `findRobust`. */
export function* robustStudy({ problem, standing }: RobustQuestion): Generator<number, RobustStudy> {
  const plain = standing === null ? fewestPlates(problem) : asSolvedAtBench(problem, standing);
  yield PLAIN_SHARE;
  const steps = findRobustSteps({ ...problem, plain });
  for (;;) {
    const step = steps.next();
    if (step.done === true) return { found: step.value, plain };
    yield PLAIN_SHARE + (1 - PLAIN_SHARE) * (step.value.startsDone / step.value.starts);
  }
}
