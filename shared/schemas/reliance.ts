import { z } from 'zod';
import { idSchema } from './common';

/** Why the dials of a version stand for nothing now. */
export const voidDialsSchema = z.strictObject({
  why: z.enum([
    /** The plate left the seat that its zero was measured in. */
    'seat-ended',
    /** The version's plate stands in this beam no more. */
    'not-in-beam',
    /** A plate stands in the beam that the version knows nothing of. */
    'new-in-beam',
    /** The same plates stand in another order. */
    'moved',
    /** The numbers of its mount rise the other way. */
    'numbers-turned',
  ]),
  plateId: idSchema,
  plateName: z.string(),
});
export type VoidDials = z.infer<typeof voidDialsSchema>;

/** How many targets are within the version's tolerance, and the worst of all. */
const tallySchema = z.strictObject({
  within: z.int(),
  out: z.int(),
  worst: z.strictObject({
    /** Its row in the version, from 1. */
    row: z.int(),
    label: z.string(),
    infidelity: z.number(),
  }),
});
export type RelianceTally = z.infer<typeof tallySchema>;

const relianceTargetSchema = z.strictObject({
  label: z.string(),
  /** 1 − F of the dials as the version froze them, with the plates of its day. */
  frozen: z.number(),
  /** 1 − F that the same dials make now; null where it cannot be told. */
  oldDials: z.number().nullable(),
  /** 1 − F of the dials that the bench would be given now; null while it cannot be solved for. */
  resolved: z.number().nullable(),
  /** Angle on the sphere that the best setting falls short now; null while it cannot be solved for. */
  shortfallDeg: z.number().nullable(),
});
export type RelianceTarget = z.infer<typeof relianceTargetSchema>;

/** What became of a plate since a version froze it. */
const reliedPlateSchema = z.strictObject({
  plateId: idSchema,
  plateName: z.string(),
  change: z.enum(['same', 'recalibrated', 'seat-ended', 'not-in-beam']),
  /** New zero less old one, in (−90, 90], with the σ of both; only of a plate that was recalibrated in its seat. */
  zeroShiftDeg: z.number().nullable(),
  zeroShiftSigmaDeg: z.number().nullable(),
  /** New retardance less old one, as the bench uses it. */
  retardanceShiftDeg: z.number().nullable(),
});

export const relianceReportSchema = z.strictObject({
  /** Whether anything that the version relies on is another now. */
  stale: z.boolean(),
  /** Where there is any, what the old dials make cannot be told. */
  voids: z.array(voidDialsSchema),
  /** One sentence for each thing that keeps the bench from being solved for. */
  waits: z.array(z.string()),
  /** Of the version, in its beam order. */
  plates: z.array(reliedPlateSchema),
  toleranceInfidelity: z.number(),
  frozen: tallySchema,
  oldDials: tallySchema.nullable(),
  resolved: tallySchema.nullable(),
  /** In the version's order. */
  targets: z.array(relianceTargetSchema).min(1),
});
export type RelianceReport = z.infer<typeof relianceReportSchema>;

/** The newest version of a protocol that names a plate, and what is known of how it stands now. */
const reliantVersionSchema = z.strictObject({
  versionId: idSchema,
  protocolId: idSchema,
  protocolName: z.string(),
  number: z.int(),
  benchName: z.string(),
  /** Of the protocol's draft: what If-Match names when the draft takes the version. */
  draftRevision: z.int(),
  /** Rows worked out so far, and of how many, while a report is being made; null when there is nothing to wait for. */
  progress: z.strictObject({ done: z.int(), total: z.int() }).nullable(),
  /** The last one that was finished; null where nothing it relies on has changed since it was saved. */
  report: relianceReportSchema.nullable(),
});
export type ReliantVersion = z.infer<typeof reliantVersionSchema>;

/** Everything that uses a plate. */
export const relianceSchema = z.strictObject({
  /** In use, with the plate in their beam. */
  benches: z.array(z.strictObject({ id: idSchema, name: z.string() })),
  /** Protocols whose draft is for such a bench: they solve with its newest calibration by themselves. */
  drafts: z.array(
    z.strictObject({
      protocolId: idSchema,
      protocolName: z.string(),
      benchName: z.string(),
      targetCount: z.int(),
    }),
  ),
  versions: z.array(reliantVersionSchema),
});
export type Reliance = z.infer<typeof relianceSchema>;

/** Lets a protocol's draft begin anew from one of its versions; needs If-Match with the draft's ETag. */
export const draftFromVersionSchema = z.strictObject({
  number: z.int('Write the number of the version.').min(1, 'Versions are numbered from 1.'),
  /** Whether what the draft holds beyond its newest version may be lost. */
  replace: z.boolean().default(false),
});
export type DraftFromVersion = z.input<typeof draftFromVersionSchema>;
