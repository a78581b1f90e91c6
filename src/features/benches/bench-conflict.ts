import { type Bench, type BenchPart, benchSchema } from '../../../shared/schemas/benches';
import type { EditDifference } from '../../lib/forms';
import { fieldNames } from './bench-fields';
import { type BenchValues, type TypedField, valuesOfBench } from './bench-form-values';

/** The bench as the server holds it, out of a refusal; null when the refusal was another. */
export function benchConflict(current: unknown): Bench | null {
  const parsed = benchSchema.safeParse(current);
  return parsed.success ? parsed.data : null;
}

const typedFields: readonly TypedField[] = [
  'name',
  'wavelengthNm',
  'wavelengthSigmaNm',
  'temperatureC',
  'temperatureSigmaK',
  'inputExpression',
  'polariserSigmaDeg',
  'polariserExtinction',
  'passedName',
  'passedDarkPerS',
  'rejectedName',
  'rejectedDarkPerS',
  'efficiencyRatio',
  'laserClass',
  'hazardWavelengthsNm',
];

const beamNames: Readonly<Record<BenchPart, string>> = {
  preparation: 'plates of the preparation, in beam order',
  analysis: 'plates of the analysis, in beam order',
};

/** Where what was typed differs from what the server holds, in words. `nameOf` knows the plates of this page. */
export function benchDifferences(
  theirs: Bench,
  yours: BenchValues,
  nameOf: (plateId: string) => string | undefined,
): readonly EditDifference[] {
  const stored = valuesOfBench(theirs);
  const typed = (field: TypedField, values: BenchValues): string =>
    field === 'laserClass' && values[field] === '' ? 'not stated' : values[field];
  const plates = (part: BenchPart, { beam }: BenchValues): string =>
    beam[part]
      .map(({ plateId }) => nameOf(plateId) ?? theirs.order.find((place) => place.plateId === plateId)?.name)
      .map((name) => name ?? 'a plate')
      .join(', then ');
  const parts: readonly BenchPart[] = ['preparation', 'analysis'];
  return [
    ...typedFields.map((field) => ({
      field: fieldNames[field],
      theirs: typed(field, stored),
      yours: typed(field, yours),
    })),
    ...parts.map((part) => ({
      field: beamNames[part],
      theirs: plates(part, stored),
      yours: plates(part, yours),
    })),
  ].filter((difference) => difference.theirs !== difference.yours);
}
