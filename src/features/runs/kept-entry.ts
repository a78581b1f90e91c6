import { z } from 'zod';
import { recordReadingSchema } from '../../../shared/schemas/runs';

const dialsSchema = z.array(z.number().nullable());

const waitingReadingSchema = z.strictObject({
  /** Idempotency-Key: a retry with it creates nothing twice. */
  key: z.string().min(1),
  body: recordReadingSchema,
  typedAt: z.string(),
});
/** A reading that the server has not acknowledged. */
export type WaitingReading = z.infer<typeof waitingReadingSchema>;

const keptEntrySchema = z.strictObject({
  /** Place of the open setting, from 0; the number of settings once all are passed; null before one was opened here. */
  setting: z.int().min(0).nullable(),
  /** What has been confirmed at the open setting, in beam order; null for a plate that has not. */
  confirmedDeg: dialsSchema,
  note: z.string(),
  turnedSince: z.strictObject({ sequence: z.int(), dialsDeg: dialsSchema }).nullable(),
  side: z.enum(['receiver', 'source']),
  /** Oldest first: they go out in this order. */
  waiting: z.array(waitingReadingSchema),
});
/** What one person has done at one run and the server has not acknowledged. */
export type KeptEntry = z.infer<typeof keptEntrySchema>;

export const emptyEntry: KeptEntry = {
  setting: null,
  confirmedDeg: [],
  note: '',
  turnedSince: null,
  side: 'receiver',
  waiting: [],
};

// With the person in its name: on a shared tablet nobody sends what somebody else dialled.
const nameOf = (userId: string, runId: string) => `quarterturn.bench.${userId}.${runId}`;

/** Keeps an entry on this device. False where the browser can't: it then lasts as long as the page, and the page says so. */
export function keepEntry(userId: string, runId: string, entry: KeptEntry): boolean {
  try {
    localStorage.setItem(nameOf(userId, runId), JSON.stringify(entry));
    return true;
  } catch {
    return false;
  }
}

/** What was kept; an entry that is missing or can't be read is an empty one. */
export function keptEntry(userId: string, runId: string): KeptEntry {
  try {
    const parsed = keptEntrySchema.safeParse(
      JSON.parse(localStorage.getItem(nameOf(userId, runId)) ?? 'null'),
    );
    return parsed.success ? parsed.data : emptyEntry;
  } catch {
    return emptyEntry;
  }
}

export function forgetEntry(userId: string, runId: string): void {
  try {
    localStorage.removeItem(nameOf(userId, runId));
  } catch {
    // Where nothing can be kept there is nothing to forget.
  }
}
