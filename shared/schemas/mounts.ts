import { z } from 'zod';
import {
  idSchema,
  lineSchema,
  noteSchema,
  numberSchema,
  pageQuerySchema,
  pageSchema,
  timestampSchema,
} from './common';

const directionSchema = z.union([z.literal(1), z.literal(-1)]);
const approachSchema = z.enum(['rising', 'falling', 'either']);
const driveSchema = z.enum(['hand', 'motor']);

/** A holder with an engraved ring, as much of it as a dial needs. */
export const mountSchema = z.strictObject({
  name: z.string(),
  /** +1: the engraved numbers rise as the mount is turned counter-clockwise, seen by the receiver. */
  direction: directionSchema,
  /** The finest step that a reading is given at: of an engraving, or of a motor. */
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
export type Mount = z.infer<typeof mountSchema>;

/** A mount as the cabinet lists it. */
export const cabinetMountSchema = mountSchema.extend({
  id: idSchema,
  drive: driveSchema,
  note: z.string(),
  /** The plate that sits in it now. */
  plate: z.strictObject({ id: idSchema, name: z.string(), seatedAt: timestampSchema }).nullable(),
  retiredAt: timestampSchema.nullable(),
  revision: z.int(),
});
export type CabinetMount = z.infer<typeof cabinetMountSchema>;

/** A plate in a mount from when to when: what was measured of it holds for this long. */
export const seatSchema = z.strictObject({
  id: idSchema,
  plate: z.strictObject({ id: idSchema, name: z.string() }),
  mount: z.strictObject({ id: idSchema, name: z.string() }),
  seatedAt: timestampSchema,
  seatedBy: z.string(),
  leftAt: timestampSchema.nullable(),
  /** Why it was taken out; null as long as it is seated. */
  leftWhy: z.string().nullable(),
});
export type Seat = z.infer<typeof seatSchema>;

export const mountStates = ['holding', 'empty', 'retired'] as const;
export const mountSorts = ['name', 'plate', 'step', 'repeatability'] as const;
export const mountQuerySchema = pageQuerySchema.extend({
  search: z.string().trim().max(60).default(''),
  state: z.enum([...mountStates, 'in-use']).default('in-use'),
  drive: driveSchema.optional(),
  sort: z.enum(mountSorts).default('name'),
  order: z.enum(['asc', 'desc']).default('asc'),
});
export type MountQuery = z.infer<typeof mountQuerySchema>;
export const mountPageSchema = pageSchema(cabinetMountSchema);
export const mountDetailSchema = z.strictObject({
  mount: cabinetMountSchema,
  /** Newest first. */
  seats: z.array(seatSchema),
});
export type MountDetail = z.infer<typeof mountDetailSchema>;

/** Everything of a mount; a change needs If-Match. */
export const writeMountSchema = z.strictObject({
  name: lineSchema(20, "mount's name"),
  drive: driveSchema,
  note: noteSchema(500, 'note'),
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
});
export type WriteMount = z.infer<typeof writeMountSchema>;

/** When it was done, where that was not just now. */
const doneAtSchema = timestampSchema.nullable().default(null);

/** Puts a plate into a mount; where it sits in another, or in this one, that seat ends with it. */
export const seatPlateSchema = z.strictObject({
  mountId: idSchema,
  /** Why the seat before ends: asked for where there is one. */
  why: noteSchema(200, 'reason'),
  at: doneAtSchema,
});
export type SeatPlate = z.infer<typeof seatPlateSchema>;
export const takeOutSchema = z.strictObject({ why: lineSchema(200, 'reason'), at: doneAtSchema });
export type TakeOut = z.infer<typeof takeOutSchema>;
