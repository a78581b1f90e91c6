import type { ImportChange, ImportPlan } from './import-plan';

/** How many changes of each kind there are. */
export function countChanges(plan: ImportPlan): Readonly<Record<ImportChange['kind'], number>> {
  const counts = {
    'mount-added': 0,
    'mount-changed': 0,
    'plate-added': 0,
    'plate-changed': 0,
    'seat-ended': 0,
    'seat-added': 0,
    'calibration-added': 0,
  };
  for (const { kind } of plan.changes) counts[kind] += 1;
  return counts;
}
