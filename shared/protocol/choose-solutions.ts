import {
  finish,
  type MountMotion,
  planSequenceSteps,
  type SequencePlan,
  type SequenceProblem,
  TooManyStationsError,
  UnreachableRowError,
} from '../optics/sequence';
import {
  evaluateDials,
  type SettingSolution,
  type SolvedTarget,
  type TargetPlate,
} from '../optics/solve-target';
import { degrees, type Degrees, wrapSigned } from '../optics/units';
import { rowGoal, type RowProblem, type RowReading } from './solve-row';

/** A plate's mount as a sequence moves it. */
export function mountMotion({ scale, motion }: TargetPlate): MountMotion {
  const { rangeDeg } = scale;
  return { ...scale, ...motion, rangeDeg: rangeDeg === null ? null : [rangeDeg.from, rangeDeg.to] };
}

/** A row that is solved, and what a person holds of it. */
export interface ChoosingRow {
  readonly solved: SolvedTarget;
  readonly heldFastAxesDeg: readonly number[] | null;
}

/** A row among others. */
interface PlanningRow extends ChoosingRow {
  readonly reading: RowReading;
}

/** The solution that stands for a row. */
export interface RowChoice {
  /** Its place among the row's solutions. */
  readonly index: number;
  readonly held: boolean;
  /** Of the readings, half a turn apart, that stand for the same axes: those that the objective prefers. */
  readonly dialsDeg: readonly Degrees[];
  /** 1 − F of these very readings: half a turn on, a dial may be rounded to the other side. */
  readonly dialledInfidelity: number;
}

/** Why rows could not be planned together. */
export interface Unplanned {
  /** Place of the row that it fails at. */
  readonly row: number;
  /** The plate whose mount does not reach the row, in beam order; null where there are too many ways to dial it. */
  readonly plate: number | null;
}

export interface Choices {
  /** One for each row. Where no plan can be made: what stands for each row alone. */
  readonly choices: readonly RowChoice[];
  readonly unplanned: Unplanned | null;
}

/** How far a held solution may have moved, in degrees of any one plate, and still count as the same branch. */
const heldToleranceDeg = 10;

/** The place of the held solution where its branch still exists, else null. */
export function heldIndex({ solved, heldFastAxesDeg }: ChoosingRow): number | null {
  if (heldFastAxesDeg === null) return null;
  const distances = solved.solutions.map(({ fastAxesDeg }) =>
    // Held before a plate came or went, it is no setting of these plates.
    fastAxesDeg.length === heldFastAxesDeg.length
      ? fastAxesDeg.reduce(
          (worst, angle, plate) =>
            Math.max(worst, Math.abs(wrapSigned(angle - (heldFastAxesDeg[plate] ?? Infinity), 180))),
          0,
        )
      : Infinity,
  );
  const nearest = Math.min(...distances);
  return nearest <= heldToleranceDeg ? distances.indexOf(nearest) : null;
}

/** Which solution stands for one row alone: the held one, else the first as ranked. */
export function chooseSolution(row: ChoosingRow): RowChoice {
  const held = heldIndex(row);
  const index = held ?? 0;
  const solution = row.solved.solutions[index];
  if (solution === undefined) throw new RangeError('a solved row has at least one solution');
  const { dialsDeg, dialledInfidelity } = solution;
  return { index, held: held !== null, dialsDeg, dialledInfidelity };
}

/** What the choice depends on besides the rows. */
type ChoosingProblem = Pick<RowProblem, 'objective' | 'plates' | 'presentDialsDeg' | 'input'>;

/**
 * Which solution stands for each row of a protocol. By the least travel, rows depend on one another: the whole list is
 * planned from the present dials. Otherwise each row is its own.
 */
export function chooseSolutions(rows: readonly PlanningRow[], problem: ChoosingProblem): Choices {
  return finish(chooseSolutionsSteps(rows, problem));
}

/** `chooseSolutions` a row at a time, for a server that answers others between two rows. */
export function* chooseSolutionsSteps(
  rows: readonly PlanningRow[],
  problem: ChoosingProblem,
): Generator<undefined, Choices> {
  const alone = rows.map(chooseSolution);
  if (problem.objective !== 'least-travel') return { choices: alone, unplanned: null };
  const planned = yield* planOrReason({
    mounts: problem.plates.map(mountMotion),
    rows: rows.map((row, place) => ({
      branches: row.solved.solutions.map(({ fastAxesDeg }) => fastAxesDeg),
      held: alone[place]?.held === true ? alone[place].index : null,
    })),
    startDialsDeg: problem.presentDialsDeg,
    cost: 'travel',
    moves: 'one-by-one',
  });
  if ('row' in planned) return { choices: alone, unplanned: planned };
  const choices = rows.map(({ reading }, place) => {
    const dialsDeg = planned.dialsDeg[place]?.map(degrees) ?? [];
    const standing = { goal: rowGoal(reading, problem.input), plates: problem.plates };
    return {
      index: planned.choices[place] ?? 0,
      held: alone[place]?.held === true,
      dialsDeg,
      dialledInfidelity: evaluateDials(standing, dialsDeg).infidelity,
    };
  });
  return { choices, unplanned: null };
}

function* planOrReason(problem: SequenceProblem): Generator<undefined, SequencePlan | Unplanned> {
  try {
    const steps = planSequenceSteps(problem);
    for (;;) {
      const step = steps.next();
      if (step.done === true) return step.value;
      yield;
    }
  } catch (error) {
    // The play of a mount can leave it less than half a turn.
    if (error instanceof UnreachableRowError) return { row: error.row, plate: error.mount };
    if (error instanceof TooManyStationsError) return { row: error.row, plate: null };
    throw error;
  }
}

/** One sentence on why there is no plan, and what can be done, for the row and the plate by these names. */
export function whyUnplanned(name: string, plateName: string | null): string {
  return plateName === null
    ? `${name} can be dialled in too many ways for the least travel to be planned. Hold one of its solutions, or choose another objective.`
    : `${name} cannot be planned by the least travel: with its play taken up, the mount of ${plateName} does not reach it. Hold another of its solutions, choose another objective, or widen the mount’s range.`;
}

/** The solution of a choice, with the readings that were chosen for it and what they make. */
export function chosenSolution(solved: SolvedTarget, choice: RowChoice): SettingSolution | undefined {
  const solution = solved.solutions[choice.index];
  if (solution === undefined) return undefined;
  const { dialsDeg, dialledInfidelity } = choice;
  return { ...solution, dialsDeg, dialledInfidelity };
}
