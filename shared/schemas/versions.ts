import { z } from 'zod';
import { idSchema, pageSchema, timestampSchema } from './common';
import { laserClassSchema } from './benches';
import { plateConstructionSchema, plateKindSchema, plateMaterialSchema } from './cabinet';
import { calibrationSchema } from './calibrations';
import { conventionSchema } from './labs';
import { mountSchema } from './mounts';
import { objectiveSchema, protocolKindSchema, versionSummarySchema } from './protocols';

/** S1, S2, S3 in the canonical frame. */
const canonicalStokesSchema = z.tuple([z.number(), z.number(), z.number()]);

const frozenPlateSchema = z.strictObject({
  id: idSchema,
  name: z.string(),
  kind: plateKindSchema,
  designWavelengthNm: z.number(),
  construction: plateConstructionSchema,
  material: plateMaterialSchema,
  order: z.int(),
  mount: mountSchema,
  calibration: calibrationSchema,
  /** The retardance that the solver took, at the bench's wavelength and temperature. */
  used: z.strictObject({
    retardanceDeg: z.number(),
    /** Used minus measured. */
    shiftDeg: z.number(),
    /** no-model: calibrated at another wavelength, and nothing is known of how it follows. */
    source: z.enum(['calibration', 'model', 'no-model']),
    perNmDeg: z.number(),
    perKelvinDeg: z.number(),
  }),
});
export type FrozenPlate = z.infer<typeof frozenPlateSchema>;

const frozenSolutionSchema = z.strictObject({
  /** Table angles in [0, 180), in beam order. */
  fastAxesDeg: z.array(z.number()),
  /** Readings at each mount's resolution, in beam order. */
  dialsDeg: z.array(z.number()),
  /** 1 − F with the angles unrounded. */
  infidelity: z.number(),
  /** 1 − F with the dials as rounded. */
  dialledInfidelity: z.number(),
  /** First-order expectation of 1 − F under the calibration's and the mounts' σ, with its 5 % and 95 % points. */
  expectedInfidelity: z.number(),
  expectedLow: z.number(),
  expectedHigh: z.number(),
});
export type FrozenSolution = z.infer<typeof frozenSolutionSchema>;

/** What a row asks for, canonical frame; a unitary as a unit quaternion (w, x, y, z) in Bloch axes. */
const frozenGoalSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('state'), stokes: canonicalStokesSchema }),
  z.strictObject({
    kind: z.literal('unitary'),
    quaternion: z.tuple([z.number(), z.number(), z.number(), z.number()]),
  }),
]);
export type FrozenGoal = z.infer<typeof frozenGoalSchema>;

const frozenTargetSchema = z.strictObject({
  id: idSchema,
  label: z.string(),
  /** As it was written, in the convention of this version. */
  expression: z.string(),
  /** The same value in canonical form. */
  canonicalExpression: z.string(),
  goal: frozenGoalSchema,
  reach: z.enum(['exact', 'nearest', 'family']),
  /** Angle on the sphere to the closest state within reach, or of the turn that is left of a unitary. */
  shortfallDeg: z.number(),
  /** In a family: the plates that may stand anywhere, in beam order. */
  freePlates: z.array(z.int()),
  /** As ranked by the objective. */
  solutions: z.array(frozenSolutionSchema).min(1),
  chosenSolution: z.int(),
  held: z.boolean(),
});
export type FrozenTarget = z.infer<typeof frozenTargetSchema>;

/** All that a version freezes. Its canonical JSON (RFC 8785) is what the hash covers, its parent's hash included. */
export const versionContentSchema = z.strictObject({
  format: z.literal('quarterturn.version/3'),
  lab: z.strictObject({ id: idSchema, name: z.string() }),
  protocol: z.strictObject({ id: idSchema, name: z.string(), purpose: z.string() }),
  number: z.int(),
  parentHash: z.string().nullable(),
  message: z.string(),
  savedAt: timestampSchema,
  savedBy: z.strictObject({ id: idSchema, name: z.string() }),
  convention: conventionSchema,
  solverVersion: z.string(),
  kind: protocolKindSchema,
  objective: objectiveSchema,
  presentDialsDeg: z.array(z.number()).nullable(),
  toleranceInfidelity: z.number(),
  bench: z.strictObject({
    id: idSchema,
    name: z.string(),
    wavelengthNm: z.number(),
    wavelengthSigmaNm: z.number(),
    temperatureC: z.number().nullable(),
    temperatureSigmaK: z.number(),
    laserClass: laserClassSchema,
    hazardWavelengthsNm: z.array(z.number()),
    input: z.strictObject({
      expression: z.string(),
      stokes: canonicalStokesSchema,
      polariserSigmaDeg: z.number(),
      polariserExtinction: z.number().nullable(),
    }),
    /** In beam order. */
    plates: z.array(frozenPlateSchema),
  }),
  targets: z.array(frozenTargetSchema).min(1),
});
export type VersionContent = z.infer<typeof versionContentSchema>;

export const versionSchema = z.strictObject({
  summary: versionSummarySchema,
  content: versionContentSchema,
  /** The text that the hash covers, so that anyone can check it. */
  canonicalJson: z.string(),
  parentHash: z.string().nullable(),
});
export type Version = z.infer<typeof versionSchema>;

export const versionListSchema = z.strictObject({ items: z.array(versionSummarySchema) });
export const versionPageSchema = pageSchema(versionSummarySchema);
