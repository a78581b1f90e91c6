import { z } from 'zod';
import { idSchema, lineSchema, noteSchema, numberSchema, timestampSchema } from './common';

const plateKinds = ['half', 'quarter', 'other'] as const;
export const plateKindSchema = z.enum(plateKinds);
export type PlateKind = z.infer<typeof plateKindSchema>;

const directionSchema = z.union([z.literal(1), z.literal(-1)]);
const retardanceSchema = numberSchema('A retardance', 0.1, 359.9, '°', '180.4');
const sigmaSchema = (name: string) => numberSchema(name, 0, 20, '°', '0.3');
const wavelengthSchema = numberSchema('A wavelength', 200, 5000, ' nm', '810');

/** A holder with an engraved ring. */
export const mountSchema = z.strictObject({
  name: z.string(),
  /** +1: the engraved numbers rise as the mount is turned counter-clockwise, seen by the receiver. */
  direction: directionSchema,
  resolutionDeg: z.number(),
  /** σ of coming back to the same reading. */
  repeatabilityDeg: z.number(),
});

/** What was measured of a plate in its present seat. Never changed: a correction is a new one. */
export const calibrationSchema = z.strictObject({
  id: idSchema,
  wavelengthNm: z.number(),
  retardanceDeg: z.number(),
  retardanceSigmaDeg: z.number(),
  /** The reading with the fast axis along H. */
  offsetDeg: z.number(),
  offsetSigmaDeg: z.number(),
  method: z.string(),
  note: z.string(),
  measuredAt: timestampSchema,
  recordedBy: z.string(),
});
export type Calibration = z.infer<typeof calibrationSchema>;

export const plateSchema = z.strictObject({
  id: idSchema,
  name: z.string(),
  kind: plateKindSchema,
  designWavelengthNm: z.number(),
  note: z.string(),
  mount: mountSchema,
  seatedAt: timestampSchema,
  /** The newest one of this seat. */
  calibration: calibrationSchema,
  retiredAt: timestampSchema.nullable(),
  /** Names of the benches whose beam goes through it. */
  benches: z.array(z.strictObject({ id: idSchema, name: z.string() })),
  revision: z.int(),
});
export type Plate = z.infer<typeof plateSchema>;

export const plateListSchema = z.strictObject({ items: z.array(plateSchema) });
export const plateDetailSchema = z.strictObject({
  plate: plateSchema,
  /** Newest first. */
  calibrations: z.array(calibrationSchema),
});

export const calibrationInputSchema = z.strictObject({
  wavelengthNm: wavelengthSchema,
  retardanceDeg: retardanceSchema,
  retardanceSigmaDeg: sigmaSchema('The uncertainty of the retardance'),
  offsetDeg: numberSchema('A zero', 0, 359.9999, '°', '301.73'),
  offsetSigmaDeg: sigmaSchema('The uncertainty of the zero'),
  method: lineSchema(80, 'way it was measured'),
  note: noteSchema(500, 'note'),
  measuredAt: timestampSchema,
});
export type CalibrationInput = z.infer<typeof calibrationInputSchema>;

const plateFields = {
  name: lineSchema(20, "plate's name"),
  kind: plateKindSchema,
  designWavelengthNm: wavelengthSchema,
  note: noteSchema(500, 'note'),
  mount: z.strictObject({
    name: lineSchema(20, "mount's name"),
    direction: directionSchema,
    resolutionDeg: numberSchema('The finest step of a dial', 0.001, 10, '°', '0.1'),
    repeatabilityDeg: numberSchema('The repeatability of a dial', 0, 5, '°', '0.05'),
  }),
};

export const createPlateSchema = z.strictObject({ ...plateFields, calibration: calibrationInputSchema });
export type CreatePlate = z.infer<typeof createPlateSchema>;
/** Everything of a plate but what was measured; needs If-Match. */
export const updatePlateSchema = z.strictObject(plateFields);
export type UpdatePlate = z.infer<typeof updatePlateSchema>;
