import { z } from 'zod';
import { idSchema, lineSchema, numberSchema, timestampSchema } from './common';
import { cabinetPlateSchema, plateSchema } from './cabinet';

/** Classes of IEC 60825-1; null where the lab has not stated one, which is treated as one that can hurt. */
export const laserClasses = ['1', '1M', '2', '2M', '3R', '3B', '4'] as const;
export const laserClassSchema = z.enum(laserClasses).nullable();
export type LaserClass = z.infer<typeof laserClassSchema>;

export const maxBenchPlates = 6;

/** Before the light is used, or before it is detected. */
export const benchParts = ['preparation', 'analysis'] as const;
export const benchPartSchema = z.enum(benchParts);
export type BenchPart = z.infer<typeof benchPartSchema>;

const writtenDetectorSchema = z.strictObject({
  name: lineSchema(40, "detector's name"),
  /** Counts without light. */
  darkRatePerS: numberSchema('A dark rate', 0, 1e9, ' per second', '120'),
});

/** What counts behind the analysing polariser, or reads its power; null for a port with nothing behind it. */
const writtenDetectorsSchema = z
  .strictObject({
    passed: writtenDetectorSchema.nullable(),
    rejected: writtenDetectorSchema.nullable(),
    /** Efficiency of the rejected port over that of the passed one; null where nobody measured it. */
    efficiencyRatio: numberSchema('An efficiency ratio', 0.001, 1000, '', '0.97').nullable(),
  })
  .refine(
    ({ passed, rejected, efficiencyRatio }) =>
      efficiencyRatio === null || (passed !== null && rejected !== null),
    {
      path: ['efficiencyRatio'],
      error: 'An efficiency ratio compares two detectors. Name both, or leave it out.',
    },
  );
export type Detectors = z.infer<typeof writtenDetectorsSchema>;

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
  /**
   * What prepares the light, in beam order: the first is the one that light meets first. Empty as long as one of them is
   * not ready, so that nothing is solved for a beam that lacks a plate.
   */
  plates: z.array(plateSchema),
  /** What analyses it, in beam order before the analysing polariser; empty as long as one of them is not ready. */
  analysisPlates: z.array(plateSchema),
  /** Every plate that belongs into the beam, ready or not, in beam order. */
  order: z.array(z.strictObject({ plateId: idSchema, name: z.string(), part: benchPartSchema })),
  /** Plates of the beam that cannot be dialled. */
  notReady: z.array(
    z.strictObject({
      plateId: idSchema,
      name: z.string(),
      part: benchPartSchema,
      why: z.enum(['not-seated', 'not-calibrated']),
    }),
  ),
  detectors: z.strictObject({
    passed: z.strictObject({ name: z.string(), darkRatePerS: z.number() }).nullable(),
    rejected: z.strictObject({ name: z.string(), darkRatePerS: z.number() }).nullable(),
    efficiencyRatio: z.number().nullable(),
  }),
  retiredAt: timestampSchema.nullable(),
  revision: z.int(),
});
export type Bench = z.infer<typeof benchSchema>;
export const benchListSchema = z.strictObject({ items: z.array(benchSchema) });
/** Every plate of a bench's beam in whatever state it is, in the order of `order`. */
export const benchPlatesSchema = z.strictObject({ items: z.array(cabinetPlateSchema) });
export type BenchPlates = z.infer<typeof benchPlatesSchema>;

const platesInBeam = z
  .array(idSchema)
  .max(maxBenchPlates, `A part of a bench has at most ${maxBenchPlates} plates in its beam.`);
const onePlace = 'One plate cannot stand in two places. Choose another.';
const eachOnce = (ids: readonly string[]) => new Set(ids).size === ids.length;

export const createBenchSchema = z
  .strictObject({
    ...benchFields,
    plateIds: platesInBeam
      .min(1, 'A bench has at least one plate. Choose the one that light meets first.')
      .refine(eachOnce, onePlace),
    analysisPlateIds: platesInBeam.refine(eachOnce, onePlace),
    detectors: writtenDetectorsSchema,
  })
  .refine(
    ({ plateIds, analysisPlateIds }) => eachOnce([...new Set(plateIds), ...new Set(analysisPlateIds)]),
    {
      path: ['analysisPlateIds'],
      error: onePlace,
    },
  );
export type CreateBench = z.infer<typeof createBenchSchema>;
/** Needs If-Match. */
export const updateBenchSchema = createBenchSchema;
