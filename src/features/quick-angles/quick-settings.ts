import { type Convention, DEFAULT_CONVENTION } from '../../../shared/optics/convention';
import { dialFor } from '../../../shared/optics/dial';
import { analyserGoal, type Goal } from '../../../shared/optics/goal';
import {
  evaluateDials,
  type SolvedTarget,
  solveTarget,
  type TargetProblem,
} from '../../../shared/optics/solve-target';
import { STOKES_H } from '../../../shared/optics/stokes';
import { degrees } from '../../../shared/optics/units';
import {
  benchProblem,
  readRow,
  rowGoal,
  type RowReading,
  type SolvingBench,
  type SolvingTask,
} from '../../../shared/protocol/solve-row';
import type { PlateKind } from '../../../shared/schemas/cabinet';
import { idealPlatesFor, idealTwin } from './ideal-plates';
import type { Question } from './question';

export type QuickSettings =
  | { readonly ok: false; readonly sentence: string }
  | {
      readonly ok: true;
      readonly solved: SolvedTarget;
      /**
       * 1 − F that the best angles for exact plates of the same kinds would give on this bench; null on exact plates
       * themselves, and where a plate's kind does not say what an exact one would be.
       */
      readonly idealInfidelityHere: number | null;
    };

/** Plates to work with: the bench, what kinds its plates are, and the convention that its own input is written in. */
export interface QuickBench {
  readonly bench: SolvingBench;
  readonly kinds: readonly PlateKind[];
  readonly convention: Convention;
}

/** What is typed, and what the plates are to do about it. */
export interface Written {
  readonly question: Question;
  readonly expression: string;
  /** Of this expression alone: a bench's input keeps the lab's. */
  readonly convention: Convention;
}

/** What is written, as its question wants it: a unitary to apply, else a state. */
export function readQuick({ question, expression, convention }: Written): ReturnType<typeof readRow> {
  return readRow(expression, question === 'apply' ? 'apply' : 'prepare', convention);
}

const task: SolvingTask = {
  kind: 'prepare',
  objective: 'least-expected-infidelity',
  presentDialsDeg: null,
};

function problemOn(
  bench: SolvingBench,
  convention: Convention,
  question: Question,
  reading: RowReading,
): TargetProblem | { readonly fault: string } {
  const read = benchProblem(question === 'analyse' ? beforeAnalyser(bench) : bench, convention, task);
  if (!read.ok) return { fault: `Column ${read.error.column}: ${read.error.message}` };
  const goal: Goal =
    question === 'analyse' && reading.kind === 'state'
      ? analyserGoal(reading.stokes, STOKES_H)
      : rowGoal(reading, read.problem.input);
  return { ...read.problem, goal, heldFastAxesDeg: null };
}

/** A bench knows the polariser that makes its input and none behind its plates: the analyser is taken as exact. */
function beforeAnalyser(bench: SolvingBench): SolvingBench {
  return { ...bench, inputExpression: 'H', polariserSigmaDeg: 0, polariserExtinction: null };
}

function idealInfidelity(
  { bench, kinds, convention }: QuickBench,
  question: Question,
  reading: RowReading,
  problem: TargetProblem,
): number | null {
  const twin = idealTwin(bench, kinds);
  if (twin === null) return null;
  const exact = problemOn(twin, convention, question, reading);
  const ideal = 'fault' in exact ? undefined : solveTarget(exact).solutions[0];
  if (ideal === undefined) return null;
  const dialsDeg = problem.plates.map(({ scale }, k) =>
    dialFor(degrees(ideal.fastAxesDeg[k] ?? 0), scale, null),
  );
  return evaluateDials(problem, dialsDeg).infidelity;
}

/**
 * Every setting of a bench's plates for what is written, of exact plates where `quick` is null; null where what is written
 * cannot be read, which its field says.
 */
export function quickSettings(written: Written, quick: QuickBench | null): QuickSettings | null {
  const { question } = written;
  const read = readQuick(written);
  if (!read.ok) return null;
  const problem = problemOn(
    quick?.bench ?? idealPlatesFor(question),
    quick?.convention ?? DEFAULT_CONVENTION,
    question,
    read.reading,
  );
  if ('fault' in problem) {
    return { ok: false, sentence: `The bench’s own input state cannot be read. ${problem.fault}` };
  }
  return {
    ok: true,
    solved: solveTarget(problem),
    idealInfidelityHere: quick === null ? null : idealInfidelity(quick, question, read.reading, problem),
  };
}
