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
  wavelengthSigmaNm: 'its σ, nm',
  temperatureC: 'temperature of the plates, °C',
  temperatureSigmaK: 'its σ, K',
  inputExpression: 'state behind the polariser',
  polariserSigmaDeg: 'σ of the polariser’s angle, degrees',
  polariserExtinction: 'extinction of the polariser',
  laserClass: 'laser class',
  hazardWavelengthsNm: 'wavelengths that can reach an eye, nm',
  plates: 'plates in beam order',
};

const fields: readonly (keyof BenchValues)[] = [
  'name',
  'wavelengthNm',
  'wavelengthSigmaNm',
  'temperatureC',
  'temperatureSigmaK',
  'inputExpression',
  'polariserSigmaDeg',
  'polariserExtinction',
  'laserClass',
  'hazardWavelengthsNm',
  'plates',
];

/** Where what was typed differs from what the server holds, in words. */
export function benchDifferences(
  theirs: Bench,
  yours: BenchValues,
  plates: readonly Plate[],
): readonly EditDifference[] {
  const nameOf = (plateId: string): string =>
    [...plates, ...theirs.plates].find(({ id }) => id === plateId)?.name ?? '';
  const shown = (field: keyof BenchValues, values: BenchValues): string => {
    if (field === 'plates') {
      return values.plates
        .flatMap(({ plateId }) => (plateId === '' ? [] : [nameOf(plateId)]))
        .join(', then ');
    }
    return field === 'laserClass' && values[field] === '' ? 'not stated' : values[field];
  };
  const stored = valuesOfBench(theirs);
  return fields
    .map((field) => ({
      field: fieldNames[field],
      theirs: shown(field, stored),
      yours: shown(field, yours),
    }))
    .filter((difference) => difference.theirs !== difference.yours);
}
