import { z } from 'zod';
import { calibrationInputSchema, lineSchema, updatePlateSchema, writeMountSchema } from '../schemas';

/** Names the layout below, and is the first thing that a reader looks for. */
export const cabinetFormat = 'quarterturn.cabinet/1';

/** A moment, kept as the database keeps it: UTC, to the millisecond. */
function momentSchema(what: string) {
  return z.iso
    .datetime({ offset: true, error: `${what} is a day and a time like 2026-06-01T10:00:00Z.` })
    .transform((written) => new Date(written).toISOString())
    .refine((moment) => moment >= '1900', `${what} lies before 1900.`);
}

const retiredAtSchema = momentSchema('When it was retired').nullable();

export const documentMountSchema = writeMountSchema.extend({ retiredAt: retiredAtSchema });
export type DocumentMount = z.infer<typeof documentMountSchema>;

/** What names a mount or a plate in a document: of things in use a name stands once, of retired ones name and moment do. */
export const documentRefSchema = z.strictObject({
  name: lineSchema(20, 'name'),
  retiredAt: retiredAtSchema,
});
export type DocumentRef = z.infer<typeof documentRefSchema>;

export const documentCalibrationSchema = calibrationInputSchema
  .omit({ settlesId: true, measuredAt: true, openQuestions: true })
  .extend({
    // Counted before it is read: a long list of nonsense would be as long a list of faults.
    openQuestions: z
      .array(z.unknown(), 'The open questions are a list, empty where there are none.')
      .max(3, 'There are three open questions: axis, branch and blind.')
      .pipe(calibrationInputSchema.shape.openQuestions),
    /** The calibration of the same plate whose open question this one answers: its place in the plate, from 1, through all seats. */
    settles: z
      .int('What is settled is the number of a calibration of the same plate, or nothing.')
      .min(1, 'The calibrations of a plate are numbered from 1.')
      .nullable(),
    measuredAt: momentSchema('When it was measured'),
    /** Who measured, by name: who it was in another lab has no account here. */
    recordedBy: lineSchema(200, 'name of who recorded it'),
  });
export type DocumentCalibration = z.infer<typeof documentCalibrationSchema>;

export const documentSeatHeadSchema = z
  .strictObject({
    mount: documentRefSchema,
    seatedAt: momentSchema('When it was seated'),
    leftAt: momentSchema('When it was taken out').nullable(),
    leftWhy: lineSchema(200, 'reason why it was taken out').nullable(),
  })
  .refine(({ leftAt, leftWhy }) => (leftAt === null) === (leftWhy === null), {
    path: ['leftWhy'],
    error: 'A seat that has ended says when and why; one that has not says neither.',
  })
  .refine(({ seatedAt, leftAt }) => leftAt === null || leftAt > seatedAt, {
    path: ['leftAt'],
    error: 'This seat ends before it begins, or as it begins.',
  });
export type DocumentSeatHead = z.infer<typeof documentSeatHeadSchema>;
const documentSeatSchema = documentSeatHeadSchema.safeExtend({
  calibrations: z.array(documentCalibrationSchema),
});
export type DocumentSeat = z.infer<typeof documentSeatSchema>;

export const documentPlateHeadSchema = updatePlateSchema.safeExtend({ retiredAt: retiredAtSchema });
export type DocumentPlateHead = z.infer<typeof documentPlateHeadSchema>;
const documentPlateSchema = documentPlateHeadSchema.safeExtend({ seats: z.array(documentSeatSchema) });
export type DocumentPlate = z.infer<typeof documentPlateSchema>;

/** A lab's cabinet without ids, pictures and scans: what a file holds. Names and moments say what belongs together. */
export const cabinetDocumentSchema = z.strictObject({
  format: z.literal(cabinetFormat),
  mounts: z.array(documentMountSchema),
  plates: z.array(documentPlateSchema),
});
export type CabinetDocument = z.infer<typeof cabinetDocumentSchema>;

export const emptyDocument: CabinetDocument = { format: cabinetFormat, mounts: [], plates: [] };

/** The calibrations of a plate through all its seats: the place in this list, from 1, is what `settles` names. */
export function calibrationsOf(plate: DocumentPlate): readonly DocumentCalibration[] {
  return plate.seats.flatMap(({ calibrations }) => calibrations);
}

/** A name as it is compared: two that differ in capitals only are the same one. */
export const sameName = (name: string): string => name.toLowerCase();

/** One text for each mount, and for each plate, of a cabinet. */
export function refKey({ name, retiredAt }: DocumentRef): string {
  return `${retiredAt ?? ''} ${sameName(name)}`;
}
