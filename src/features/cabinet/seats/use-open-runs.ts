import { useQuery } from '@tanstack/react-query';
import { listed } from '../../../../shared/words';
import type { CabinetPlate } from '../../../../shared/schemas/cabinet';
import { runsQuery } from '../../results';

/** "Not finished: run 5 at signal arm": what at the plate's benches goes on with dials that would be void; null where nothing does. */
export function useOpenRuns(labId: string, { benches }: Pick<CabinetPlate, 'benches'>): string | null {
  const runs = useQuery({ ...runsQuery(labId), enabled: benches.length > 0 });
  const open = (runs.data?.items ?? []).filter(
    ({ state, benchName }) => state !== 'finished' && benches.some(({ name }) => name === benchName),
  );
  if (open.length === 0) return null;
  const names = listed(open.map(({ number, benchName }) => `run ${number} at ${benchName}`));
  return `Not finished: ${names}. Dials of a run that uses this plate are void from then on.`;
}
