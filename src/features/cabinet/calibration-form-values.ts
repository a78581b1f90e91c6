import type { Calibration, OpenQuestion } from '../../../shared/schemas/calibrations';
import {
  isoFromLocalField,
  localFieldFromDate,
  readOptionalNumber,
  readTypedNumber,
  typedFromNumber,
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
  readonly axisOpen: boolean;
  readonly branchOpen: boolean;
  readonly blind: boolean;
}

/** A field of a calibration that a person types in; the questions are boxes. */
export type CalibrationTextField = Exclude<keyof CalibrationValues, QuestionField>;
export type QuestionField = 'axisOpen' | 'branchOpen' | 'blind';

export const questionFields: Readonly<Record<OpenQuestion, QuestionField>> = {
  axis: 'axisOpen',
  branch: 'branchOpen',
  blind: 'blind',
};

/**
 * A new calibration starts from the wavelength, which holds from one to the next, and never from a value. How it was
 * measured is written each time: a text carried over would be recorded unread.
 */
export function emptyCalibration(
  previous: Pick<Calibration, 'wavelengthNm'> | null,
  now: Date,
): CalibrationValues {
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
    axisOpen: false,
    branchOpen: false,
    blind: false,
  };
}

function openQuestionsOf(values: CalibrationValues): readonly OpenQuestion[] {
  return (['axis', 'branch', 'blind'] as const).filter((question) => values[questionFields[question]]);
}

/** What a request's schema is held against. `before` is the calibration that stands: what it left open and this does not is settled by this. */
export function readCalibration(
  values: CalibrationValues,
  before: Pick<Calibration, 'id' | 'openQuestions'> | null = null,
) {
  const open = openQuestionsOf(values);
  const settles = before?.openQuestions.some((question) => !open.includes(question)) ?? false;
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
    openQuestions: open,
    settlesId: settles ? (before?.id ?? null) : null,
  };
}
