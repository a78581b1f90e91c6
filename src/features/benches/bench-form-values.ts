import type { UseFormRegisterReturn } from 'react-hook-form';
import type { Bench, CreateBench, LaserClass } from '../../../shared/schemas/benches';
import { laserClasses } from '../../../shared/schemas/benches';
import { readTypedNumber, typedFromNumber } from '../../lib/forms';

/** A registered field with the sentence that says what is wrong with it. */
export type FieldBinding = UseFormRegisterReturn & { readonly fault: string | undefined };

/** A bench as it is typed. */
export interface BenchValues {
  readonly name: string;
  readonly wavelengthNm: string;
  readonly inputExpression: string;
  readonly polariserSigmaDeg: string;
  /** '' is "not stated". */
  readonly laserClass: string;
  /** Numbers with commas or spaces between them. */
  readonly hazardWavelengthsNm: string;
  readonly firstPlateId: string;
  readonly secondPlateId: string;
}

export const emptyBench: BenchValues = {
  name: '',
  wavelengthNm: '',
  inputExpression: 'H',
  polariserSigmaDeg: '',
  laserClass: '',
  hazardWavelengthsNm: '',
  firstPlateId: '',
  secondPlateId: '',
};

export function valuesOfBench(bench: Bench): BenchValues {
  return {
    name: bench.name,
    wavelengthNm: typedFromNumber(bench.wavelengthNm),
    inputExpression: bench.inputExpression,
    polariserSigmaDeg: typedFromNumber(bench.polariserSigmaDeg),
    laserClass: bench.laserClass ?? '',
    hazardWavelengthsNm: bench.hazardWavelengthsNm.map(typedFromNumber).join(', '),
    firstPlateId: bench.plates[0]?.id ?? '',
    secondPlateId: bench.plates[1]?.id ?? '',
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

/** What the request's schema is held against. Plates not chosen are left out, so that the schema asks for two. */
export function readBench(values: BenchValues) {
  return {
    name: values.name,
    wavelengthNm: readTypedNumber(values.wavelengthNm),
    inputExpression: values.inputExpression,
    polariserSigmaDeg: readTypedNumber(values.polariserSigmaDeg),
    laserClass: readLaserClass(values.laserClass),
    hazardWavelengthsNm: readWavelengths(values.hazardWavelengthsNm),
    plateIds: [values.firstPlateId, values.secondPlateId].filter((id) => id !== ''),
  } satisfies Record<keyof CreateBench, unknown>;
}

/** The classes as a form offers them. Not stated comes first: it is what holds until a person has looked. */
export const classOptions: readonly { readonly value: string; readonly label: string }[] = [
  { value: '', label: 'not stated' },
  ...laserClasses.map((name) => ({ value: name, label: `class ${name}` })),
];
