import type { z } from 'zod';
import { type ExpressionProblem, parseState } from '../../../shared/optics/expression';
import type { Convention, Stokes } from '../../../shared/optics';
import { recordScanSchema, type ScanLightInput, scanLightSchema } from '../../../shared/schemas/scans';
import { commaSentence, parseTypedNumber } from '../../lib/format';
import {
  isoFromLocalField,
  localFieldFromDate,
  readOptionalNumber,
  readTypedNumber,
  typedFromNumber,
  typedFromOptional,
} from '../../lib/forms';
import { measuredAtFault } from '../../lib/measured-at-fault';

/** What a person types beside the file; numbers as text. */
export interface ScanFormValues {
  readonly lightKind: 'linear' | 'known';
  readonly extinction: string;
  readonly extinctionSigma: string;
  readonly power: string;
  readonly powerSigma: string;
  readonly inputExpression: string;
  readonly analyserDeg: string;
  /** Empty: this scan by itself. */
  readonly beforeId: string;
  readonly wavelengthNm: string;
  readonly temperatureC: string;
  readonly measuredAt: string;
  readonly note: string;
}

export type ScanField = keyof ScanFormValues;

export function emptyScanForm(start: {
  readonly lightKind: ScanFormValues['lightKind'];
  readonly wavelengthNm: number;
  readonly temperatureC: number | null;
  readonly beforeId: string;
  readonly now: Date;
}): ScanFormValues {
  return {
    lightKind: start.lightKind,
    extinction: '',
    extinctionSigma: '',
    power: '',
    powerSigma: '',
    inputExpression: '',
    analyserDeg: '0',
    beforeId: start.beforeId,
    wavelengthNm: typedFromNumber(start.wavelengthNm),
    temperatureC: typedFromOptional(start.temperatureC),
    measuredAt: localFieldFromDate(start.now),
    note: '',
  };
}

export interface ReadLight {
  /** Null where a field is at fault. */
  readonly light: ScanLightInput | null;
  /** Of known light, canonical. */
  readonly input: Stokes | null;
  readonly expressionProblem: ExpressionProblem | null;
  readonly faults: Partial<Record<ScanField, string>>;
}

const LIGHT_FIELDS: Readonly<Record<string, ScanField>> = {
  'extinction.value': 'extinction',
  'extinction.sigma': 'extinctionSigma',
  'power.value': 'power',
  'power.sigma': 'powerSigma',
  inputExpression: 'inputExpression',
  analyserDeg: 'analyserDeg',
  beforeId: 'beforeId',
};

/** A number with its σ, both or neither. */
function statedOf(value: string, sigma: string): { value: number; sigma: number } | null {
  if (value.trim() === '' && sigma.trim() === '') return null;
  return { value: readTypedNumber(value), sigma: readTypedNumber(sigma) };
}

export function readLight(values: ScanFormValues, convention: Convention): ReadLight {
  const extinction = statedOf(values.extinction, values.extinctionSigma);
  const written =
    values.lightKind === 'linear'
      ? { kind: 'linear', extinction, power: statedOf(values.power, values.powerSigma) }
      : {
          kind: 'known',
          inputExpression: values.inputExpression,
          analyserDeg: readTypedNumber(values.analyserDeg),
          extinction,
          beforeId: values.beforeId === '' ? null : values.beforeId,
        };
  const parsed = scanLightSchema.safeParse(written);
  const faults = parsed.success ? {} : faultsOf(parsed.error, LIGHT_FIELDS, values);
  const isTyped = values.lightKind === 'known' && values.inputExpression.trim() !== '';
  const state = isTyped ? parseState(values.inputExpression, convention) : null;
  const problem = state?.ok === false ? state.error : null;
  return {
    light: parsed.success && problem === null ? parsed.data : null,
    input: state?.ok === true ? state.stokes : null,
    expressionProblem: problem,
    faults,
  };
}

const surroundingsSchema = recordScanSchema.pick({
  wavelengthNm: true,
  temperatureC: true,
  measuredAt: true,
  note: true,
});
export type Surroundings = z.infer<typeof surroundingsSchema>;
const fitSurroundingsSchema = surroundingsSchema.pick({ wavelengthNm: true, temperatureC: true });

export interface ReadSurroundings {
  readonly surroundings: Surroundings | null;
  /** What of them a fit needs; there where the rest may be at fault. */
  readonly forFit: z.infer<typeof fitSurroundingsSchema> | null;
  readonly faults: Partial<Record<ScanField, string>>;
}

/** @param seatedAt since when the plate sits where it is scanned. */
export function readSurroundings(values: ScanFormValues, seatedAt: string, now: Date): ReadSurroundings {
  const written = {
    wavelengthNm: readTypedNumber(values.wavelengthNm),
    temperatureC: readOptionalNumber(values.temperatureC),
    measuredAt: isoFromLocalField(values.measuredAt),
    note: values.note,
  };
  const parsed = surroundingsSchema.safeParse(written);
  const { wavelengthNm, temperatureC } = written;
  const fields = {
    wavelengthNm: 'wavelengthNm',
    temperatureC: 'temperatureC',
    measuredAt: 'measuredAt',
    note: 'note',
  } as const;
  const measuredAt = measuredAtFault(values.measuredAt, seatedAt, now);
  const faults = parsed.success ? {} : faultsOf(parsed.error, fields, values);
  return {
    surroundings: parsed.success && measuredAt === null ? parsed.data : null,
    forFit: fitSurroundingsSchema.safeParse({ wavelengthNm, temperatureC }).data ?? null,
    faults: measuredAt === null ? faults : { measuredAt, ...faults },
  };
}

function faultsOf(
  error: z.ZodError,
  fields: Readonly<Record<string, ScanField>>,
  values: ScanFormValues,
): Partial<Record<ScanField, string>> {
  const faults: Partial<Record<ScanField, string>> = {};
  for (const { path, message } of error.issues) {
    const field = fields[path.map(String).join('.')];
    if (field === undefined) continue;
    faults[field] ??= sentenceFor(field, values, message);
  }
  return faults;
}

function sentenceFor(field: ScanField, values: ScanFormValues, message: string): string {
  const typed = values[field];
  const number = parseTypedNumber(typed);
  if (!number.ok && number.fault === 'comma') return commaSentence(typed);
  if (typed.trim() !== '') return message;
  if (field === 'extinctionSigma' || field === 'powerSigma') {
    return 'Write how well it is known; 0 takes it as exact.';
  }
  if (field === 'extinction' || field === 'power') return 'Write the value too, or empty its σ.';
  return message;
}
