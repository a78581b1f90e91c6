import { z } from 'zod';
import { type Calibration, calibrationInputSchema, type Plate } from '../../../shared/schemas/cabinet';
import { isoFromLocalField, localFieldFromDate, readTypedNumber, typedFromNumber } from '../../lib/forms';

/** A calibration as it is typed. */
export interface CalibrationValues {
  readonly wavelengthNm: string;
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
  readonly note: string;
  readonly mount: {
    readonly name: string;
    readonly direction: '1' | '-1';
    readonly resolutionDeg: string;
    readonly repeatabilityDeg: string;
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
  note: '',
  mount: { name: '', direction: '1', resolutionDeg: '', repeatabilityDeg: '' },
};

export function valuesOfPlate(plate: Plate): PlateValues {
  return {
    name: plate.name,
    kind: plate.kind,
    designWavelengthNm: typedFromNumber(plate.designWavelengthNm),
    note: plate.note,
    mount: {
      name: plate.mount.name,
      direction: plate.mount.direction === 1 ? '1' : '-1',
      resolutionDeg: typedFromNumber(plate.mount.resolutionDeg),
      repeatabilityDeg: typedFromNumber(plate.mount.repeatabilityDeg),
    },
  };
}

/** What a request's schema is held against. */
export function readCalibration(values: CalibrationValues) {
  return {
    wavelengthNm: readTypedNumber(values.wavelengthNm),
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
    note: values.note,
    mount: {
      name: values.mount.name,
      direction: Number(values.mount.direction),
      resolutionDeg: readTypedNumber(values.mount.resolutionDeg),
      repeatabilityDeg: readTypedNumber(values.mount.repeatabilityDeg),
    },
  };
}
