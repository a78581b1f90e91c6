import type { Convention } from '../optics/convention';
import type { DraftContent } from '../schemas/protocols';
import type { VersionContent } from '../schemas/versions';
import { sortedJson } from './canonical-json';
import { translateExpression } from './translate-expression';

/** Where a draft that begins from a version stands. */
interface DraftPlace {
  /** The draft as it is: its name and purpose stay. */
  readonly draft: DraftContent;
  readonly convention: Convention;
  /** Ids of the plates that prepare the light at the version's bench now, in beam order. */
  readonly plateIds: readonly string[];
}

/**
 * The draft that asks for what a version asked for: its targets, tolerance, bench and objective, in the lab's convention
 * of now. Angles that were held, and where dials stood, are kept only while the same plates stand in the same order.
 */
export function draftFromVersion(
  version: VersionContent,
  { draft, convention, plateIds }: DraftPlace,
): DraftContent {
  const sameBeam = version.bench.plates.map(({ id }) => id).join() === plateIds.join();
  return {
    name: draft.name,
    purpose: draft.purpose,
    kind: version.kind,
    benchId: version.bench.id,
    objective: version.objective,
    presentDialsDeg: sameBeam ? version.presentDialsDeg : null,
    toleranceInfidelity: version.toleranceInfidelity,
    targets: version.targets.map((target) => ({
      id: target.id,
      label: target.label,
      expression: translateExpression(target.expression, version.kind, version.convention, convention),
      heldFastAxesDeg:
        sameBeam && target.held ? (target.solutions[target.chosenSolution]?.fastAxesDeg ?? null) : null,
    })),
  };
}

/** Whether two drafts ask for the same, whatever they are called and whatever is held of them. */
export function sameIntent(a: DraftContent, b: DraftContent): boolean {
  return intent(a) === intent(b);
}

function intent({ kind, benchId, objective, toleranceInfidelity, targets }: DraftContent): string {
  return sortedJson({
    kind,
    benchId,
    objective,
    toleranceInfidelity,
    targets: targets.map(({ label, expression }) => ({ label: label.trim(), expression })),
  });
}
