import { z } from 'zod';
import { keep, kept } from './kept';

const knownSchema = z.array(z.string());

const nameOf = (runId: string) => `quarterturn.bench-voids.${runId}`;

/** What a person at this device has read of a run's void dials and goes on with all the same. */
export function knownVoids(runId: string): readonly string[] {
  return knownSchema.safeParse(kept(nameOf(runId))).data ?? [];
}

export function keepKnownVoids(runId: string, voids: readonly string[]): void {
  keep(nameOf(runId), voids);
}
