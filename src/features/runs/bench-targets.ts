import type { StationTargets } from '../../components/beam-stations';

/** Where the beam's stations lead from the bench. */
export function benchTargets(labId: string): StationTargets {
  const target = (page: string) => ({ href: `/labs/${labId}/${page}` });
  return {
    plan: target('plan'),
    review: target('review'),
    bench: target('bench'),
    results: target('results'),
  };
}
