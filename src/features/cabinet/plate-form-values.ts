import { z } from 'zod';
import { type Calibration, calibrationInputSchema, type Plate } from '../../../shared/schemas/cabinet';
import {
  isoFromLocalField,
  localFieldFromDate,
  readOptionalNumber,
  readTypedNumber,
  typedFromNumber,
  typedFromOptional,
} from '../../lib/forms';

/** A calibration as it is typed. */
export interface CalibrationValues {
  readonly wavelengthNm: string;
  /** '' where nobody wrote it down. */
  readonly temperatureC: string;
  readonly retardanceDeg: string;
  readonly retardanceSigmaDeg: string;
  readonly offsetDeg: string;
  readonly offsetSigmaDeg: string;
  readonly method: string;
  readonly note: string;
  readonly measuredAt: string;
}

/** A plate and its mount as they are typed. */
export interface PlateValues {
  readonly name: string;
  readonly kind: string;
  readonly designWavelengthNm: string;
  readonly construction: string;
  /** '' is another, or not known. */
  readonly material: string;
  readonly order: string;
  readonly note: string;
  readonly mount: {
    readonly name: string;
    readonly direction: '1' | '-1';
    readonly resolutionDeg: string;
    readonly repeatabilityDeg: string;
    /** Both '' for a ring that turns all the way round. */
    readonly rangeFromDeg: string;
    readonly rangeToDeg: string;
    readonly speedDegPerS: string;
    readonly backlashDeg: string;
    readonly approach: string;
  };
}

/** The request's schema with a sentence of its own for a date that was not given: a field of dates yields no half-typed text. */
export const calibrationFormSchema = calibrationInputSchema.extend({
  measuredAt: z.iso.datetime({ offset: true, error: 'Say when it was measured: the day and the time.' }),
});

/** A new calibration starts from the wavelength, which holds from one to the next, and never from a value. How it was measured is written each time: a text carried over would be recorded unread. */
export function emptyCalibration(previous: Calibration | null, now: Date): CalibrationValues {
  return {
    wavelengthNm: previous === null ? '' : typedFromNumber(previous.wavelengthNm),
    temperatureC: '',
    retardanceDeg: '',
    retardanceSigmaDeg: '',
    offsetDeg: '',
    offsetSigmaDeg: '',
    method: '',
    note: '',
    measuredAt: localFieldFromDate(now),
  };
}

export const emptyPlate: PlateValues = {
  name: '',
  kind: 'half',
  designWavelengthNm: '',
  construction: 'unknown',
  material: '',
  order: '0',
  note: '',
  mount: {
    name: '',
    direction: '1',
    resolutionDeg: '',
    repeatabilityDeg: '',
    rangeFromDeg: '',
    rangeToDeg: '',
    speedDegPerS: '',
    backlashDeg: '0',
    approach: 'either',
  },
};

export function valuesOfPlate(plate: Plate): PlateValues {
  return {
    name: plate.name,
    kind: plate.kind,
    designWavelengthNm: typedFromNumber(plate.designWavelengthNm),
    construction: plate.construction,
    material: plate.material ?? '',
    order: typedFromNumber(plate.order),
    note: plate.note,
    mount: {
      name: plate.mount.name,
      direction: plate.mount.direction === 1 ? '1' : '-1',
      resolutionDeg: typedFromNumber(plate.mount.resolutionDeg),
      repeatabilityDeg: typedFromNumber(plate.mount.repeatabilityDeg),
      rangeFromDeg: typedFromOptional(plate.mount.rangeDeg?.from ?? null),
      rangeToDeg: typedFromOptional(plate.mount.rangeDeg?.to ?? null),
      speedDegPerS: typedFromOptional(plate.mount.speedDegPerS),
      backlashDeg: typedFromNumber(plate.mount.backlashDeg),
      approach: plate.mount.approach,
    },
  };
}

/** What a request's schema is held against. */
export function readCalibration(values: CalibrationValues) {
  return {
    wavelengthNm: readTypedNumber(values.wavelengthNm),
    temperatureC: readOptionalNumber(values.temperatureC),
    retardanceDeg: readTypedNumber(values.retardanceDeg),
    retardanceSigmaDeg: readTypedNumber(values.retardanceSigmaDeg),
    offsetDeg: readTypedNumber(values.offsetDeg),
    offsetSigmaDeg: readTypedNumber(values.offsetSigmaDeg),
    method: values.method,
    note: values.note,
    measuredAt: isoFromLocalField(values.measuredAt),
  };
}

export function readPlate(values: PlateValues) {
  return {
    name: values.name,
    kind: values.kind,
    designWavelengthNm: readTypedNumber(values.designWavelengthNm),
    construction: values.construction,
    material: values.material === '' ? null : values.material,
    // The field is hidden for every other plate, whatever was written in it before.
    order: values.construction === 'multi-order' ? readTypedNumber(values.order) : 0,
    note: values.note,
    mount: {
      name: values.mount.name,
      direction: Number(values.mount.direction),
      resolutionDeg: readTypedNumber(values.mount.resolutionDeg),
      repeatabilityDeg: readTypedNumber(values.mount.repeatabilityDeg),
      rangeDeg: readRange(values.mount),
      speedDegPerS: readOptionalNumber(values.mount.speedDegPerS),
      backlashDeg: readTypedNumber(values.mount.backlashDeg),
      approach: values.mount.approach,
    },
  };
}

function readRange({ rangeFromDeg, rangeToDeg }: PlateValues['mount']) {
  if (rangeFromDeg.trim() === '' && rangeToDeg.trim() === '') return null;
  return { from: readTypedNumber(rangeFromDeg), to: readTypedNumber(rangeToDeg) };
}

/** Where the form has another name for a part of the request. */
export function plateFieldOf(path: string): 'mount.rangeFromDeg' | 'mount.rangeToDeg' | null {
  if (path === 'mount.rangeDeg.from') return 'mount.rangeFromDeg';
  return path === 'mount.rangeDeg.to' || path === 'mount.rangeDeg' ? 'mount.rangeToDeg' : null;
}
