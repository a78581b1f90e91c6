import {
  type Dialled,
  evaluateDials,
  platesAtDials,
  statesBehind,
  type TargetPlate,
} from '../../../../shared/optics/solve-target';
import { type BudgetProblem } from '../../../../shared/optics/budget';
import { settingBudget } from '../../../../shared/optics/solve-target';
import type { Convention } from '../../../../shared/optics/convention';
import type { Stokes } from '../../../../shared/optics/stokes';
import { fastAxisFromDial } from '../../../../shared/optics/dial';
import { degrees } from '../../../../shared/optics/units';
import {
  benchProblem,
  type RowReading,
  rowGoal,
  type SolvingTask,
} from '../../../../shared/protocol/solve-row';
import { type OpenQuestionRisk, risksOf } from '../../../../shared/protocol/open-question-risk';
import { dialScaleOf, targetPlates } from '../../../../shared/protocol/solving-plates';
import type { Plate } from '../../../../shared/schemas/cabinet';
import type { Bench } from '../../../../shared/schemas/benches';
import type { DraftContent } from '../../../../shared/schemas/protocols';
import type { RowView } from './row-view';

interface Standing {
  readonly bench: Bench;
  /** The light before the first plate. */
  readonly input: Stokes;
  readonly reading: RowReading;
  readonly dialsDeg: readonly number[];
}

/** What the bench makes with its dials standing so, how far that is from the row's target, and some light on its way. */
export function standingAt({
  bench,
  input,
  reading,
  dialsDeg,
}: Standing): Dialled & { readonly statesAfter: readonly Stokes[]; readonly output: Stokes } {
  const plates: readonly TargetPlate[] = targetPlates(bench.plates, bench);
  const statesAfter = statesBehind(input, platesAtDials(plates, dialsDeg));
  const dialled = evaluateDials({ goal: rowGoal(reading, input), plates }, dialsDeg);
  return { ...dialled, statesAfter, output: statesAfter.at(-1) ?? input };
}

/** The open questions of the bench's plates that the rows shown depend on; none where the bench's own input can't be read. */
export function rowRisks(
  bench: Bench,
  convention: Convention,
  content: DraftContent,
  views: readonly RowView[],
): OpenQuestionRisk[] {
  const read = benchProblem(bench, convention, content);
  if (!read.ok) return [];
  const rows = views.flatMap((view, place) =>
    view.status !== 'solved' || view.solution.dialsDeg.length !== bench.plates.length
      ? []
      : [
          {
            label: content.targets[place]?.label ?? '',
            problem: {
              ...read.problem,
              goal: rowGoal(view.reading, read.problem.input),
              heldFastAxesDeg: null,
            },
            dialsDeg: view.solution.dialsDeg,
          },
        ],
  );
  return risksOf(rows, bench.plates, content.toleranceInfidelity);
}

/** The error budget's problem of some table angles of a bench; null where the bench's own input can't be read. */
export function rowBudget(
  bench: Bench,
  convention: Convention,
  task: SolvingTask,
  reading: RowReading,
  fastAxesDeg: readonly number[],
): BudgetProblem | null {
  const read = benchProblem(bench, convention, task);
  if (!read.ok) return null;
  const goal = rowGoal(reading, read.problem.input);
  return settingBudget({ ...read.problem, goal, heldFastAxesDeg: null }, fastAxesDeg);
}

/** Where the fast axis stands when the dial says this: what the table and the stage both show beside a dial. */
export function dialledAxisDeg(plate: Plate, dialDeg: number): number {
  return fastAxisFromDial(degrees(dialDeg), dialScaleOf(plate));
}
