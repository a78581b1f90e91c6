import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { VersionContent } from '../../../shared/schemas/versions';
import { benchQuery } from '../benches';
import { useLab } from '../labs';
import { voidDials } from './bench-changes';
import { keepKnownVoids, knownVoids } from './known-voids';

/** So often a run looks whether its plates still sit as they did. */
const lookEveryMs = 20_000;

/** What became void of a run's dials since it began, as far as nobody here has said that it is known. */
export function useVoidDials(runId: string, content: VersionContent) {
  const { lab } = useLab();
  const live = useQuery({
    ...benchQuery(lab.id, content.bench.id),
    staleTime: 0,
    refetchOnWindowFocus: 'always',
    refetchInterval: lookEveryMs,
  });
  const [known, setKnown] = useState(() => knownVoids(runId));
  const all = live.data === undefined ? [] : voidDials(content, live.data);
  return {
    voids: all.filter((sentence) => !known.includes(sentence)),
    goOn: () => {
      setKnown(all);
      keepKnownVoids(runId, all);
    },
  };
}
