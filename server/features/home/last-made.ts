import { z } from 'zod';
import { type LastMade, type RunSummary, versionContentSchema } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { listRuns } from '../runs';

const readingRow = z.object({
  run_id: z.string(),
  setting_index: z.number(),
  dialled_infidelity: z.number(),
  recorded_at: z.date(),
  content: z.string(),
});
const rowsOf = z.object({ rows: z.array(readingRow) });

/** The worst setting of a protocol's last run that has any, from what its dials really said. */
export interface WorstSetting {
  readonly run: RunSummary;
  readonly made: LastMade;
}

/** So many of the newest runs are looked at: a page that says what waits is not the history. */
const lookedAt = 100;

export async function lastRuns(
  transaction: Transaction,
  labId: string,
): Promise<{ readonly unfinished: readonly RunSummary[]; readonly worst: readonly WorstSetting[] }> {
  const runs = (await listRuns(transaction, labId, { before: null, limit: lookedAt })).map(
    ({ summary }) => summary,
  );
  const lastOfProtocol = new Map<string, RunSummary>();
  for (const run of runs) {
    if (run.doneCount > 0 && !lastOfProtocol.has(run.protocolId)) lastOfProtocol.set(run.protocolId, run);
  }
  const found: unknown = await transaction.raw(
    `select distinct on (last.run_id) last.run_id, last.setting_index, last.dialled_infidelity, last.recorded_at, v.content
      from (select distinct on (run_id, setting_index) run_id, setting_index, outcome, dialled_infidelity, recorded_at
        from readings where lab_id = ? and run_id = any(?) order by run_id, setting_index, sequence desc) last
      join runs r on r.id = last.run_id
      join versions v on v.id = r.version_id
      where last.outcome = 'done'
      order by last.run_id, last.dialled_infidelity desc`,
    [labId, [...lastOfProtocol.values()].map(({ id }) => id)],
  );
  const byRun = new Map(rowsOf.parse(found).rows.map((row) => [row.run_id, row]));
  const worst = [...lastOfProtocol.values()].flatMap((run) => {
    const row = byRun.get(run.id);
    return row === undefined ? [] : worstSetting(run, row);
  });
  return { unfinished: runs.filter(({ state }) => state !== 'finished'), worst };
}

function worstSetting(run: RunSummary, row: z.infer<typeof readingRow>): WorstSetting[] {
  const content = versionContentSchema.parse(JSON.parse(row.content));
  const target = content.targets[row.setting_index];
  const solution = target?.solutions[target.chosenSolution];
  if (target === undefined || solution === undefined) return [];
  return [
    {
      run,
      made: {
        protocolId: run.protocolId,
        protocolName: run.protocolName,
        versionNumber: run.versionNumber,
        benchName: run.benchName,
        runId: run.id,
        runNumber: run.number,
        recordedAt: row.recorded_at.toISOString(),
        label: target.label,
        dialledInfidelity: row.dialled_infidelity,
        expectedInfidelity: solution.expectedInfidelity,
        expectedLow: solution.expectedLow,
        expectedHigh: solution.expectedHigh,
        toleranceInfidelity: content.toleranceInfidelity,
      },
    },
  ];
}
