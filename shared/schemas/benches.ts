import { z } from 'zod';
import { idSchema, lineSchema, numberSchema, timestampSchema } from './common';
import { plateSchema } from './cabinet';

/** Classes of IEC 60825-1; null where the lab has not stated one, which is treated as one that can hurt. */
export const laserClasses = ['1', '1M', '2', '2M', '3R', '3B', '4'] as const;
export const laserClassSchema = z.enum(laserClasses).nullable();
export type LaserClass = z.infer<typeof laserClassSchema>;

export const maxBenchPlates = 6;

const benchFields = {
  name: lineSchema(60, "bench's name"),
  wavelengthNm: numberSchema('A wavelength', 200, 5000, ' nm', '810'),
  /** σ of the light's centre wavelength; 0 where it plays no part. */
  wavelengthSigmaNm: numberSchema('The uncertainty of the wavelength', 0, 100, ' nm', '0.2'),
  /** Of the plates; null where nobody watches it. */
  temperatureC: numberSchema('A temperature', -50, 150, ' °C', '21.5').nullable(),
  temperatureSigmaK: numberSchema('The uncertainty of the temperature', 0, 50, ' K', '0.5'),
  /** The state behind the polariser, as an expression in the lab's convention. */
  inputExpression: lineSchema(200, 'input state'),
  polariserSigmaDeg: numberSchema("The uncertainty of the polariser's angle", 0, 20, '°', '0.3'),
  /** Power that the polariser lets through crossed, over power parallel; null where it isn't stated. */
  polariserExtinction: numberSchema('An extinction', 1e-9, 0.1, '', '1e-5').nullable(),
  laserClass: laserClassSchema,
  /** Every wavelength that can reach an eye at this bench, the pump included. */
  hazardWavelengthsNm: z
    .array(numberSchema('A wavelength', 150, 20_000, ' nm', '810'))
    .min(1, 'Name at least one wavelength that eyewear is for.')
    .max(8, 'Name at most eight wavelengths.'),
};

export const benchSchema = z.strictObject({
  id: idSchema,
  name: z.string(),
  wavelengthNm: z.number(),
  wavelengthSigmaNm: z.number(),
  temperatureC: z.number().nullable(),
  temperatureSigmaK: z.number(),
  inputExpression: z.string(),
  polariserSigmaDeg: z.number(),
  polariserExtinction: z.number().nullable(),
  laserClass: laserClassSchema,
  hazardWavelengthsNm: z.array(z.number()),
  /** In beam order: the first is the one that light meets first. */
  plates: z.array(plateSchema),
  retiredAt: timestampSchema.nullable(),
  revision: z.int(),
});
export type Bench = z.infer<typeof benchSchema>;
export const benchListSchema = z.strictObject({ items: z.array(benchSchema) });

export const createBenchSchema = z.strictObject({
  ...benchFields,
  plateIds: z
    .array(idSchema)
    .min(1, 'A bench has at least one plate. Choose the one that light meets first.')
    .max(maxBenchPlates, `A bench has at most ${maxBenchPlates} plates in its beam.`)
    .refine(
      (ids) => new Set(ids).size === ids.length,
      'One plate cannot stand in two places. Choose another.',
    ),
});
export type CreateBench = z.infer<typeof createBenchSchema>;
/** Needs If-Match. */
export const updateBenchSchema = createBenchSchema;
