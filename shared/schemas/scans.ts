import { z } from 'zod';
import { ANGLE_UNITS, MAX_SCAN_COLUMNS, POWER_UNITS } from '../scan-file/types';
import { calibrationInputSchema, calibrationSchema } from './calibrations';
import { idSchema, lineSchema, numberSchema } from './common';
import { fileSchema } from './files';

/** Columns are counted from 0; a unit of null is the header's, or the usual one. The reader of scan files judges the rest. */
const columnSchema = z
  .int()
  .min(0)
  .max(MAX_SCAN_COLUMNS - 1);
const powerColumnSchema = z
  .strictObject({ column: columnSchema, unit: z.enum(POWER_UNITS).nullable() })
  .nullable();
export const scanColumnsSchema = z.strictObject({
  dial: z.strictObject({ column: columnSchema, unit: z.enum(ANGLE_UNITS).nullable() }),
  crossed: powerColumnSchema,
  parallel: powerColumnSchema,
  crossedSigma: powerColumnSchema,
  parallelSigma: powerColumnSchema,
});
export type ScanColumns = z.infer<typeof scanColumnsSchema>;

const extinctionSchema = z
  .strictObject({
    value: numberSchema('An extinction', 0, 0.1, '', '1e-5'),
    sigma: numberSchema('The uncertainty of an extinction', 0, 0.1, '', '1e-6'),
  })
  .nullable();

/** Between linear polarisers, or behind light whose state is known. */
export const scanLightKindSchema = z.enum(['linear', 'known']);

/** How the light went. Expressions are in the lab's convention. */
export const scanLightSchema = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('linear'),
    extinction: extinctionSchema,
    /** Of both ports together, in the file's unit; of use where only one was read. */
    power: z
      .strictObject({
        value: numberSchema('A power', 1e-12, 1e12, '', '2.4'),
        sigma: numberSchema('The uncertainty of a power', 0, 1e12, '', '0.01'),
      })
      .nullable(),
  }),
  z.strictObject({
    kind: z.literal('known'),
    inputExpression: lineSchema(200, 'state of the light'),
    analyserDeg: numberSchema("An analyser's azimuth", -180, 180, '°', '0'),
    extinction: extinctionSchema,
    /** A scan between polarisers of the same seat that is taken together with this one. */
    beforeId: idSchema.nullable(),
  }),
]);
export type ScanLightInput = z.infer<typeof scanLightSchema>;

/** A row that a person left out, and why. */
export const leftOutSchema = z.strictObject({
  line: z.int().min(1).max(200_000),
  why: lineSchema(200, 'reason'),
});
export type LeftOut = z.infer<typeof leftOutSchema>;

export const recordScanSchema = z.strictObject({
  fileId: idSchema,
  columns: scanColumnsSchema,
  light: scanLightSchema,
  leftOut: z.array(leftOutSchema).max(1000),
  wavelengthNm: calibrationInputSchema.shape.wavelengthNm,
  temperatureC: calibrationInputSchema.shape.temperatureC,
  measuredAt: calibrationInputSchema.shape.measuredAt,
  note: calibrationInputSchema.shape.note,
  /** The calibration whose open question this scan answers. */
  settlesId: idSchema.nullable(),
  /** What the page showed: the server fits again and refuses what differs. */
  shown: z.strictObject({ offsetDeg: z.number(), retardanceDeg: z.number().nullable() }),
});
export type RecordScan = z.infer<typeof recordScanSchema>;

/** How a scan was read and what came of it, as it is kept beside its calibration. */
export const scanRecordSchema = z.strictObject({
  format: z.literal('quarterturn.scan/1'),
  columns: scanColumnsSchema,
  light: scanLightSchema,
  /** S1, S2, S3 of known light in the canonical frame, as the expression meant on the day. */
  inputStokes: z.tuple([z.number(), z.number(), z.number()]).nullable(),
  /** Of the mount on the day. */
  direction: z.union([z.literal(1), z.literal(-1)]),
  leftOut: z.array(leftOutSchema),
  /** Where the retardance is from: this scan, or the plate's calibration before, which a scan of one port takes over. */
  retardanceFrom: z.enum(['scan', 'before']),
  pointCount: z.int(),
  chiSquared: z.number(),
  degreesOfFreedom: z.int(),
  sigmaFrom: z.enum(['rows', 'scatter']),
  parameters: z.record(z.string(), z.strictObject({ value: z.number(), sigma: z.number().nullable() })),
  covarianceOf: z.array(z.string()),
  covariance: z.array(z.array(z.number())),
});
export type ScanRecord = z.infer<typeof scanRecordSchema>;

export const calibrationDetailSchema = z.strictObject({
  calibration: calibrationSchema,
  /** Null where it was written by hand. */
  scan: z.strictObject({ record: scanRecordSchema, file: fileSchema }).nullable(),
});
export type CalibrationDetail = z.infer<typeof calibrationDetailSchema>;

/** Under what a file's head looks like, which column was what the last time. */
export const scanColumnsQuerySchema = z.strictObject({ signature: z.string().min(1).max(5000) });
export const rememberedColumnsSchema = z.strictObject({ columns: scanColumnsSchema.nullable() });
