import { evaluateDials, type TargetProblem } from '../optics/solve-target';
import type { VersionContent } from '../schemas/versions';
import { targetPlates } from './solve-row';

/** The problem that a version froze for one of its targets: its own plates, not what the cabinet says today. */
export function frozenProblem(content: VersionContent, settingIndex: number): TargetProblem {
  const target = content.targets[settingIndex];
  if (target === undefined) throw new RangeError(`the version has no setting ${settingIndex}`);
  return {
    target: target.stokes,
    input: content.bench.input.stokes,
    polariserSigmaDeg: content.bench.input.polariserSigmaDeg,
    objective: content.objective,
    plates: targetPlates(content.bench.plates),
  };
}

/** 1 − F of what the dials really said, with the plates exactly as the version froze them. @throws RangeError for another number of dials. */
export function dialledInfidelity(
  content: VersionContent,
  settingIndex: number,
  dialledDeg: readonly number[],
): number {
  return evaluateDials(frozenProblem(content, settingIndex), dialledDeg).infidelity;
}
