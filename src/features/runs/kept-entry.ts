import { z } from 'zod';
import { recordReadingSchema } from '../../../shared/schemas/runs';
import { drop, keep, kept } from './kept';

const dialsSchema = z.array(z.number().nullable());

const waitingReadingSchema = z.strictObject({
  /** Idempotency-Key: a retry with it creates nothing twice. */
  key: z.string().min(1),
  body: recordReadingSchema,
  typedAt: z.string(),
});
/** A reading that the server has not acknowledged. */
export type WaitingReading = z.infer<typeof waitingReadingSchema>;

const cursorSchema = z.strictObject({
  /** Place of the open setting, from 0; the number of settings once all are passed; null before one was opened here. */
  setting: z.int().min(0).nullable(),
  /** What has been confirmed at the open setting, in beam order; null for a plate that has not. */
  confirmedDeg: dialsSchema,
  note: z.string(),
  turnedSince: z.strictObject({ sequence: z.int(), dialsDeg: dialsSchema }).nullable(),
  side: z.enum(['receiver', 'source']),
  /** The number of the server's last reading that this was made over: with more there, it no longer holds. */
  madeOver: z.int().min(0),
});
/** Where one person is at one run. */
export type BenchCursor = z.infer<typeof cursorSchema>;

/** What one person has done at one run and the server has not acknowledged. */
export interface KeptEntry extends BenchCursor {
  /** Oldest first: they go out in this order. */
  readonly waiting: readonly WaitingReading[];
}

const emptyCursor: BenchCursor = {
  setting: null,
  confirmedDeg: [],
  note: '',
  turnedSince: null,
  side: 'receiver',
  madeOver: 0,
};
export const emptyEntry: KeptEntry = { ...emptyCursor, waiting: [] };

/** What this device keeps of one person at one run. */
export interface BenchKeeping {
  /** What was kept; anything missing or broken is left out. */
  readonly entry: () => KeptEntry;
  /** False where the browser can't keep it: it then lasts as long as the page, and the page says so. */
  readonly keepCursor: (cursor: BenchCursor) => boolean;
  readonly keepReading: (reading: WaitingReading) => boolean;
  readonly dropReading: (key: string) => void;
  /** Tells the key of a reading that another tab took out, the server having acknowledged it there. Returns how to stop. */
  readonly watchDropped: (onDropped: (key: string) => void) => () => void;
  readonly forget: () => void;
}

/** Every name that begins so; none where the browser keeps nothing. */
function namesFrom(prefix: string): string[] {
  try {
    return Array.from({ length: localStorage.length }, (_, index) => localStorage.key(index) ?? '').filter(
      (name) => name.startsWith(prefix),
    );
  } catch {
    return [];
  }
}

/**
 * The keeping of one person at one run. The person is in its name: on a shared tablet nobody sends what somebody else
 * dialled. Each reading has a place of its own, so that a second tab of the same person never writes over one.
 */
export function benchKeeping(userId: string, runId: string): BenchKeeping {
  const name = `quarterturn.bench.${userId}.${runId}`;
  const ofReading = `${name}.reading.`;
  const waiting = (): WaitingReading[] =>
    namesFrom(ofReading)
      .flatMap((slot) => {
        const reading = waitingReadingSchema.safeParse(kept(slot));
        return reading.success ? [reading.data] : [];
      })
      .sort((a, b) => (a.typedAt === b.typedAt ? 0 : a.typedAt < b.typedAt ? -1 : 1));
  const cursor = (): BenchCursor => cursorSchema.safeParse(kept(name)).data ?? emptyCursor;
  return {
    entry: () => ({ ...cursor(), waiting: waiting() }),
    keepCursor: (value) => keep(name, value),
    keepReading: (reading) => keep(ofReading + reading.key, reading),
    dropReading: (key) => drop(ofReading + key),
    watchDropped: (onDropped) => {
      const heard = ({ key, newValue }: StorageEvent): void => {
        if (newValue === null && key?.startsWith(ofReading) === true) onDropped(key.slice(ofReading.length));
      };
      window.addEventListener('storage', heard);
      return () => window.removeEventListener('storage', heard);
    },
    forget: () => [name, ...namesFrom(ofReading)].forEach(drop),
  };
}
