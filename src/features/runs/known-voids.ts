import { useState } from 'react';
import { z } from 'zod';
import type { VoidDials } from '../../../shared/schemas/reliance';
import type { Run } from '../../../shared/schemas/runs';
import { keep, kept } from './kept';

const knownSchema = z.array(z.string());

const nameOf = (runId: string) => `quarterturn.bench-voids.${runId}`;
const keyOf = ({ why, plateId }: VoidDials) => `${why} ${plateId}`;

/** Somebody at this device has read what is void of a run's dials, and goes on with them. */
export function keepKnownVoids({ summary, voids }: Run): void {
  keep(nameOf(summary.id), voids.map(keyOf));
}

/** What became void of a run's dials, as far as nobody here has said that it is known. */
export function useUnknownVoids(run: Run): {
  readonly voids: readonly VoidDials[];
  readonly goOn: () => void;
} {
  const read = () => knownSchema.safeParse(kept(nameOf(run.summary.id))).data ?? [];
  const [known, setKnown] = useState(read);
  return {
    voids: run.voids.filter((each) => !known.includes(keyOf(each))),
    goOn: () => {
      keepKnownVoids(run);
      setKnown(run.voids.map(keyOf));
    },
  };
}
