import { type CabinetPlate, cabinetPlateSchema } from '../../../shared/schemas/cabinet';
import type { EditDifference } from '../../lib/forms';
import { type PlateValues, valuesOfPlate } from './plate-form-values';
import { constructionNames, kindNames, materialNames } from './plate-words';

/** The plate as the server holds it, out of a refusal; null when the refusal was another. */
export function plateConflict(current: unknown): CabinetPlate | null {
  return cabinetPlateSchema.safeParse(current).data ?? null;
}

const shown = (values: PlateValues): readonly (readonly [field: string, value: string])[] => [
  ['name', values.name],
  ['kind', kindNames[values.kind]],
  ['made for, nm', values.designWavelengthNm],
  ['built as', constructionNames[values.construction] ?? values.construction],
  ['material', materialNames[values.material] ?? values.material],
  ['whole waves', values.construction === 'multi-order' ? values.order : '0'],
  ['serial number', values.serial],
  ['clear aperture, mm', values.clearApertureMm],
  ['coated for, nm', `${values.coatingFromNm} ${values.coatingToNm}`.trim()],
  ['damage', values.damageNote],
  ['note', values.note],
];

/** Where what was typed differs from what the server holds, in words. */
export function plateDifferences(theirs: CabinetPlate, yours: PlateValues): readonly EditDifference[] {
  return differences(shown(valuesOfPlate(theirs)), shown(yours));
}

/** Fields in the same order on both sides. */
export function differences(
  theirs: readonly (readonly [field: string, value: string])[],
  yours: readonly (readonly [field: string, value: string])[],
): readonly EditDifference[] {
  return yours.flatMap(([field, value], index) => {
    const other = theirs[index]?.[1] ?? '';
    return other === value ? [] : [{ field, theirs: other, yours: value }];
  });
}
