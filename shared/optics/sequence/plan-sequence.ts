import { cheapestWay, finish } from './cheapest-way';
import { planOf, type SequencePlan } from './plan';
import type { SequenceProblem } from './problem';
import { courseSteps } from './stations';

/** How far a plan has come. */
export interface SequenceProgress {
  readonly rowsDone: number;
  readonly rows: number;
}

/**
 * The cheapest way through the targets in their order: which solution of each, and at which of its readings (a plate
 * is the same after half a turn). Exact: dynamic programming over all of them. Equal costs go to less travel, then to
 * solutions further up their lists.
 * @throws RangeError for a problem that makes no sense; UnreachableRowError for a target that can't be dialled,
 * TooManyStationsError for one that can be in too many ways.
 */
export function planSequence(problem: SequenceProblem): SequencePlan {
  return finish(planSequenceSteps(problem));
}

/** `planSequence` a row at a time, for whoever reports progress or does something else between rows. No row is done while they are laid out. */
export function* planSequenceSteps(problem: SequenceProblem): Generator<SequenceProgress, SequencePlan> {
  const rows = problem.rows.length;
  const laying = courseSteps(problem);
  let laid = laying.next();
  while (laid.done !== true) {
    yield { rowsDone: 0, rows };
    laid = laying.next();
  }
  const course = laid.value;
  const steps = cheapestWay(
    course,
    course.rows.map((_, k) => k),
  );
  for (;;) {
    const step = steps.next();
    if (step.done === true) return planOf(course, step.value.stations);
    yield { rowsDone: step.value, rows };
  }
}
