import { type CabinetMount, cabinetMountSchema } from '../../../../shared/schemas/mounts';
import type { EditDifference } from '../../../lib/forms';
import { differences } from '../plate-conflict';
import { type MountValues, valuesOfMount } from './mount-form-values';
import { approachNames, driveNames } from './mount-words';

/** The mount as the server holds it, out of a refusal; null when the refusal was another. */
export function mountConflict(current: unknown): CabinetMount | null {
  return cabinetMountSchema.safeParse(current).data ?? null;
}

const shown = (values: MountValues): readonly (readonly [field: string, value: string])[] => [
  ['name', values.name],
  ['drive', driveNames[values.drive]],
  ['numbers rise', values.direction === '1' ? 'counter-clockwise' : 'clockwise'],
  ['finest step, degrees', values.resolutionDeg],
  ['repeats within, degrees', values.repeatabilityDeg],
  ['range, degrees', `${values.rangeFromDeg} ${values.rangeToDeg}`.trim()],
  ['speed, degrees a second', values.drive === 'motor' ? values.speedDegPerS : ''],
  ['backlash, degrees', values.backlashDeg],
  ['approached', approachNames[values.approach] ?? values.approach],
  ['note', values.note],
];

/** Where what was typed differs from what the server holds, in words. */
export function mountDifferences(theirs: CabinetMount, yours: MountValues): readonly EditDifference[] {
  return differences(shown(valuesOfMount(theirs)), shown(yours));
}
