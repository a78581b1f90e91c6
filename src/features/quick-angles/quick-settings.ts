import { type Convention, degrees, dialFromFastAxis, roundDial } from '../../../shared/optics';
import { evaluateDials, type SolvedTarget, type TargetProblem } from '../../../shared/optics/solve-target';
import { benchProblem, type SolvingBench, solveRow } from '../../../shared/protocol/solve-row';
import type { PlateKind } from '../../../shared/schemas/cabinet';
import { idealBench, idealTwin } from './ideal-plates';

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

interface Written {
  readonly expression: string;
  /** Of this state alone: a bench's input keeps the lab's. */
  readonly convention: Convention;
}

function idealInfidelity(
  { bench, kinds, convention }: QuickBench,
  written: Written,
  problem: TargetProblem,
): number | null {
  if (bench === idealBench) return null;
  const twin = idealTwin(bench, kinds);
  const read = twin === null ? null : benchProblem(twin, convention);
  if (read?.ok !== true) return null;
  const row = solveRow(written.expression, read.problem, written.convention);
  const ideal = row.status === 'solved' ? row.solved.solutions[0] : undefined;
  if (ideal === undefined) return null;
  const dialsDeg = problem.plates.map(({ scale }, k) =>
    roundDial(dialFromFastAxis(degrees(ideal.fastAxesDeg[k] ?? 0), scale), scale.resolutionDeg),
  );
  return evaluateDials(problem, dialsDeg).infidelity;
}

/** Every setting of a bench's plates for one written state; null where the state cannot be read, which its field says. */
export function quickSettings(written: Written, quick: QuickBench): QuickSettings | null {
  const { bench, convention } = quick;
  if (bench.plates.length !== 2) {
    return {
      ok: false,
      sentence: `This page works with two plates, and this bench has ${bench.plates.length}.`,
    };
  }
  const read = benchProblem(bench, convention);
  if (!read.ok) {
    return {
      ok: false,
      sentence: `The bench’s own input state cannot be read. Column ${read.error.column}: ${read.error.message}`,
    };
  }
  const row = solveRow(written.expression, read.problem, written.convention);
  if (row.status !== 'solved') return null;
  const problem = { ...read.problem, target: row.reading.stokes };
  return { ok: true, solved: row.solved, idealInfidelityHere: idealInfidelity(quick, written, problem) };
}
