import { z } from 'zod';
import { idSchema } from '../../shared/schemas';

/** Every kind of job, with what one carries: ids only, since the queue's tables are no lab's. */
export const jobData = {
  'daily-look': z.strictObject({}),
  'lab-look': z.strictObject({ labId: idSchema }),
  /** What a change of plates or of a bench does to versions; without ids every newest version of the lab. */
  reliance: z.strictObject({ labId: idSchema, versionIds: z.array(idSchema).nullable() }),
  mail: z.strictObject({ labId: idSchema, mailId: idSchema }),
} as const;

export type JobKind = keyof typeof jobData;
export type JobData<Kind extends JobKind> = z.infer<(typeof jobData)[Kind]>;
