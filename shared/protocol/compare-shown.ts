import type { ShownSolution } from '../schemas/protocols';
import type { VersionContent } from '../schemas/versions';
import type { FreezeFault } from './freeze';
import { rowName } from './row-name';

const reload =
  'A plate was calibrated, or the page is older than the server: reload it, look at the new numbers, then save.';

/**
 * Holds what a page showed against what is about to be frozen, number for number and without a tolerance: both come
 * from the same solver, so any difference means that the person agreed to something else.
 */
export function compareShown(
  content: VersionContent,
  shown: readonly ShownSolution[],
): readonly FreezeFault[] {
  const faults: FreezeFault[] = [];
  for (const [index, target] of content.targets.entries()) {
    const name = rowName(index, target.label);
    const place = shown.findIndex(({ targetId }) => targetId === target.id);
    const seen = shown[place];
    const solution = target.solutions[target.chosenSolution];
    if (seen === undefined || solution === undefined) {
      faults.push({
        path: `targets.${index}`,
        message: `${name} was not on the page that was saved. ${reload}`,
      });
      continue;
    }
    for (const [plate, { name: plateName }] of content.bench.plates.entries()) {
      if (
        seen.dialsDeg[plate] === solution.dialsDeg[plate] &&
        seen.fastAxesDeg[plate] === solution.fastAxesDeg[plate]
      ) {
        continue;
      }
      faults.push({
        path: `shown.${place}.dialsDeg.${plate}`,
        message: `${name}: ${plateName} was shown at ${seen.dialsDeg[plate] ?? 'no reading'} and solves to ${solution.dialsDeg[plate] ?? 'none'}. ${reload}`,
      });
    }
    if (
      seen.dialsDeg.length !== solution.dialsDeg.length ||
      seen.fastAxesDeg.length !== solution.fastAxesDeg.length ||
      seen.infidelity !== solution.infidelity ||
      seen.dialledInfidelity !== solution.dialledInfidelity
    ) {
      faults.push({
        path: `shown.${place}.infidelity`,
        message: `${name} was shown with 1 − F ${seen.dialledInfidelity} and solves to ${solution.dialledInfidelity}. ${reload}`,
      });
    }
  }
  const known = new Set(content.targets.map(({ id }) => id));
  for (const [place, { targetId }] of shown.entries()) {
    if (!known.has(targetId)) {
      faults.push({
        path: `shown.${place}.targetId`,
        message: `The page showed a row that the draft does not have. ${reload}`,
      });
    }
  }
  if (faults.length === 0 && shown.length !== content.targets.length) {
    faults.push({ path: 'shown', message: `The page showed a row twice. ${reload}` });
  }
  return faults;
}
