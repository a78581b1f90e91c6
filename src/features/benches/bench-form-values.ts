import type { UseFormRegisterReturn } from 'react-hook-form';
import type { Bench, CreateBench, LaserClass } from '../../../shared/schemas/benches';
import { createBenchSchema, laserClasses } from '../../../shared/schemas/benches';
import { readOptionalNumber, readTypedNumber, typedFromNumber, typedFromOptional } from '../../lib/forms';

/** A registered field with the sentence that says what is wrong with it. */
export type FieldBinding = UseFormRegisterReturn & { readonly fault: string | undefined };

/** A bench as it is typed. */
export interface BenchValues {
  readonly name: string;
  readonly wavelengthNm: string;
  readonly wavelengthSigmaNm: string;
  /** '' where nobody watches it. */
  readonly temperatureC: string;
  readonly temperatureSigmaK: string;
  readonly inputExpression: string;
  readonly polariserSigmaDeg: string;
  /** '' where it isn't stated. */
  readonly polariserExtinction: string;
  /** '' is "not stated". */
  readonly laserClass: string;
  /** Numbers with commas or spaces between them. */
  readonly hazardWavelengthsNm: string;
  /** In beam order; '' where none is chosen yet. */
  readonly plates: readonly { readonly plateId: string }[];
}

export const emptyBench: BenchValues = {
  name: '',
  wavelengthNm: '',
  wavelengthSigmaNm: '0',
  temperatureC: '',
  temperatureSigmaK: '0',
  inputExpression: 'H',
  polariserSigmaDeg: '',
  polariserExtinction: '',
  laserClass: '',
  hazardWavelengthsNm: '',
  plates: [{ plateId: '' }, { plateId: '' }],
};

export function valuesOfBench(bench: Bench): BenchValues {
  return {
    name: bench.name,
    wavelengthNm: typedFromNumber(bench.wavelengthNm),
    wavelengthSigmaNm: typedFromNumber(bench.wavelengthSigmaNm),
    temperatureC: typedFromOptional(bench.temperatureC),
    temperatureSigmaK: typedFromNumber(bench.temperatureSigmaK),
    inputExpression: bench.inputExpression,
    polariserSigmaDeg: typedFromNumber(bench.polariserSigmaDeg),
    polariserExtinction: typedFromOptional(bench.polariserExtinction),
    laserClass: bench.laserClass ?? '',
    hazardWavelengthsNm: bench.hazardWavelengthsNm.map(typedFromNumber).join(', '),
    plates: bench.plates.map(({ id }) => ({ plateId: id })),
  };
}

export function readLaserClass(text: string): LaserClass {
  return laserClasses.find((known) => known === text) ?? null;
}

export function readWavelengths(text: string): readonly number[] {
  return text
    .replaceAll(/nm/gi, ' ')
    .split(/[\s,;]+/)
    .filter((part) => part !== '' && part !== 'and')
    .map(readTypedNumber);
}

/** Those of the typed wavelengths that a bench would be saved with: eyewear for any other is not to be spoken of. */
export function eyewearWavelengths(text: string): readonly number[] {
  const { element } = createBenchSchema.shape.hazardWavelengthsNm;
  return readWavelengths(text).filter((wavelengthNm) => element.safeParse(wavelengthNm).success);
}

/** What the request's schema is held against. Places where no plate is chosen are left out. */
export function readBench(values: BenchValues) {
  return {
    name: values.name,
    wavelengthNm: readTypedNumber(values.wavelengthNm),
    wavelengthSigmaNm: readTypedNumber(values.wavelengthSigmaNm),
    temperatureC: readOptionalNumber(values.temperatureC),
    temperatureSigmaK: readTypedNumber(values.temperatureSigmaK),
    inputExpression: values.inputExpression,
    polariserSigmaDeg: readTypedNumber(values.polariserSigmaDeg),
    polariserExtinction: readOptionalNumber(values.polariserExtinction),
    laserClass: readLaserClass(values.laserClass),
    hazardWavelengthsNm: readWavelengths(values.hazardWavelengthsNm),
    plateIds: values.plates.map(({ plateId }) => plateId).filter((id) => id !== ''),
  } satisfies Record<keyof CreateBench, unknown>;
}

/** The classes as a form offers them. Not stated comes first: it is what holds until a person has looked. */
export const classOptions: readonly { readonly value: string; readonly label: string }[] = [
  { value: '', label: 'not stated' },
  ...laserClasses.map((name) => ({ value: name, label: `class ${name}` })),
];
