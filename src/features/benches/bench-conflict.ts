import { type Bench, benchSchema } from '../../../shared/schemas/benches';
import type { Plate } from '../../../shared/schemas/cabinet';
import type { EditDifference } from '../../lib/forms';
import { type BenchValues, valuesOfBench } from './bench-form-values';

/** The bench as the server holds it, out of a refusal; null when the refusal was another. */
export function benchConflict(current: unknown): Bench | null {
  const parsed = benchSchema.safeParse(current);
  return parsed.success ? parsed.data : null;
}

const fieldNames: Readonly<Record<keyof BenchValues, string>> = {
  name: 'name',
  wavelengthNm: 'wavelength, nm',
  inputExpression: 'state behind the polariser',
  polariserSigmaDeg: 'σ of the polariser’s angle, degrees',
  laserClass: 'laser class',
  hazardWavelengthsNm: 'wavelengths that can reach an eye, nm',
  firstPlateId: 'light meets first',
  secondPlateId: 'then',
};

const fields: readonly (keyof BenchValues)[] = [
  'name',
  'wavelengthNm',
  'inputExpression',
  'polariserSigmaDeg',
  'laserClass',
  'hazardWavelengthsNm',
  'firstPlateId',
  'secondPlateId',
];

/** Where what was typed differs from what the server holds, in words. */
export function benchDifferences(
  theirs: Bench,
  yours: BenchValues,
  plates: readonly Plate[],
): readonly EditDifference[] {
  const stored = valuesOfBench(theirs);
  const shown = (field: keyof BenchValues, value: string): string => {
    if (field === 'firstPlateId' || field === 'secondPlateId') {
      return [...plates, ...theirs.plates].find(({ id }) => id === value)?.name ?? '';
    }
    return field === 'laserClass' && value === '' ? 'not stated' : value;
  };
  return fields
    .filter((field) => stored[field] !== yours[field])
    .map((field) => ({
      field: fieldNames[field],
      theirs: shown(field, stored[field]),
      yours: shown(field, yours[field]),
    }));
}
