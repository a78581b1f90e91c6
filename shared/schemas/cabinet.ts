import { z } from 'zod';
import { idSchema, lineSchema, noteSchema, numberSchema, timestampSchema } from './common';

const plateKinds = ['half', 'quarter', 'other'] as const;
export const plateKindSchema = z.enum(plateKinds);
export type PlateKind = z.infer<typeof plateKindSchema>;

/** How a plate is built, which decides how its retardance follows wavelength and temperature (dispersion/). */
export const plateConstructionSchema = z.enum([
  'true-zero-order',
  'compound-zero-order',
  'multi-order',
  'achromatic',
  'unknown',
]);
/** The crystals whose dispersion is known here; null for any other. */
export const plateMaterialSchema = z.enum(['quartz', 'magnesium-fluoride', 'calcite', 'sapphire']).nullable();

const directionSchema = z.union([z.literal(1), z.literal(-1)]);
const retardanceSchema = numberSchema('A retardance', 0.1, 359.9, '°', '180.4');
const sigmaSchema = (name: string) => numberSchema(name, 0, 20, '°', '0.3');
const wavelengthSchema = numberSchema('A wavelength', 200, 5000, ' nm', '810');
const temperatureSchema = numberSchema('A temperature', -50, 150, ' °C', '21.5');

const approachSchema = z.enum(['rising', 'falling', 'either']);

/** A holder with an engraved ring. */
export const mountSchema = z.strictObject({
  name: z.string(),
  /** +1: the engraved numbers rise as the mount is turned counter-clockwise, seen by the receiver. */
  direction: directionSchema,
  resolutionDeg: z.number(),
  /** σ of coming back to the same reading. */
  repeatabilityDeg: z.number(),
  /** Readings it can be turned to; null for a ring that turns all the way round. */
  rangeDeg: z.strictObject({ from: z.number(), to: z.number() }).nullable(),
  /** null where it isn't known, as for most mounts turned by hand. */
  speedDegPerS: z.number().nullable(),
  backlashDeg: z.number(),
  /** From which side a reading is always approached, by the sense of the numbers. */
  approach: approachSchema,
});

/** What was measured of a plate in its present seat. Never changed: a correction is a new one. */
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
  measuredAt: timestampSchema,
  recordedBy: z.string(),
});
export type Calibration = z.infer<typeof calibrationSchema>;

export const plateSchema = z.strictObject({
  id: idSchema,
  name: z.string(),
  kind: plateKindSchema,
  designWavelengthNm: z.number(),
  construction: plateConstructionSchema,
  material: plateMaterialSchema,
  /** Whole waves beyond the retardance at the design wavelength, as the maker states them; 0 unless multi-order. */
  order: z.int(),
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
  temperatureC: temperatureSchema.nullable(),
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
  construction: plateConstructionSchema,
  material: plateMaterialSchema,
  order: z
    .int('An order is a whole number of waves. Write 0 for a zero-order plate.')
    .min(0, 'An order is a whole number of waves, 0 or more.')
    .max(200, 'An order is at most 200 waves.'),
  note: noteSchema(500, 'note'),
  mount: z.strictObject({
    name: lineSchema(20, "mount's name"),
    direction: directionSchema,
    resolutionDeg: numberSchema('The finest step of a dial', 0.001, 10, '°', '0.1'),
    repeatabilityDeg: numberSchema('The repeatability of a dial', 0, 5, '°', '0.05'),
    rangeDeg: z
      .strictObject({
        from: numberSchema('The first reading', -720, 720, '°', '0'),
        to: numberSchema('The last reading', -720, 1440, '°', '350'),
      })
      .refine(({ from, to }) => to - from >= 180, {
        path: ['to'],
        error: 'A plate needs half a turn of its mount: write a last reading at least 180° above the first.',
      })
      .nullable(),
    speedDegPerS: numberSchema('A speed', 0.01, 3600, '°/s', '20').nullable(),
    backlashDeg: numberSchema('The backlash', 0, 10, '°', '0.1'),
    approach: approachSchema,
  }),
};

/** @returns a sentence where the order is not one that a plate built so has, else null. */
function orderFault({
  construction,
  order,
}: {
  readonly construction: z.infer<typeof plateConstructionSchema>;
  readonly order: number;
}): string | null {
  if (construction === 'multi-order') {
    return order >= 1
      ? null
      : 'A multi-order plate has at least one whole wave. Write the order that its maker states, or choose another construction.';
  }
  return order === 0
    ? null
    : 'Only a multi-order plate has whole waves. Write 0, or say that it is multi-order.';
}

const orderOfConstruction = z.superRefine<Parameters<typeof orderFault>[0]>((plate, context) => {
  const message = orderFault(plate);
  if (message !== null) context.addIssue({ code: 'custom', path: ['order'], message });
});

export const createPlateSchema = z
  .strictObject({ ...plateFields, calibration: calibrationInputSchema })
  .check(orderOfConstruction);
export type CreatePlate = z.infer<typeof createPlateSchema>;
/** Everything of a plate but what was measured; needs If-Match. */
export const updatePlateSchema = z.strictObject(plateFields).check(orderOfConstruction);
export type UpdatePlate = z.infer<typeof updatePlateSchema>;
