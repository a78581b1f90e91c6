import { useQuery } from '@tanstack/react-query';
import { listed } from '../../../../shared/words';
import type { CabinetPlate } from '../../../../shared/schemas/cabinet';
import { runsQuery } from '../../results';

/** "Run 5 at signal arm is not finished": what at the plate's benches goes on with dials that would be void; null where nothing does. */
export function useOpenRuns(labId: string, { benches }: Pick<CabinetPlate, 'benches'>): string | null {
  const runs = useQuery({ ...runsQuery(labId), enabled: benches.length > 0 });
  const open = (runs.data?.items ?? []).filter(
    ({ state, benchName }) => state !== 'finished' && benches.some(({ name }) => name === benchName),
  );
  const [first] = open;
  if (first === undefined) return null;
  const names = listed(open.map(({ number, benchName }) => `run ${number} at ${benchName}`));
  return open.length === 1
    ? `${names.replace('run', 'Run')} is not finished: its dials are void from then on.`
    : `${names.replace('run', 'Run')} are not finished: their dials are void from then on.`;
}
