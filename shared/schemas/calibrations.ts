import { z } from 'zod';
import { idSchema, lineSchema, noteSchema, numberSchema, timestampSchema } from './common';

const retardanceSchema = numberSchema('A retardance', 0.1, 359.9, '°', '180.4');
const sigmaSchema = (name: string) => numberSchema(name, 0, 20, '°', '0.3');
const wavelengthSchema = numberSchema('A wavelength', 200, 5000, ' nm', '810');
const temperatureSchema = numberSchema('A temperature', -50, 150, ' °C', '21.5');

/**
 * What a measurement can leave open (optics.md, 6). axis: the zero may be the slow axis's, a quarter turn away. branch:
 * the retardance may be 360° less the one given. blind: the retardance was not felt to
 * first order, near 180° between polarisers or near 90° behind circular light.
 */
export const openQuestions = ['axis', 'branch', 'blind'] as const;
export const openQuestionSchema = z.enum(openQuestions);
export type OpenQuestion = z.infer<typeof openQuestionSchema>;

/** What was measured of a plate in one seat. Never changed: a correction is a new one. */
export const calibrationSchema = z.strictObject({
  id: idSchema,
  wavelengthNm: z.number(),
  /** Of the plate while it was measured; null where nobody wrote it down. */
  temperatureC: z.number().nullable(),
  retardanceDeg: z.number(),
  retardanceSigmaDeg: z.number(),
  /** The reading with the fast axis along H. */
  offsetDeg: z.number(),
  offsetSigmaDeg: z.number(),
  method: z.string(),
  note: z.string(),
  /** What it could not tell, until another calibration settles it. */
  openQuestions: z.array(openQuestionSchema),
  /** The calibration whose open question this one answers. */
  settlesId: idSchema.nullable(),
  /** The scan it was fitted from, as it was uploaded. */
  fileId: idSchema.nullable(),
  measuredAt: timestampSchema,
  recordedBy: z.string(),
});
export type Calibration = z.infer<typeof calibrationSchema>;

/** A calibration as a person writes it: measured elsewhere, or an open question settled by a mark on the rim. */
export const calibrationInputSchema = z.strictObject({
  wavelengthNm: wavelengthSchema,
  temperatureC: temperatureSchema.nullable(),
  retardanceDeg: retardanceSchema,
  retardanceSigmaDeg: sigmaSchema('The uncertainty of the retardance'),
  offsetDeg: numberSchema('A zero', 0, 359.9999, '°', '301.73'),
  offsetSigmaDeg: sigmaSchema('The uncertainty of the zero'),
  method: lineSchema(80, 'way it was measured'),
  note: noteSchema(500, 'note'),
  openQuestions: z
    .array(openQuestionSchema)
    .refine((list) => new Set(list).size === list.length, 'Name each open question once.'),
  settlesId: idSchema.nullable(),
  measuredAt: z.iso.datetime({ offset: true, error: 'Say when it was measured: the day and the time.' }),
});
export type CalibrationInput = z.infer<typeof calibrationInputSchema>;
