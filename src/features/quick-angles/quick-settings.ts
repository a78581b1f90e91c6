import { type Convention, degrees, dialFromFastAxis, roundDial } from '../../../shared/optics';
import { evaluateDials, type SettingSolution, type SolvedTarget } from '../../../shared/optics/solve-target';
import { benchProblem, type SolvingBench, solveRow } from '../../../shared/protocol/solve-row';
import { idealBench } from './ideal-plates';

export type QuickSettings =
  | { readonly ok: false; readonly sentence: string }
  | {
      readonly ok: true;
      readonly solved: SolvedTarget;
      /** 1 − F that the best angles for ideal plates would give on this bench; null on ideal plates themselves. */
      readonly idealInfidelityHere: number | null;
    };

function idealAngles(expression: string, convention: Convention): SettingSolution | undefined {
  const read = benchProblem(idealBench, convention);
  if (!read.ok) return undefined;
  const row = solveRow(expression, read.problem, convention);
  return row.status === 'solved' ? row.solved.solutions[0] : undefined;
}

/** Every setting of a bench's plates for one written state; null where the state cannot be read, which its field says. */
export function quickSettings(
  expression: string,
  bench: SolvingBench,
  convention: Convention,
): QuickSettings | null {
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
  const row = solveRow(expression, read.problem, convention);
  if (row.status !== 'solved') return null;
  if (bench === idealBench) return { ok: true, solved: row.solved, idealInfidelityHere: null };
  const ideal = idealAngles(expression, convention);
  if (ideal === undefined) return { ok: true, solved: row.solved, idealInfidelityHere: null };
  const problem = { ...read.problem, target: row.reading.stokes };
  const dialsDeg = problem.plates.map(({ scale }, k) =>
    roundDial(dialFromFastAxis(degrees(ideal.fastAxesDeg[k] ?? 0), scale), scale.resolutionDeg),
  );
  return { ok: true, solved: row.solved, idealInfidelityHere: evaluateDials(problem, dialsDeg).infidelity };
}
