import { z } from 'zod';
import { roles } from '../permissions';
import { idSchema, lineSchema, timestampSchema } from './common';

export const conventionSchema = z.strictObject({
  phase: z.enum(['kz-wt', 'wt-kz']),
  handedness: z.enum(['receiver', 'source']),
  s3Sign: z.enum(['R', 'L']),
});

const roleSchema = z.enum(roles);

export const labSchema = z.strictObject({
  id: idSchema,
  name: z.string(),
  convention: conventionSchema,
  /** A plate's calibration falls due this many days after it was measured. */
  calibrationDueDays: z.int(),
});
export type Lab = z.infer<typeof labSchema>;

export const sessionSchema = z.strictObject({
  user: z
    .strictObject({ id: idSchema, name: z.string(), login: z.string(), email: z.string().nullable() })
    .nullable(),
  labs: z.array(z.strictObject({ id: idSchema, name: z.string(), role: roleSchema })),
});
export type Session = z.infer<typeof sessionSchema>;

export const createLabSchema = z.strictObject({ name: lineSchema(80, "lab's name") });
export const updateLabSchema = z.strictObject({
  name: lineSchema(80, "lab's name").optional(),
  convention: conventionSchema.optional(),
  calibrationDueDays: z
    .int('Days are a whole number.')
    .min(1, 'A calibration falls due after 1 to 3650 days.')
    .max(3650, 'A calibration falls due after 1 to 3650 days.')
    .optional(),
});
export type UpdateLab = z.infer<typeof updateLabSchema>;

export const memberSchema = z.strictObject({
  userId: idSchema,
  name: z.string(),
  login: z.string(),
  role: roleSchema,
  joinedAt: timestampSchema,
});
export type LabMember = z.infer<typeof memberSchema>;
export const memberListSchema = z.strictObject({ items: z.array(memberSchema) });
export const updateMemberSchema = z.strictObject({ role: roleSchema });

export const invitationSchema = z.strictObject({
  id: idSchema,
  role: roleSchema,
  note: z.string(),
  createdAt: timestampSchema,
  expiresAt: timestampSchema,
});
export type Invitation = z.infer<typeof invitationSchema>;
export const invitationListSchema = z.strictObject({ items: z.array(invitationSchema) });
export const createInvitationSchema = z.strictObject({
  role: roleSchema,
  note: lineSchema(80, 'name or address'),
});
/** The link is shown once: only a hash of its token is kept. */
export const createdInvitationSchema = z.strictObject({ invitation: invitationSchema, token: z.string() });
export const invitationPreviewSchema = z.strictObject({
  labName: z.string(),
  role: roleSchema,
  expiresAt: timestampSchema,
});
export const acceptedInvitationSchema = z.strictObject({ labId: idSchema, role: roleSchema });
