import { type Plate, plateSchema } from '../../../shared/schemas/cabinet';
import type { EditDifference } from '../../lib/forms';
import { type PlateValues, valuesOfPlate } from './plate-form-values';
import { approachNames, constructionNames, materialNames } from './plate-words';

/** The plate as the server holds it, out of a refusal; null when the refusal was another. */
export function plateConflict(current: unknown): Plate | null {
  const parsed = plateSchema.safeParse(current);
  return parsed.success ? parsed.data : null;
}

const shown = (values: PlateValues): readonly (readonly [field: string, value: string])[] => [
  ['name', values.name],
  ['kind', values.kind],
  ['made for, nm', values.designWavelengthNm],
  ['built as', constructionNames[values.construction] ?? values.construction],
  ['material', materialNames[values.material] ?? values.material],
  ['whole waves', values.construction === 'multi-order' ? values.order : '0'],
  ['mount', values.mount.name],
  ['numbers rise', values.mount.direction === '1' ? 'counter-clockwise' : 'clockwise'],
  ['finest step, degrees', values.mount.resolutionDeg],
  ['repeats within, degrees', values.mount.repeatabilityDeg],
  ['range, degrees', `${values.mount.rangeFromDeg} ${values.mount.rangeToDeg}`.trim()],
  ['speed, degrees a second', values.mount.speedDegPerS],
  ['backlash, degrees', values.mount.backlashDeg],
  ['approached', approachNames[values.mount.approach] ?? values.mount.approach],
  ['note', values.note],
];

/** Where what was typed differs from what the server holds, in words. */
export function plateDifferences(theirs: Plate, yours: PlateValues): readonly EditDifference[] {
  const stored = shown(valuesOfPlate(theirs));
  return shown(yours).flatMap(([field, value], index) => {
    const other = stored[index]?.[1] ?? '';
    return other === value ? [] : [{ field, theirs: other, yours: value }];
  });
}
