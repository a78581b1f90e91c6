import { z } from 'zod';
import { idSchema, lineSchema, noteSchema, pageSchema, timestampSchema } from './common';
import { voidDialsSchema } from './reliance';

export const runStates = ['running', 'paused', 'finished'] as const;

/** One thing that was done at one setting. Never changed: a later one for the same setting takes its place. */
const readingSchema = z.strictObject({
  id: idSchema,
  /** Order of recording within the run, from 1. */
  sequence: z.int(),
  /** Place of the target in the version, from 0. */
  settingIndex: z.int(),
  outcome: z.enum(['done', 'skipped']),
  /** What each dial really said, in beam order; empty when skipped. */
  dialledDeg: z.array(z.number()),
  /** The note of a done setting, or the reason of a skipped one. */
  note: z.string(),
  recordedAt: timestampSchema,
  recordedBy: z.string(),
});
export type Reading = z.infer<typeof readingSchema>;

export const runSummarySchema = z.strictObject({
  id: idSchema,
  number: z.int(),
  state: z.enum(runStates),
  protocolId: idSchema,
  protocolName: z.string(),
  versionId: idSchema,
  versionNumber: z.int(),
  benchName: z.string(),
  settingCount: z.int(),
  doneCount: z.int(),
  skippedCount: z.int(),
  /** Why it stands still; empty unless paused. */
  pauseNote: z.string(),
  startedAt: timestampSchema,
  startedBy: z.string(),
  finishedAt: timestampSchema.nullable(),
});
export type RunSummary = z.infer<typeof runSummarySchema>;
/** Newest first. */
export const runPageSchema = pageSchema(runSummarySchema);

export const runSchema = z.strictObject({
  summary: runSummarySchema,
  /** Where each dial stood when the run began, in beam order; null where nobody said. */
  startDialsDeg: z.array(z.number().nullable()),
  /** Oldest first. */
  readings: z.array(readingSchema),
  /** What became void of its version's dials; nothing is asked of a run that is finished. */
  voids: z.array(voidDialsSchema),
});
export type Run = z.infer<typeof runSchema>;

const dialSchema = z
  .number()
  .min(0, 'A dial reads from 0 to below 360.')
  .lt(360, 'A dial reads from 0 to below 360.');

export const startRunSchema = z.strictObject({
  versionId: idSchema,
  startDialsDeg: z.array(dialSchema.nullable()).max(6),
  /** The person has read and acknowledged the laser caution of the bench. */
  cautionAcknowledged: z.literal(true, 'Read the caution and acknowledge it before the run starts.'),
  /** The person knows that dials of a plate that was seated anew since are void, and starts all the same. */
  staleAcknowledged: z.boolean('Say whether dials that are void are known to be so: true or false.'),
});
export type StartRun = z.infer<typeof startRunSchema>;

export const recordReadingSchema = z.discriminatedUnion('outcome', [
  z.strictObject({
    outcome: z.literal('done'),
    settingIndex: z.int().min(0),
    dialledDeg: z.array(dialSchema).min(1).max(6),
    note: noteSchema(500, 'note'),
  }),
  z.strictObject({
    outcome: z.literal('skipped'),
    settingIndex: z.int().min(0),
    note: lineSchema(200, 'reason for skipping it'),
  }),
]);
export type RecordReading = z.infer<typeof recordReadingSchema>;

export const pauseRunSchema = z.strictObject({ note: noteSchema(200, 'note') });
