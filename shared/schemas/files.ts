import { z } from 'zod';
import { idSchema, timestampSchema } from './common';

/** The most that one uploaded file may be. */
export const maxFileBytes = 10 * 1024 * 1024;
/** The most that one person's files may be in one lab. */
export const maxPersonBytes = 500 * 1024 * 1024;

/** What a file may be, as its content says. */
export const mediaTypes = ['text/plain', 'image/png', 'image/jpeg', 'image/webp', 'application/pdf'] as const;
export const mediaTypeSchema = z.enum(mediaTypes);
export type MediaType = z.infer<typeof mediaTypeSchema>;

export const fileSchema = z.strictObject({
  id: idSchema,
  /** What it was called where it came from. */
  name: z.string(),
  mediaType: mediaTypeSchema,
  /** Of its bytes, in hexadecimal. */
  sha256: z.string(),
  sizeBytes: z.int(),
  uploadedBy: z.string(),
  uploadedAt: timestampSchema,
});
export type StoredFile = z.infer<typeof fileSchema>;

export const attachmentKindSchema = z.enum(['photo', 'data-sheet']);
export const attachedFileSchema = fileSchema.extend({ kind: attachmentKindSchema });
export type AttachedFile = z.infer<typeof attachedFileSchema>;

export const fileNameQuerySchema = z.strictObject({
  name: z
    .string('Send the name of the file as name=.')
    .trim()
    .min(1, 'Send the name of the file as name=.')
    .max(200, 'The name of the file is longer than 200 characters. Shorten it.'),
});
export const attachFileSchema = z.strictObject({ fileId: idSchema, kind: attachmentKindSchema });
