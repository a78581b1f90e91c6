import { z } from 'zod';
import { idSchema, lineSchema, noteSchema, numberSchema, timestampSchema } from './common';

export const maxTargets = 200;

/** Of a target's label, counted as JavaScript counts: an emoji is two. */
export const maxLabelLength = 24;

/** prepare: rows are states, made from the bench's input. apply: rows are unitaries, made of any light that comes in. */
export const protocolKindSchema = z.enum(['prepare', 'apply']);
export type ProtocolKind = z.infer<typeof protocolKindSchema>;

/** By what a row's solutions are ranked and, unless one is held, chosen. */
export const objectiveSchema = z.enum([
  'least-expected-infidelity',
  /** The whole list's turning, row after row, made least; see shared/optics/sequence. */
  'least-travel',
  /** Each row's own distance from the present dials. */
  'nearest-to-present',
]);
export type Objective = z.infer<typeof objectiveSchema>;

/** A row of the targets' table. `id` is made by the client and holds through edits and reorderings. */
const draftTargetSchema = z.strictObject({
  id: idSchema,
  /** May be empty, and an expression may not parse: a draft keeps what was typed. */
  label: z.string().max(maxLabelLength, `A label has at most ${maxLabelLength} characters.`),
  expression: z.string().max(4096, 'An expression has at most 4096 characters.'),
  /** Table angles of a solution that a person holds, one a plate; null follows the ranking. */
  heldFastAxesDeg: z.array(z.number().min(0).max(180)).max(6).nullable(),
});
export type DraftTarget = z.infer<typeof draftTargetSchema>;

export const draftContentSchema = z.strictObject({
  name: lineSchema(80, "protocol's name"),
  purpose: noteSchema(1000, 'purpose'),
  kind: protocolKindSchema,
  benchId: idSchema,
  objective: objectiveSchema,
  /** Where the dials stand now, one a plate in beam order; null where nobody said. */
  presentDialsDeg: z.array(z.number().min(-720).max(1440)).max(6).nullable(),
  /** The largest 1 − F that is within. */
  toleranceInfidelity: numberSchema('A tolerance', 1e-9, 0.5, '', '1e-3'),
  targets: z.array(draftTargetSchema).max(maxTargets, `A protocol has at most ${maxTargets} targets.`),
});
export type DraftContent = z.infer<typeof draftContentSchema>;

export const draftSchema = z.strictObject({
  revision: z.int(),
  content: draftContentSchema,
  savedAt: timestampSchema,
  savedBy: z.string(),
});
export type Draft = z.infer<typeof draftSchema>;

/** A version as a list shows it. */
export const versionSummarySchema = z.strictObject({
  id: idSchema,
  protocolId: idSchema,
  protocolName: z.string(),
  number: z.int(),
  message: z.string(),
  contentHash: z.string(),
  targetCount: z.int(),
  savedAt: timestampSchema,
  savedBy: z.string(),
});
export type VersionSummary = z.infer<typeof versionSummarySchema>;

const protocolSummarySchema = z.strictObject({
  id: idSchema,
  name: z.string(),
  purpose: z.string(),
  kind: protocolKindSchema,
  benchName: z.string(),
  targetCount: z.int(),
  draftSavedAt: timestampSchema,
  draftSavedBy: z.string(),
  latestVersion: versionSummarySchema.nullable(),
});
export type ProtocolSummary = z.infer<typeof protocolSummarySchema>;
export const protocolListSchema = z.strictObject({ items: z.array(protocolSummarySchema) });

export const protocolSchema = z.strictObject({
  id: idSchema,
  draft: draftSchema,
  latestVersion: versionSummarySchema.nullable(),
});
export type Protocol = z.infer<typeof protocolSchema>;

export const createProtocolSchema = draftContentSchema;
/** Needs If-Match with the draft's ETag, `"r<revision>"`. */
export const saveDraftSchema = draftContentSchema;

/** What the page showed for one target when the person saved; the server solves again and refuses what differs. */
const shownSolutionSchema = z.strictObject({
  targetId: idSchema,
  fastAxesDeg: z.array(z.number()).max(6),
  dialsDeg: z.array(z.number()).max(6),
  infidelity: z.number(),
  dialledInfidelity: z.number(),
});
export type ShownSolution = z.infer<typeof shownSolutionSchema>;

/** Needs If-Match with the draft's ETag. */
export const saveVersionSchema = z.strictObject({
  message: lineSchema(200, 'message: what changed, and why'),
  shown: z.array(shownSolutionSchema).min(1, 'A version holds at least one target.').max(maxTargets),
});
export type SaveVersion = z.infer<typeof saveVersionSchema>;
