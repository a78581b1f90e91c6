import { evaluateDials, type TargetProblem } from '../optics/solve-target';
import type { Calibration, OpenQuestion } from '../schemas/calibrations';
import type { VersionContent } from '../schemas/versions';
import { frozenProblem } from './dialled';

/** What it would cost if an open question of a plate's calibration were answered the other way. */
export interface OpenQuestionRisk {
  readonly plateName: string;
  readonly question: OpenQuestion;
  /** The target that would suffer most, and its 1 − F with the dials as they are. */
  readonly worst: { readonly label: string; readonly infidelity: number };
  /** Targets that would leave the tolerance. */
  readonly lostCount: number;
}

/** A blind retardance is tried this many σ away to either side. */
const BLIND_SIGMAS = 2;

/** A row with the dials that are to be turned for it. */
export interface DialledRow {
  readonly label: string;
  readonly problem: TargetProblem;
  readonly dialsDeg: readonly number[];
}

/** What of a plate says which of its questions are open; in beam order, as the rows' problems have them. */
export interface QuestionedPlate {
  readonly name: string;
  readonly calibration: Pick<Calibration, 'openQuestions' | 'retardanceSigmaDeg'>;
}

/**
 * The open questions that a result depends on: those whose other answer would take a row out of tolerance.
 * Fast or slow, and δ or 360° − δ, are physically one question (a slow axis at θ is a fast one at θ + 90°, and a plate
 * of 360° − δ is one of δ turned by 90°), so that one plate is named once for both.
 */
export function risksOf(
  rows: readonly DialledRow[],
  plates: readonly QuestionedPlate[],
  toleranceInfidelity: number,
): OpenQuestionRisk[] {
  return plates.flatMap(({ name, calibration }, index) => {
    const question = asked(calibration.openQuestions);
    if (question === null) return [];
    const others =
      question === 'blind'
        ? [-1, 1].map((side) => side * BLIND_SIGMAS * calibration.retardanceSigmaDeg)
        : [null];
    const costs = rows.map(({ label, problem, dialsDeg }) => {
      const tried = others.map((shiftDeg) => evaluateDials(otherwise(problem, index, shiftDeg), dialsDeg));
      return { label, infidelity: Math.max(...tried.map(({ infidelity }) => infidelity)) };
    });
    const lost = costs.filter(({ infidelity }) => infidelity > toleranceInfidelity);
    const [first, ...rest] = lost;
    if (first === undefined) return [];
    const worst = rest.reduce((most, cost) => (cost.infidelity > most.infidelity ? cost : most), first);
    return [{ plateName: name, question, worst, lostCount: lost.length }];
  });
}

/** The same of a version, with its chosen solutions. */
export function openQuestionRisks(content: VersionContent): OpenQuestionRisk[] {
  const rows = content.targets.map((target, row) => ({
    label: target.label,
    problem: frozenProblem(content, row),
    dialsDeg: target.solutions[target.chosenSolution]?.dialsDeg ?? [],
  }));
  return risksOf(rows, content.bench.plates, content.toleranceInfidelity);
}

function asked(questions: readonly OpenQuestion[]): OpenQuestion | null {
  if (questions.includes('axis')) return 'axis';
  if (questions.includes('branch')) return 'branch';
  return questions.includes('blind') ? 'blind' : null;
}

/** The same problem with one plate as it may be instead: its axes swapped, or its retardance shifted by so much. */
function otherwise(problem: TargetProblem, index: number, shiftDeg: number | null): TargetProblem {
  return {
    ...problem,
    plates: problem.plates.map((plate, k) => {
      if (k !== index) return plate;
      return shiftDeg === null
        ? { ...plate, scale: { ...plate.scale, offsetDeg: plate.scale.offsetDeg + 90 } }
        : { ...plate, retardanceDeg: plate.retardanceDeg + shiftDeg };
    }),
  };
}
