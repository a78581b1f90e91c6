import { z } from 'zod';
import { importPlanSchema } from './import-plan';
import { cabinetFileFormats } from './read-document';

export const exportQuerySchema = z.strictObject({ format: z.enum(cabinetFileFormats).default('csv') });

export const importRequestSchema = z.strictObject({
  /** The whole file, as text. */
  fileText: z.string('Send the text of the file.'),
  format: z.enum(cabinetFileFormats),
  /** Only looks: answers what would change, and its hash. */
  dryRun: z.boolean('Say whether this is a dry run.'),
  /** Of the plan that was shown; an import that would do anything else is refused. A dry run has none. */
  planHash: z
    .string()
    .regex(/^[0-9a-f]{64}$/u, 'The hash of a plan is 64 hexadecimal digits, as the dry run answered it.')
    .nullable(),
});
export type ImportRequest = z.infer<typeof importRequestSchema>;

export const importResultSchema = z.strictObject({
  /** Whether the plan was carried out, or only looked at. */
  imported: z.boolean(),
  plan: importPlanSchema,
  planHash: z.string(),
});
export type ImportResult = z.infer<typeof importResultSchema>;
