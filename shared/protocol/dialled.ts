import type { BudgetProblem } from '../optics/budget';
import { fastAxisFromDial } from '../optics/dial';
import type { Goal } from '../optics/goal';
import { evaluateDials, settingBudget, type TargetProblem } from '../optics/solve-target';
import { degrees } from '../optics/units';
import type { VersionContent } from '../schemas/versions';
import { targetPlate } from './solving-plates';

/** The problem that a version froze for one of its targets: its own plates, not what the cabinet says today. */
export function frozenProblem(content: VersionContent, settingIndex: number): TargetProblem {
  const target = content.targets[settingIndex];
  if (target === undefined) throw new RangeError(`the version has no setting ${settingIndex}`);
  const { bench, objective, presentDialsDeg } = content;
  return {
    goal: frozenGoal(content, target.goal),
    plates: bench.plates.map((plate) => targetPlate(plate, plate.used)),
    polariserSigmaDeg: bench.input.polariserSigmaDeg,
    polariserExtinction: bench.input.polariserExtinction,
    wavelengthSigmaNm: bench.wavelengthSigmaNm,
    temperatureSigmaK: bench.temperatureSigmaK,
    objective,
    presentDialsDeg,
    heldFastAxesDeg: null,
  };
}

/** The error budget's problem of one of a version's settings with its dials standing so. */
export function frozenBudget(
  content: VersionContent,
  settingIndex: number,
  dialsDeg: readonly number[],
): BudgetProblem {
  const problem = frozenProblem(content, settingIndex);
  return settingBudget(
    problem,
    problem.plates.map(({ scale }, k) => fastAxisFromDial(degrees(dialsDeg[k] ?? 0), scale)),
  );
}

function frozenGoal(content: VersionContent, goal: VersionContent['targets'][number]['goal']): Goal {
  if (goal.kind === 'state') {
    return { kind: 'prepare', input: content.bench.input.stokes, target: goal.stokes };
  }
  const [w, x, y, z] = goal.quaternion;
  return { kind: 'apply', target: { w, x, y, z } };
}

/** 1 − F of what the dials really said, with the plates exactly as the version froze them. @throws RangeError for another number of dials. */
export function dialledInfidelity(
  content: VersionContent,
  settingIndex: number,
  dialledDeg: readonly number[],
): number {
  return evaluateDials(frozenProblem(content, settingIndex), dialledDeg).infidelity;
}
