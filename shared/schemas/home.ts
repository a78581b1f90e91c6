import { z } from 'zod';
import { idSchema, timestampSchema } from './common';
import { cabinetPlateSchema } from './cabinet';
import { openQuestionSchema } from './calibrations';
import { runSummarySchema } from './runs';

/** One thing that waits for the person who asks; people before data before dates. */
export const waitingItemSchema = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('run-stands'),
    run: runSummarySchema,
    /** The first setting that is neither done nor skipped, from 1; null when none is left. */
    nextSetting: z.int().nullable(),
    /** The setting that was done last, from 1; null when none is done. */
    lastDoneSetting: z.int().nullable(),
  }),
  z.strictObject({
    kind: z.literal('draft-ahead'),
    protocolId: idSchema,
    protocolName: z.string(),
    targetCount: z.int(),
    savedAt: timestampSchema,
    savedBy: z.string(),
    /** The version it stands after; null when none was saved yet. */
    afterVersion: z.int().nullable(),
  }),
  z.strictObject({
    kind: z.literal('dialled-not-within'),
    run: runSummarySchema,
    label: z.string(),
    dialledInfidelity: z.number(),
    toleranceInfidelity: z.number(),
  }),
  z.strictObject({
    kind: z.literal('calibration-due'),
    plateId: idSchema,
    plateName: z.string(),
    measuredAt: timestampSchema,
    /** Whole days until it falls due, 0 on the day it does; below 0 when it is overdue. */
    daysLeft: z.int(),
    benchNames: z.array(z.string()),
  }),
  z.strictObject({
    kind: z.literal('calibrated-elsewhere'),
    plateId: idSchema,
    plateName: z.string(),
    benchName: z.string(),
    calibratedAtNm: z.number(),
    benchNm: z.number(),
  }),
  z.strictObject({
    kind: z.literal('plate-not-ready'),
    plateId: idSchema,
    plateName: z.string(),
    why: z.enum(['not-seated', 'not-calibrated']),
    benchNames: z.array(z.string()),
  }),
  z.strictObject({
    kind: z.literal('open-question'),
    plateId: idSchema,
    plateName: z.string(),
    questions: z.array(openQuestionSchema),
    benchNames: z.array(z.string()),
  }),
  z.strictObject({
    kind: z.literal('stale-versions'),
    /** What changed since these versions were saved: a plate that they name, or their bench. */
    subject: z.discriminatedUnion('kind', [
      z.strictObject({
        kind: z.literal('plate'),
        id: idSchema,
        name: z.string(),
        change: z.enum(['recalibrated', 'seat-ended', 'not-in-beam']),
        /** As in a reliance report; null unless it was recalibrated in its seat. */
        zeroShiftDeg: z.number().nullable(),
        zeroShiftSigmaDeg: z.number().nullable(),
      }),
      z.strictObject({ kind: z.literal('bench'), id: idSchema, name: z.string() }),
    ]),
    versionCount: z.int(),
    /** Of those whose dials stand for something: targets not within, and the worst of all; null where none does. */
    asDialled: z
      .strictObject({ outCount: z.int(), worstInfidelity: z.number(), worstLabel: z.string() })
      .nullable(),
    /** Versions whose old dials stand for nothing. */
    voidCount: z.int(),
  }),
  z.strictObject({ kind: z.literal('no-plates') }),
  z.strictObject({ kind: z.literal('no-bench') }),
  z.strictObject({ kind: z.literal('no-protocol') }),
]);
export type WaitingItem = z.infer<typeof waitingItemSchema>;

/** The worst target of a protocol's last run, from what its dials really said. */
const lastMadeSchema = z.strictObject({
  protocolId: idSchema,
  protocolName: z.string(),
  versionNumber: z.int(),
  benchName: z.string(),
  runId: idSchema,
  runNumber: z.int(),
  recordedAt: timestampSchema,
  label: z.string(),
  dialledInfidelity: z.number(),
  expectedInfidelity: z.number(),
  expectedLow: z.number(),
  expectedHigh: z.number(),
  toleranceInfidelity: z.number(),
});
export type LastMade = z.infer<typeof lastMadeSchema>;

export const homeSchema = z.strictObject({
  waiting: z.array(waitingItemSchema),
  lastMade: z.array(lastMadeSchema),
  /** The plates that stand in some beam. */
  cabinet: z.array(cabinetPlateSchema),
});
export type Home = z.infer<typeof homeSchema>;
