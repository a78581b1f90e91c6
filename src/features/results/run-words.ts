import type { RunSummary } from '../../../shared/schemas/runs';

type RunProgress = Pick<RunSummary, 'state' | 'settingCount' | 'doneCount' | 'skippedCount'>;

/** Where a run stands, as one clause: "paused after 8 of 24 settings", "finished, 2 of 24 skipped". */
export function runProgressWords({ state, settingCount, doneCount, skippedCount }: RunProgress): string {
  const gone = doneCount + skippedCount;
  const skipped = skippedCount === 0 ? '' : `, ${skippedCount} skipped`;
  switch (state) {
    case 'running':
      return gone === 0
        ? `begun, ${settingCount} settings to go`
        : `under way, ${gone} of ${settingCount} settings gone${skipped}`;
    case 'paused':
      return `paused after ${gone} of ${settingCount} settings${skipped}`;
    case 'finished':
      return doneCount === settingCount
        ? `finished, all ${settingCount} settings done`
        : `finished, ${doneCount} of ${settingCount} settings done${skipped}`;
  }
}

/** Where a run is looked at: at the bench while it is open and the person may record, else its record. */
export function runHref(labId: string, run: Pick<RunSummary, 'id' | 'state'>, mayRecord: boolean): string {
  const bench = `/labs/${labId}/bench/runs/${run.id}`;
  return run.state !== 'finished' && mayRecord ? bench : `${bench}/record`;
}
