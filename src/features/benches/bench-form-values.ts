import type { UseFormRegisterReturn } from 'react-hook-form';
import type { Bench, CreateBench, LaserClass } from '../../../shared/schemas/benches';
import { createBenchSchema, laserClasses } from '../../../shared/schemas/benches';
import { append, type Beam, emptyBeam } from './beam-order';
import { readOptionalNumber, readTypedNumber, typedFromNumber, typedFromOptional } from '../../lib/forms';

/** A registered field with the sentence that says what is wrong with it. */
export type FieldBinding = UseFormRegisterReturn & { readonly fault: string | undefined };

/** The binding of a field by its name. */
export type BenchFieldOf = (name: TypedField) => FieldBinding;

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
  readonly beam: Beam;
  /** '' where nothing is behind that port of the analysing polariser. */
  readonly passedName: string;
  readonly passedDarkPerS: string;
  readonly rejectedName: string;
  readonly rejectedDarkPerS: string;
  /** '' where nobody measured it. */
  readonly efficiencyRatio: string;
}

/** The fields that hold a text: all but the beam. */
export type TypedField = Exclude<keyof BenchValues, 'beam'>;

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
  beam: emptyBeam,
  passedName: '',
  passedDarkPerS: '',
  rejectedName: '',
  rejectedDarkPerS: '',
  efficiencyRatio: '',
};

/** The beam as a bench has it, whether its plates are ready or not. */
export function beamOf({ order }: Pick<Bench, 'order'>): Beam {
  return order.reduce((beam, { part, plateId }) => append(beam, part, plateId), emptyBeam);
}

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
    beam: beamOf(bench),
    passedName: bench.detectors.passed?.name ?? '',
    passedDarkPerS: typedFromOptional(bench.detectors.passed?.darkRatePerS ?? null),
    rejectedName: bench.detectors.rejected?.name ?? '',
    rejectedDarkPerS: typedFromOptional(bench.detectors.rejected?.darkRatePerS ?? null),
    efficiencyRatio: typedFromOptional(bench.detectors.efficiencyRatio),
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

type TypedDetectors = Pick<
  BenchValues,
  'passedName' | 'passedDarkPerS' | 'rejectedName' | 'rejectedDarkPerS' | 'efficiencyRatio'
>;

/** Whether something is written of each port, so that their efficiencies can be compared. */
export function hasBothDetectors(values: TypedDetectors): boolean {
  const { passed, rejected } = readDetectors(values);
  return passed !== null && rejected !== null;
}

function readDetectors(values: TypedDetectors) {
  const detector = (name: string, dark: string) =>
    name.trim() === '' && dark.trim() === '' ? null : { name, darkRatePerS: readTypedNumber(dark) };
  const passed = detector(values.passedName, values.passedDarkPerS);
  const rejected = detector(values.rejectedName, values.rejectedDarkPerS);
  // With one detector only its field is not shown, and what was typed there compares nothing.
  const compares = passed !== null && rejected !== null;
  return {
    passed,
    rejected,
    efficiencyRatio: compares ? readOptionalNumber(values.efficiencyRatio) : null,
  };
}

/** What the request's schema is held against. */
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
    plateIds: values.beam.preparation.map(({ plateId }) => plateId),
    analysisPlateIds: values.beam.analysis.map(({ plateId }) => plateId),
    detectors: readDetectors(values),
  } satisfies Record<keyof CreateBench, unknown>;
}

/** The classes as a form offers them. Not stated comes first: it is what holds until a person has looked. */
export const classOptions: readonly { readonly value: string; readonly label: string }[] = [
  { value: '', label: 'not stated' },
  ...laserClasses.map((name) => ({ value: name, label: `class ${name}` })),
];
