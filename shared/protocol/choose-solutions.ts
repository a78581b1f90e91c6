import {
  type MountMotion,
  planSequence,
  type SequencePlan,
  type SequenceProblem,
  UnreachableRowError,
} from '../optics/sequence';
import type { SettingSolution, SolvedTarget, TargetPlate } from '../optics/solve-target';
import { degrees, type Degrees, wrapSigned } from '../optics/units';
import type { RowProblem } from './solve-row';

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

/** The solution that stands for a row. */
export interface RowChoice {
  /** Its place among the row's solutions. */
  readonly index: number;
  readonly held: boolean;
  /** Of the two readings, half a turn apart, that give the same light: those that the objective prefers. */
  readonly dialsDeg: readonly Degrees[];
}

/** How far a held solution may have moved, in degrees of any one plate, and still count as the same branch. */
const heldToleranceDeg = 10;

/** The place of the held solution where its branch still exists, else null. */
export function heldIndex({ solved, heldFastAxesDeg }: ChoosingRow): number | null {
  if (heldFastAxesDeg === null) return null;
  const distances = solved.solutions.map(({ fastAxesDeg }) =>
    fastAxesDeg.reduce(
      (worst, angle, plate) =>
        Math.max(worst, Math.abs(wrapSigned(angle - (heldFastAxesDeg[plate] ?? Infinity), 180))),
      0,
    ),
  );
  const nearest = Math.min(...distances);
  return nearest <= heldToleranceDeg ? distances.indexOf(nearest) : null;
}

/** Which solution stands for one row alone: the held one, else the first as ranked. */
export function chooseSolution(row: ChoosingRow): RowChoice {
  const held = heldIndex(row);
  const index = held ?? 0;
  return { index, held: held !== null, dialsDeg: row.solved.solutions[index]?.dialsDeg ?? [] };
}

/**
 * Which solution stands for each row of a protocol. By the least travel, rows depend on one another: the whole list is
 * planned from the present dials. Otherwise each row is its own.
 */
export function chooseSolutions(
  rows: readonly ChoosingRow[],
  problem: Pick<RowProblem, 'objective' | 'plates' | 'presentDialsDeg'>,
): readonly RowChoice[] {
  const alone = rows.map(chooseSolution);
  if (problem.objective !== 'least-travel') return alone;
  const plan = planOrNothing({
    mounts: problem.plates.map(mountMotion),
    rows: rows.map((row, place) => ({
      branches: row.solved.solutions.map(({ fastAxesDeg }) => fastAxesDeg),
      held: alone[place]?.held === true ? alone[place].index : null,
    })),
    startDialsDeg: problem.presentDialsDeg,
    cost: 'travel',
    moves: 'one-by-one',
  });
  if (plan === null) return alone;
  return alone.map((choice, place) => ({
    ...choice,
    index: plan.choices[place] ?? choice.index,
    dialsDeg: plan.dialsDeg[place]?.map(degrees) ?? choice.dialsDeg,
  }));
}

/** Null where the play of a mount leaves it less than half a turn, so that some row has no way to its readings. */
function planOrNothing(problem: SequenceProblem): SequencePlan | null {
  try {
    return planSequence(problem);
  } catch (error) {
    if (error instanceof UnreachableRowError) return null;
    throw error;
  }
}

/** The solution of a choice, with the readings that were chosen for it. */
export function chosenSolution(solved: SolvedTarget, choice: RowChoice): SettingSolution | undefined {
  const solution = solved.solutions[choice.index];
  return solution === undefined ? undefined : { ...solution, dialsDeg: choice.dialsDeg };
}
