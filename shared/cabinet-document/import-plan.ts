import { z } from 'zod';
import {
  documentCalibrationSchema,
  documentMountSchema,
  documentPlateHeadSchema,
  documentRefSchema,
  documentSeatHeadSchema,
} from './document';

/** A value of one field, as it is now or as it would be. */
const fieldValueSchema = z.union([
  z.string(),
  z.number(),
  z.strictObject({ from: z.number(), to: z.number() }),
  z.null(),
]);
export type FieldValue = z.infer<typeof fieldValueSchema>;

const fieldChangeSchema = z.strictObject({
  /** The name in the document: `retardanceDeg`. */
  field: z.string(),
  before: fieldValueSchema,
  after: fieldValueSchema,
});
export type FieldChange = z.infer<typeof fieldChangeSchema>;

const seatRefSchema = z.strictObject({ mount: documentRefSchema, seatedAt: z.string() });

/** What a calibration settles: one that the plate has, or one that comes with it; each by its place in that list, from 1. */
const settledSchema = z.strictObject({ isStored: z.boolean(), position: z.int() });

const changeSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('mount-added'), mount: documentMountSchema }),
  z.strictObject({
    kind: z.literal('mount-changed'),
    /** As it is called now. */
    mount: documentRefSchema,
    to: documentMountSchema,
    fields: z.array(fieldChangeSchema),
  }),
  z.strictObject({ kind: z.literal('plate-added'), plate: documentPlateHeadSchema }),
  z.strictObject({
    kind: z.literal('plate-changed'),
    plate: documentRefSchema,
    to: documentPlateHeadSchema,
    fields: z.array(fieldChangeSchema),
  }),
  z.strictObject({
    kind: z.literal('seat-ended'),
    plate: documentRefSchema,
    seat: seatRefSchema,
    leftAt: z.string(),
    leftWhy: z.string(),
  }),
  z.strictObject({ kind: z.literal('seat-added'), plate: documentRefSchema, seat: documentSeatHeadSchema }),
  z.strictObject({
    kind: z.literal('calibration-added'),
    plate: documentRefSchema,
    seat: seatRefSchema,
    /** Its place in the plate of the file, from 1. */
    position: z.int(),
    calibration: documentCalibrationSchema.omit({ settles: true }),
    settles: settledSchema.nullable(),
  }),
]);
export type ImportChange = z.infer<typeof changeSchema>;

const refusalSchema = z.strictObject({
  what: z.enum(['mount', 'plate', 'seat', 'calibration']),
  /** Of the mount, or of the plate that it belongs to. */
  name: z.string(),
  /** Whole sentences: what stands against it, and what a person can do. */
  reason: z.string(),
});
export type ImportRefusal = z.infer<typeof refusalSchema>;

const countsSchema = z.strictObject({
  mounts: z.int(),
  plates: z.int(),
  seats: z.int(),
  calibrations: z.int(),
});

/** What an import would do, in the order of the document, and what it can't. Nothing is ever removed. */
export const importPlanSchema = z.strictObject({
  changes: z.array(changeSchema),
  refused: z.array(refusalSchema),
  /** What the file says and the lab has already. */
  unchanged: countsSchema,
});
export type ImportPlan = z.infer<typeof importPlanSchema>;
