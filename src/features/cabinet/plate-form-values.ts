import type { CabinetPlate, UpdatePlate } from '../../../shared/schemas/cabinet';
import { readOptionalNumber, readTypedNumber, typedFromNumber, typedFromOptional } from '../../lib/forms';

/** What a plate is, as it is typed. */
export interface PlateValues {
  readonly name: string;
  readonly kind: UpdatePlate['kind'];
  readonly designWavelengthNm: string;
  readonly construction: UpdatePlate['construction'];
  /** '' is another, or not known. */
  readonly material: string;
  readonly order: string;
  readonly serial: string;
  /** '' where nobody knows it. */
  readonly clearApertureMm: string;
  /** Both '' for a plate whose coating nobody knows. */
  readonly coatingFromNm: string;
  readonly coatingToNm: string;
  readonly damageNote: string;
  readonly note: string;
}

export const emptyPlate: PlateValues = {
  name: '',
  kind: 'half',
  designWavelengthNm: '',
  construction: 'unknown',
  material: '',
  order: '0',
  serial: '',
  clearApertureMm: '',
  coatingFromNm: '',
  coatingToNm: '',
  damageNote: '',
  note: '',
};

export function valuesOfPlate(plate: CabinetPlate): PlateValues {
  return {
    name: plate.name,
    kind: plate.kind,
    designWavelengthNm: typedFromNumber(plate.designWavelengthNm),
    construction: plate.construction,
    material: plate.material ?? '',
    order: typedFromNumber(plate.order),
    serial: plate.serial,
    clearApertureMm: typedFromOptional(plate.clearApertureMm),
    coatingFromNm: typedFromOptional(plate.coatingNm?.from ?? null),
    coatingToNm: typedFromOptional(plate.coatingNm?.to ?? null),
    damageNote: plate.damageNote,
    note: plate.note,
  };
}

/** What a request's schema is held against. */
export function readPlate(values: PlateValues) {
  return {
    name: values.name,
    kind: values.kind,
    designWavelengthNm: readTypedNumber(values.designWavelengthNm),
    construction: values.construction,
    material: values.material === '' ? null : values.material,
    // The field is hidden for every other plate, whatever was written in it before.
    order: values.construction === 'multi-order' ? readTypedNumber(values.order) : 0,
    serial: values.serial,
    clearApertureMm: readOptionalNumber(values.clearApertureMm),
    coatingNm: readCoating(values),
    damageNote: values.damageNote,
    note: values.note,
  };
}

function readCoating({ coatingFromNm, coatingToNm }: PlateValues) {
  if (coatingFromNm.trim() === '' && coatingToNm.trim() === '') return null;
  return { from: readTypedNumber(coatingFromNm), to: readTypedNumber(coatingToNm) };
}

/** Where the form has another name for a part of a plate. */
export function plateFieldOf(path: string): 'coatingFromNm' | 'coatingToNm' | null {
  if (path === 'coatingNm.from') return 'coatingFromNm';
  return path === 'coatingNm.to' || path === 'coatingNm' ? 'coatingToNm' : null;
}
