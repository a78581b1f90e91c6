import { z } from 'zod';
import { calibrationInputSchema, calibrationSchema } from './calibrations';
import {
  idSchema,
  lineSchema,
  noteSchema,
  numberSchema,
  pageQuerySchema,
  pageSchema,
  timestampSchema,
} from './common';
import { attachedFileSchema, fileSchema } from './files';
import { mountSchema, seatSchema, writeMountSchema } from './mounts';
import { scanLightKindSchema } from './scans';

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

const wavelengthSchema = numberSchema('A wavelength', 200, 5000, ' nm', '810');

/** What a plate is, whatever it sits in. */
const plateFacts = {
  id: idSchema,
  name: z.string(),
  kind: plateKindSchema,
  designWavelengthNm: z.number(),
  construction: plateConstructionSchema,
  material: plateMaterialSchema,
  /** Whole waves beyond the retardance at the design wavelength, as the maker states them; 0 unless multi-order. */
  order: z.int(),
  note: z.string(),
  retiredAt: timestampSchema.nullable(),
  /** The benches in use whose beam goes through it. */
  benches: z.array(z.strictObject({ id: idSchema, name: z.string() })),
  revision: z.int(),
};

/** A plate that can be dialled: seated, and measured in that seat. */
export const plateSchema = z.strictObject({
  ...plateFacts,
  mount: mountSchema,
  seatedAt: timestampSchema,
  /** The newest one of this seat. */
  calibration: calibrationSchema,
});
export type Plate = z.infer<typeof plateSchema>;

export const plateHealths = [
  'calibrated',
  'due',
  'overdue',
  'open-question',
  'not-calibrated',
  'not-seated',
  'retired',
] as const;
export const plateHealthSchema = z.enum(plateHealths);
export type PlateHealth = z.infer<typeof plateHealthSchema>;

/** A plate as the cabinet lists it, in whatever state it is. */
export const cabinetPlateSchema = z.strictObject({
  ...plateFacts,
  serial: z.string(),
  clearApertureMm: z.number().nullable(),
  /** Wavelengths that its coating is for. */
  coatingNm: z.strictObject({ from: z.number(), to: z.number() }).nullable(),
  /** What is known of how much light it stands: the maker's words, or a burn that was seen. */
  damageNote: z.string(),
  /** Where it sits now; null once it was taken out. */
  seat: z
    .strictObject({ id: idSchema, mountId: idSchema, mount: mountSchema, seatedAt: timestampSchema })
    .nullable(),
  /** The newest one of the present seat. Of a seat that has ended nothing is used. */
  calibration: calibrationSchema.nullable(),
  health: plateHealthSchema,
});
export type CabinetPlate = z.infer<typeof cabinetPlateSchema>;

export const plateQuerySchema = pageQuerySchema.extend({
  search: z.string().trim().max(60).default(''),
  /** in-use: all but the retired ones. */
  health: z.enum([...plateHealths, 'in-use']).default('in-use'),
  kind: plateKindSchema.optional(),
  sort: z.enum(['name', 'age', 'wavelength']).default('name'),
  order: z.enum(['asc', 'desc']).default('asc'),
});
export type PlateQuery = z.infer<typeof plateQuerySchema>;
export const platePageSchema = pageSchema(cabinetPlateSchema);
export type PlatePage = z.infer<typeof platePageSchema>;

const healthCountsSchema = z.record(plateHealthSchema, z.int());
export type HealthCounts = z.infer<typeof healthCountsSchema>;

/** Of what a search finds; without one, of the whole cabinet. */
export const cabinetCountsQuerySchema = plateQuerySchema.pick({ search: true });
/** How many plates are in which state, and how many of each kind are. */
export const cabinetCountsSchema = z.strictObject({
  plates: healthCountsSchema,
  kinds: z.record(plateKindSchema, healthCountsSchema),
  /** Plates in use whose newest calibration left fast and slow open. */
  openAxes: z.int(),
  /** Mounts in use, whatever is searched for. */
  mounts: z.int(),
});
export type CabinetCounts = z.infer<typeof cabinetCountsSchema>;

/** A calibration with the seat that it was measured in, and the scan that it was fitted from. */
const seatedCalibrationSchema = calibrationSchema.extend({
  seatId: idSchema,
  scan: fileSchema
    .pick({ name: true, sha256: true, sizeBytes: true })
    .extend({ light: scanLightKindSchema })
    .nullable(),
});
export type SeatedCalibration = z.infer<typeof seatedCalibrationSchema>;

export const plateDetailSchema = z.strictObject({
  plate: cabinetPlateSchema,
  /** Newest first. */
  seats: z.array(seatSchema),
  /** Of every seat, newest first. */
  calibrations: z.array(seatedCalibrationSchema),
  files: z.array(attachedFileSchema),
});
export type PlateDetail = z.infer<typeof plateDetailSchema>;

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
  serial: noteSchema(60, 'serial number'),
  clearApertureMm: numberSchema('A clear aperture', 0.1, 500, ' mm', '22.5').nullable(),
  coatingNm: z
    .strictObject({ from: wavelengthSchema, to: wavelengthSchema })
    .refine(({ from, to }) => to > from, {
      path: ['to'],
      error: 'A coating range ends above where it begins. Write the longer wavelength here.',
    })
    .nullable(),
  damageNote: noteSchema(500, 'damage note'),
  note: noteSchema(500, 'note'),
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

/** Since when a plate sits where it does: since it was measured there, or now, where nobody says. */
const sinceSchema = timestampSchema.nullable().default(null);

/** Where a new plate sits from the start: in a mount of the cabinet, in one that comes with it, or nowhere yet. */
const firstSeatSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('none') }),
  z.strictObject({
    kind: z.literal('mount'),
    mountId: idSchema,
    since: sinceSchema,
    calibration: calibrationInputSchema.nullable(),
  }),
  z.strictObject({
    kind: z.literal('new-mount'),
    mount: writeMountSchema,
    since: sinceSchema,
    calibration: calibrationInputSchema.nullable(),
  }),
]);

export const createPlateSchema = z
  .strictObject({ ...plateFields, seat: firstSeatSchema })
  .check(orderOfConstruction);
export type CreatePlate = z.infer<typeof createPlateSchema>;
/** What a plate is; needs If-Match. Where it sits and what was measured have addresses of their own. */
export const updatePlateSchema = z.strictObject(plateFields).check(orderOfConstruction);
export type UpdatePlate = z.infer<typeof updatePlateSchema>;
